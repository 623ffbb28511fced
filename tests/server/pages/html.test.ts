import { describe, expect, it } from 'vitest';
import { html } from '../../../server/pages/html.ts';

describe('text in a page', () => {
  it('is escaped, in content as in attributes', () => {
    // The five characters of HTML's own escaping rule (HTML Standard, section 13.3), the apostrophe too.
    expect(html`<p title="${`"'`}">${'<script>&'}</p>`.markup).toBe(
      '<p title="&quot;&#39;">&lt;script&gt;&amp;</p>',
    );
  });

  it('is not escaped twice where markup holds markup', () => {
    const rows = ['a<', 'b'].map((text) => html`<li>${text}</li>`);
    expect(html`<ul>${rows}${null}${7}</ul>`.markup).toBe('<ul><li>a&lt;</li><li>b</li>7</ul>');
  });
});

import { describe, expect, it } from 'vitest';
import {
  derivedTag,
  noneMatchHits,
  requireMatch,
  revisionTag,
} from '../../../server/http/etags.ts';

const tag = '"a.1"';

describe('If-None-Match', () => {
  it.each([tag, `W/${tag}`, '*', ` "x", W/${tag} , "y"`, `"x",${tag}`])('%s hits', (header) => {
    expect(noneMatchHits(header, tag)).toBe(true);
  });

  it.each([undefined, '"a.2"', 'a.1', '', '"a.1.1"'])('%s does not', (header) => {
    expect(noneMatchHits(header, tag)).toBe(false);
  });
});

describe('If-Match', () => {
  it.each([tag, '*', `"x", ${tag}`])('%s lets the edit through', (header) => {
    expect(() => requireMatch(header, tag)).not.toThrow();
  });

  it('is compared strongly: a weak tag never matches (RFC 9110, section 13.1.1)', () => {
    expect(() => requireMatch(`W/${tag}`, tag)).toThrow(expect.objectContaining({ slug: 'stale' }));
  });

  it('of another revision is stale', () => {
    expect(() => requireMatch('"a.2"', tag)).toThrow(expect.objectContaining({ slug: 'stale' }));
  });

  it('must be there', () => {
    expect(() => requireMatch(undefined, tag)).toThrow(
      expect.objectContaining({ slug: 'precondition-required' }),
    );
  });
});

describe('an entity tag', () => {
  it('names id and revision of an editable record', () => {
    expect(revisionTag({ id: 'a', revision: 1 })).toBe(tag);
  });

  it('of a report is equal for equal values and no other', () => {
    expect(derivedTag(['summary', 50])).toBe(derivedTag(['summary', 50]));
    expect(derivedTag(['summary', 50])).not.toBe(derivedTag(['summary', 75]));
    expect(derivedTag(['a', 'b'])).not.toBe(derivedTag(['a","b']));
  });
});

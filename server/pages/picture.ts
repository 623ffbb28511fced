import { type Html, html } from './html.ts';

const wide = { width: '520', height: '340' };
const narrow = { width: '360', height: '300' };
const square = { width: '520', height: '520' };
const narrowSquare = { width: '340', height: '340' };

/**
 * A chart in the size and theme that suit the reader, or paper. `path` is the chart's own page
 * address with its query; the numbers stand in words and tables beside it.
 */
export function picture(path: string, alt: string, form: 'wide' | 'square' = 'wide'): Html {
  const [large, small] = form === 'wide' ? [wide, narrow] : [square, narrowSquare];
  const source = (size: typeof wide, theme: string) =>
    `${path}${path.includes('?') ? '&' : '?'}${new URLSearchParams({ ...size, theme })}`;
  return html`<picture>
<source media="print" srcset="${source(large, 'print')}">
<source media="(max-width: 40rem) and (prefers-color-scheme: dark)" srcset="${source(small, 'dark')}">
<source media="(max-width: 40rem)" srcset="${source(small, 'light')}">
<source media="(prefers-color-scheme: dark)" srcset="${source(large, 'dark')}">
<img src="${source(large, 'light')}" width="${large.width}" height="${large.height}" alt="${alt}">
</picture>`;
}

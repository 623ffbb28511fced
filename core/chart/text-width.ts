/**
 * Advance widths of the signs from space to tilde in thousandths of the type size, DejaVu Sans 2.37;
 * Verdana, which stands second in the list of fonts, has nearly the same.
 */
const advances = [
  318, 401, 460, 838, 636, 950, 780, 275, 390, 390, 500, 838, 318, 361, 318, 337, 636, 636, 636,
  636, 636, 636, 636, 636, 636, 636, 337, 337, 838, 838, 838, 531, 1000, 684, 686, 698, 770, 632,
  575, 775, 752, 295, 295, 656, 557, 863, 748, 787, 603, 787, 695, 635, 611, 732, 684, 989, 685,
  611, 685, 390, 337, 390, 838, 500, 500, 613, 635, 550, 635, 615, 352, 635, 634, 278, 278, 579,
  278, 974, 634, 612, 635, 635, 411, 521, 392, 634, 592, 818, 592, 592, 525, 636, 337, 636, 838,
];
const firstCode = 0x20;

/** No sign of European scripts is wider, and most are narrower: a text never comes out too short. */
const otherAdvance = 840;
const boldGrowth = 1.14;

/** The width of a text in pixels, a little too wide rather than too narrow. */
export function textWidth(text: string, sizePx: number, bold = false): number {
  let thousandths = 0;
  for (const sign of text) {
    thousandths += advances[(sign.codePointAt(0) ?? 0) - firstCode] ?? otherAdvance;
  }
  return (thousandths / 1000) * sizePx * (bold ? boldGrowth : 1);
}

/** The text, or as much of its start as fits, ended by an ellipsis. */
export function fittingText(text: string, sizePx: number, widthPx: number, bold = false): string {
  if (textWidth(text, sizePx, bold) <= widthPx) return text;
  const signs = [...text];
  while (signs.length > 0 && textWidth(`${signs.join('')}…`, sizePx, bold) > widthPx) signs.pop();
  return `${signs.join('').trimEnd()}…`;
}

import type { Point } from './boxes.ts';
import type { Palette } from './palettes.ts';
import { px } from './path-text.ts';
import { xmlText } from './xml-text.ts';

/** Look-alikes in width, so that what is placed by the first fits with the others. */
const fonts = 'DejaVu Sans, Verdana, sans-serif';

export interface SvgDocument {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly background: string;
  readonly title: string;
  /** The chart in words. */
  readonly description: string;
  readonly body: string;
}

/**
 * An SVG document that is safe in a page and as a file: no script, style, link or id, and nothing
 * that is loaded from elsewhere.
 */
export function svgDocument(parts: SvgDocument): string {
  const { widthPx, heightPx, background, title, description, body } = parts;
  return `<svg xmlns="http://www.w3.org/2000/svg" role="img" width="${widthPx}" height="${heightPx}" viewBox="0 0 ${widthPx} ${heightPx}" font-family="${fonts}"><title>${xmlText(title)}</title><desc>${xmlText(description)}</desc><rect width="${widthPx}" height="${heightPx}" fill="${background}"/>${body}</svg>\n`;
}

export interface TextLook {
  readonly sizePx: number;
  readonly fill: string;
  readonly anchor?: 'start' | 'middle' | 'end';
  readonly bold?: boolean;
  /** Drawn around the letters, so that they stand out from lines behind them. */
  readonly halo?: string;
}

/** A line of text; `at` is the start, middle or end of its baseline. */
export function svgText(text: string, at: Point, look: TextLook): string {
  const { sizePx, fill, anchor = 'start', bold = false, halo } = look;
  return `<text x="${px(at.x)}" y="${px(at.y)}" font-size="${sizePx}" fill="${fill}"${anchor === 'start' ? '' : ` text-anchor="${anchor}"`}${bold ? ' font-weight="bold"' : ''}${halo === undefined ? '' : ` stroke="${halo}" stroke-width="3" stroke-linejoin="round" paint-order="stroke"`}>${xmlText(text)}</text>`;
}

export interface LineLook {
  readonly stroke: string;
  readonly width?: number;
  readonly dash?: string;
}

/** A straight line. */
export function svgLine(from: Point, to: Point, look: LineLook): string {
  return `<line x1="${px(from.x)}" y1="${px(from.y)}" x2="${px(to.x)}" y2="${px(to.y)}"${stroked(look)}/>`;
}

/** A line that is not filled; the class names what it shows. */
export function svgPath(name: string, d: string, look: LineLook): string {
  return `<path class="${name}" d="${d}" fill="none"${stroked(look)} stroke-linejoin="round"/>`;
}

function stroked({ stroke, width = 1, dash }: LineLook): string {
  return ` stroke="${stroke}" stroke-width="${width}"${dash === undefined ? '' : ` stroke-dasharray="${dash}"`}`;
}

/** Parts that belong together; the class names what they show. */
export function svgGroup(name: string, body: string): string {
  return body === '' ? '' : `<g class="${name}">${body}</g>`;
}

/** The marks: a filled disc for a least SWR, an open diamond for a resonance, a square for neither. */
export type MarkShape = 'disc' | 'diamond' | 'square';
export const markPx = 7;
const discPx = 4.5;

/** A mark around its place. */
export function svgMark(shape: MarkShape, { x, y }: Point, stroke: string, palette: Palette) {
  if (shape === 'disc') {
    return `<circle cx="${px(x)}" cy="${px(y)}" r="${discPx}" fill="${stroke}" stroke="${palette.background}"/>`;
  }
  const d =
    shape === 'diamond'
      ? `M${px(x)} ${px(y - 8)}l8 8l-8 8l-8 -8z`
      : `M${px(x - 4)} ${px(y - 4)}h8v8h-8z`;
  return `<path d="${d}" fill="${palette.background}" stroke="${stroke}" stroke-width="2"/>`;
}

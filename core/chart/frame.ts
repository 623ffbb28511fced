import type { Box, Point } from './boxes.ts';
import type { ChartHeading, ChartStyle } from './chart-style.ts';
import type { Tick } from './frequency-scale.ts';
import { type NumberText, numberText } from './number-text.ts';
import { type Palette, palettes } from './palettes.ts';
import { px } from './path-text.ts';
import { svgGroup, svgLine, svgText } from './svg.ts';
import { fittingText, textWidth } from './text-width.ts';

/** The plot area of a chart, and what is drawn with. */
export interface Frame {
  readonly plot: Box;
  readonly style: ChartStyle;
  readonly palette: Palette;
  readonly numbers: NumberText;
  readonly sizePx: number;
  /** There is room for short texts only. */
  readonly isNarrow: boolean;
}

interface Margins {
  readonly left: number;
  readonly right: number;
  /** Between heading and plot. */
  readonly above: number;
  readonly below: number;
}

const narrowPx = 480;
const paddingPx = 10;

/** The frame of a chart with these margins around its plot. */
export function frameOf(style: ChartStyle, margins: Margins): Frame {
  const isNarrow = style.widthPx < narrowPx;
  const sizePx = isNarrow ? 11 : 12;
  return {
    plot: {
      left: margins.left,
      right: style.widthPx - margins.right,
      top: headingHeight(sizePx) + margins.above,
      bottom: style.heightPx - margins.below,
    },
    style,
    palette: palettes[style.theme],
    numbers: numberText(style.numbers),
    sizePx,
    isNarrow,
  };
}

function headingHeight(sizePx: number): number {
  return Math.round(paddingPx + 1.25 * (sizePx + 2) + 1.4 * sizePx + 4);
}

/** Title and subtitle, cut where they are too long; `<title>` has them whole. */
export function headingSvg({ title, subtitle }: ChartHeading, frame: Frame): string {
  const { sizePx, style, palette } = frame;
  const room = style.widthPx - 2 * paddingPx;
  const titleSize = sizePx + 2;
  const titleY = paddingPx + titleSize;
  return svgGroup(
    'heading',
    svgText(
      fittingText(title, titleSize, room, true),
      { x: paddingPx, y: titleY },
      { sizePx: titleSize, fill: palette.text, bold: true },
    ) +
      svgText(
        fittingText(subtitle, sizePx, room),
        { x: paddingPx, y: titleY + 1.45 * sizePx },
        { sizePx, fill: palette.quietText },
      ),
  );
}

/** The horizontal axis: grid, ticks and title. */
export function xAxisSvg(
  frame: Frame,
  ticks: readonly Tick[],
  x: (at: number) => number,
  title: string,
): string {
  const { plot, palette, sizePx, style } = frame;
  const look = { sizePx, fill: palette.text, anchor: 'middle' } as const;
  const body = ticks.map(({ at, text }) => {
    const place = x(at);
    const half = textWidth(text, sizePx) / 2;
    const textX = Math.min(style.widthPx - half - 2, Math.max(half + 2, place));
    return (
      svgLine({ x: place, y: plot.top }, { x: place, y: plot.bottom }, { stroke: palette.grid }) +
      svgLine(
        { x: place, y: plot.bottom },
        { x: place, y: plot.bottom + 5 },
        { stroke: palette.frame },
      ) +
      svgText(text, { x: textX, y: plot.bottom + 7 + sizePx }, look)
    );
  });
  const middle = { x: (plot.left + plot.right) / 2, y: plot.bottom + 12 + 2.4 * sizePx };
  return svgGroup('axis-x', body.join('')) + svgText(title, middle, look);
}

/** The vertical axis: grid, ticks and title. */
export function yAxisSvg(
  frame: Frame,
  ticks: readonly Tick[],
  y: (at: number) => number,
  title: string,
): string {
  const { plot, palette, sizePx } = frame;
  const look = { sizePx, fill: palette.text, anchor: 'end' } as const;
  const body = ticks.map(({ at, text }) => {
    const place = y(at);
    return (
      svgLine({ x: plot.left, y: place }, { x: plot.right, y: place }, { stroke: palette.grid }) +
      svgLine(
        { x: plot.left - 5, y: place },
        { x: plot.left, y: place },
        { stroke: palette.frame },
      ) +
      svgText(text, { x: plot.left - 8, y: place + 0.36 * sizePx }, look)
    );
  });
  return svgGroup('axis-y', body.join('')) + sideways(title, frame);
}

function sideways(title: string, { plot, sizePx, palette }: Frame): string {
  const middle: Point = { x: sizePx + 5, y: (plot.top + plot.bottom) / 2 };
  const turn = `<g transform="rotate(-90 ${px(middle.x)} ${px(middle.y)})">`;
  return `${turn}${svgText(title, middle, { sizePx, fill: palette.text, anchor: 'middle' })}</g>`;
}

/** The border of the plot. */
export function borderSvg({ plot, palette }: Frame): string {
  const { left, top, right, bottom } = plot;
  return `<path d="M${px(left)} ${px(top)}H${px(right)}V${px(bottom)}H${px(left)}z" fill="none" stroke="${palette.frame}"/>`;
}

import { reflectionMagnitude, type Sweep } from '../sweep.ts';
import { type Frame, yAxisSvg } from './frame.ts';
import type { FrequencyAxis } from './frequency-axis.ts';
import { px } from './path-text.ts';
import { swrOrdinate, swrTickValues } from './swr-ordinate.ts';
import type { PixelLine } from './thin-line.ts';

/** The SWR axis, pixels from the top of the chart. */
export type SwrAxis = (swr: number) => number;

/** Fewer points than this are shown as dots: there the line between them is the chart's own. */
const fewPoints = 60;

/** The SWR axis of a plot; see `swrOrdinate`. */
export function swrAxis({ plot }: Frame): SwrAxis {
  return (swr) => plot.bottom - swrOrdinate(swr) * (plot.bottom - plot.top);
}

/** Grid, ticks and title of an SWR axis. */
export function swrAxisSvg(y: SwrAxis, referenceOhm: number, frame: Frame): string {
  const { plot, numbers, sizePx } = frame;
  const ticks = swrTickValues(plot.bottom - plot.top, sizePx * 1.25).map((swr) => ({
    at: swr,
    text: swr === Number.POSITIVE_INFINITY ? '∞' : numbers.significant(swr, 2),
  }));
  return yAxisSvg(frame, ticks, y, `SWR against ${numbers.significant(referenceOhm, 3)} Ω`);
}

/** The points of a sweep in pixels; a total reflection lies at the head of the plot. */
export function swrLine(sweep: Sweep, { x }: FrequencyAxis, { plot }: Frame): PixelLine {
  const height = plot.bottom - plot.top;
  const y = reflectionMagnitude(sweep).map(
    (magnitude) => plot.bottom - Math.min(1, magnitude) * height,
  );
  return { x: sweep.frequencyHz.map(x), y };
}

/** The points themselves, where they are few. */
export function pointsSvg({ x, y }: PixelLine, stroke: string): string {
  if (x.length > fewPoints) return '';
  const dots = [...x].map((at, i) => `M${px(at)} ${px(y[i])}h0`);
  return `<path class="points" d="${dots.join('')}" stroke="${stroke}" stroke-width="4.5" stroke-linecap="round"/>`;
}

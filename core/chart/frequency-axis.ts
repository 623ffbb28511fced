import type { Sweep } from '../sweep.ts';
import type { Frame } from './frame.ts';
import { xAxisSvg } from './frame.ts';
import { type FrequencyUnit, frequencyUnit, linearTicks } from './frequency-scale.ts';

/** The frequency axis of a plot. */
export interface FrequencyAxis {
  readonly lowHz: number;
  readonly highHz: number;
  readonly unit: FrequencyUnit;
  /** Pixels from the left of the chart. */
  readonly x: (hz: number) => number;
}

/** A single frequency gets this much room on either side. */
const roomAroundOne = 0.005;

/** The axis over all that was swept, from edge to edge. */
export function frequencyAxis({ frequencyHz }: Pick<Sweep, 'frequencyHz'>, frame: Frame) {
  return frequencyAxisOver(frequencyHz[0], frequencyHz[frequencyHz.length - 1], frame);
}

/** The axis from one frequency to another. */
export function frequencyAxisOver(first: number, last: number, { plot }: Frame) {
  const room = first === last ? Math.max(1, first * roomAroundOne) : 0;
  const lowHz = first - room;
  const highHz = last + room;
  const perHz = (plot.right - plot.left) / (highHz - lowHz);
  const x = (hz: number) => plot.left + (hz - lowHz) * perHz;
  return { lowHz, highHz, unit: frequencyUnit(highHz), x } satisfies FrequencyAxis;
}

/** Grid, ticks and title of a frequency axis. */
export function frequencyAxisSvg(axis: FrequencyAxis, frame: Frame): string {
  const { plot, sizePx, numbers } = frame;
  const { lowHz, highHz, unit, x } = axis;
  const width = plot.right - plot.left;
  const ticks = linearTicks(lowHz, highHz, width, sizePx * 5.5, unit.hertz, numbers);
  return xAxisSvg(frame, ticks, x, `Frequency (${unit.name})`);
}

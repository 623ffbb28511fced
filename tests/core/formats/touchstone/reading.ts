import type { ReadError, ReadSweep } from '../../../../core/formats/read-types.ts';
import {
  readTouchstone,
  type TouchstoneOptions,
} from '../../../../core/formats/touchstone/read-touchstone.ts';
import type { ComplexSweep } from '../../../../core/sweep.ts';

type Options = Omit<TouchstoneOptions, 'limits'>;

const limits = { maxPoints: 100_001 };

/** What the reader makes of a file that it must take; its sweep is complex. */
export function taken(
  text: string,
  options: Options = {},
): Omit<ReadSweep, 'sweep'> & { readonly sweep: ComplexSweep; readonly codes: readonly string[] } {
  const read = readTouchstone(text, { limits, ...options });
  if (!read.ok) throw new Error(`refused: ${read.error.code}: ${read.error.detail}`);
  const { sweep, ...rest } = read.value;
  if (sweep.phase === 'none') throw new Error('a Touchstone file has a phase');
  return { ...rest, sweep, codes: rest.assumptions.map(({ code }) => code) };
}

/** Why the reader refuses a file. */
export function refused(text: string, options: Options = {}): ReadError {
  const read = readTouchstone(text, { limits, ...options });
  if (read.ok) throw new Error('taken');
  return read.error;
}

/** The points as [hertz, re, im]. */
export function pointsOf({ frequencyHz, reflectionRe, reflectionIm }: ComplexSweep): number[][] {
  return Array.from(frequencyHz, (f, i) => [f, reflectionRe[i], reflectionIm[i]]);
}

/** Resistance and reactance of a point, ohm. */
export function impedanceOf(sweep: ComplexSweep, i = 0): [number, number] {
  const re = sweep.reflectionRe[i];
  const im = sweep.reflectionIm[i];
  const d = (1 - re) ** 2 + im * im;
  const z0 = sweep.referenceOhm;
  return [(z0 * (1 - re * re - im * im)) / d, (2 * z0 * im) / d];
}

/** SWR of a point. */
export function swrOf(sweep: ComplexSweep, i = 0): number {
  const magnitude = Math.hypot(sweep.reflectionRe[i], sweep.reflectionIm[i]);
  return (1 + magnitude) / (1 - magnitude);
}

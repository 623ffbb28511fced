import { studentQuantile } from '../record/statistics/distributions.ts';
import type { ComplexSweep } from '../sweep.ts';
import { parabolaThrough } from './parabola.ts';
import type { ReactanceMagnitudeMinimum } from './summary.ts';

/** Points on either side of a minimum that its shape is taken from. */
const reach = 4;
/** A minimum must rise to so many times its own value on both sides. */
const leastRise = 3;
/** A V leaves so much less than a parabola does, squares for squares. */
const clearlyLess = 0.5;

/**
 * Where |X| is smallest, inside the sweep, with unsigned phase. The sides of a V are made one line by
 * turning one of them over, and its zero is found by least squares; a rounded bottom keeps its
 * lowest point. Minima are told from noise by rising to three times their value on both sides.
 */
export function reactanceMagnitudeMinima(
  sweep: ComplexSweep,
): readonly ReactanceMagnitudeMinimum[] {
  const { frequencyHz, reflectionRe: re, reflectionIm: im, referenceOhm } = sweep;
  const reactance = im.map((x, i) => (2 * referenceOhm * x) / ((1 - re[i]) ** 2 + x * x));
  const minima: ReactanceMagnitudeMinimum[] = [];
  for (const at of clearMinima(reactance)) {
    const zero = vertexOf(frequencyHz, reactance, at);
    const d = (1 - re[at]) ** 2 + im[at] ** 2;
    minima.push({
      frequencyHz: zero?.frequencyHz ?? frequencyHz[at],
      frequencyU95Hz: zero?.u95Hz ?? null,
      reactanceMagnitudeOhm: zero === null ? reactance[at] : 0,
      resistanceOhm: (referenceOhm * (1 - re[at] ** 2 - im[at] ** 2)) / d,
    });
  }
  return minima;
}

/** Lowest points between rises to several times as much, and of those only where both sides rise. */
function clearMinima(values: Float64Array): number[] {
  const places: number[] = [];
  let lowest = 0;
  let highest = 0;
  let isFalling = false;
  for (let i = 1; i < values.length; i++) {
    if (values[i] < values[lowest]) lowest = i;
    if (values[i] > values[highest]) highest = i;
    if (isFalling && values[i] > leastRise * values[lowest]) {
      places.push(lowest);
      isFalling = false;
      highest = i;
    } else if (!isFalling && leastRise * values[i] < values[highest]) {
      isFalling = true;
      lowest = i;
    }
  }
  return places;
}

/** The zero of the line that a V becomes with one side turned over; null where it is no V. */
function vertexOf(
  frequencyHz: Float64Array,
  values: Float64Array,
  at: number,
): { readonly frequencyHz: number; readonly u95Hz: number } | null {
  const from = Math.max(0, at - reach);
  const to = Math.min(values.length - 1, at + reach);
  if (to - from < 4) return null;
  let best: Line | null = null;
  for (const firstPositive of [at, at + 1]) {
    const line = lineThrough(frequencyHz, values, from, to, firstPositive);
    if (best === null || line.squares < best.squares) best = line;
  }
  if (best === null || best.slope <= 0) return null;
  const count = to - from + 1;
  const zeroHz = best.meanHz - best.mean / best.slope;
  const deviation = Math.sqrt(best.squares / (count - 2));
  const rounded = parabolaThrough(values, from, to + 1).squaresLeft;
  const isV = best.squares < clearlyLess * rounded;
  if (!isV || zeroHz < frequencyHz[from] || zeroHz > frequencyHz[to]) return null;
  const spread = Math.sqrt(1 / count + (zeroHz - best.meanHz) ** 2 / best.spreadHz2);
  const u95Hz = (studentQuantile(0.975, count - 2) * deviation * spread) / best.slope;
  return { frequencyHz: zeroHz, u95Hz };
}

interface Line {
  readonly meanHz: number;
  readonly mean: number;
  readonly slope: number;
  readonly spreadHz2: number;
  readonly squares: number;
}

/** Least-squares line through the values, those before a place turned negative. */
function lineThrough(
  frequencyHz: Float64Array,
  values: Float64Array,
  from: number,
  to: number,
  firstPositive: number,
): Line {
  const count = to - from + 1;
  const valueAt = (i: number) => (i < firstPositive ? -values[i] : values[i]);
  let meanHz = 0;
  let mean = 0;
  for (let i = from; i <= to; i++) {
    meanHz += frequencyHz[i] / count;
    mean += valueAt(i) / count;
  }
  let spreadHz2 = 0;
  let product = 0;
  for (let i = from; i <= to; i++) {
    spreadHz2 += (frequencyHz[i] - meanHz) ** 2;
    product += (frequencyHz[i] - meanHz) * (valueAt(i) - mean);
  }
  const slope = product / spreadHz2;
  let squares = 0;
  for (let i = from; i <= to; i++) {
    squares += (valueAt(i) - mean - slope * (frequencyHz[i] - meanHz)) ** 2;
  }
  return { meanHz, mean, slope, spreadHz2, squares };
}

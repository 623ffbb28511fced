import type { Mismatch } from './mismatch.ts';
import type { Scan } from './scan.ts';
import { zeroBetween } from './zero.ts';

/** A place where the mismatch turns, refined below the grid. */
export interface Turn {
  readonly frequencyHz: number;
  readonly frequencyU95Hz: number | null;
  readonly square: number;
  readonly atEdge: boolean;
}

/** Two minima are one unless the rise between them exceeds the noise this many half-widths. */
const distinctBeyond = 1.5;

/**
 * The minima of the mismatch, ascending in frequency: inside the sweep those that the noise does not
 * explain, and an end of the sweep where the mismatch still falls towards it. A flat stretch has its
 * minimum in its middle; a shelf on a slope has none.
 */
export function mismatchMinima(mismatch: Mismatch, scan: Scan): readonly Turn[] {
  const { frequencyHz, square } = scan;
  const candidates = lowPlaces(square).map(([first, last]) =>
    turnAt(mismatch, frequencyHz, square, first, last),
  );
  return withoutNoise(candidates, mismatch, scan);
}

/** The maxima of the mismatch inside the sweep. */
export function mismatchMaxima(mismatch: Mismatch, scan: Scan): readonly Turn[] {
  const { frequencyHz, square } = scan;
  const negative = square.map((value) => -value);
  return lowPlaces(negative)
    .filter(([first, last]) => first > 0 && last < negative.length - 1)
    .map(([first, last]) => turnAt(mismatch, frequencyHz, negative, first, last));
}

/** Squares that differ by no more than this are equal. */
const roundingSquare = 1e-15;

/** Runs of equal values that are lower than what stands on either side; an end counts as higher. */
function lowPlaces(values: Float64Array): [first: number, last: number][] {
  const places: [number, number][] = [];
  let first = 0;
  for (let i = 1; i <= values.length; i++) {
    if (i < values.length && Math.abs(values[i] - values[first]) <= roundingSquare) continue;
    const fallsInto = first === 0 || values[first - 1] > values[first];
    const risesAfter = i === values.length || values[i] > values[first];
    if (fallsInto && risesAfter) places.push([first, i - 1]);
    first = i;
  }
  return places;
}

function turnAt(
  mismatch: Mismatch,
  scan: Float64Array,
  values: Float64Array,
  first: number,
  last: number,
): Turn {
  const end = scan.length - 1;
  const isFlat = first === 0 && last === end;
  if (isFlat || (first > 0 && last < end)) {
    const low = scan[Math.max(0, first - 1)];
    const high = scan[Math.min(end, last + 1)];
    const middle = (scan[first] + scan[last]) / 2;
    const slope = (f: number) => mismatch.at(f).slope;
    const turns = first === last && slope(low) > 0 !== slope(high) > 0;
    return refined(mismatch, turns ? zeroBetween(slope, low, high) : middle);
  }
  return edgeTurn(mismatch, scan, first === 0 ? 0 : end, values);
}

function refined(mismatch: Mismatch, frequencyHz: number): Turn {
  const { square, curvature } = mismatch.at(frequencyHz);
  const slopeU95 = mismatch.slopeU95(frequencyHz);
  const isCurved = curvature !== 0;
  const frequencyU95Hz = slopeU95 === null || !isCurved ? null : slopeU95 / Math.abs(curvature);
  return { frequencyHz, frequencyU95Hz, square, atEdge: false };
}

/** The end of the sweep, unless the model turns just inside of it. */
function edgeTurn(mismatch: Mismatch, scan: Float64Array, at: number, values: Float64Array): Turn {
  const neighbour = at === 0 ? Math.min(1, values.length - 1) : at - 1;
  const slope = (f: number) => mismatch.at(f).slope;
  const inward = slope(scan[at]) * (at === 0 ? 1 : -1);
  if (inward < 0 && neighbour !== at) {
    const [low, high] = at === 0 ? [scan[0], scan[neighbour]] : [scan[neighbour], scan[at]];
    if (slope(low) > 0 !== slope(high) > 0) return refined(mismatch, zeroBetween(slope, low, high));
  }
  const { square } = mismatch.at(scan[at]);
  return { frequencyHz: scan[at], frequencyU95Hz: null, square, atEdge: true };
}

/** Keeps of neighbouring minima only the lower one where the rise between them may be noise. */
function withoutNoise(candidates: readonly Turn[], mismatch: Mismatch, scan: Scan): Turn[] {
  const kept: Turn[] = [];
  for (const candidate of candidates) {
    const before = kept.at(-1);
    if (before === undefined || isDistinct(before, candidate, mismatch, scan)) {
      kept.push(candidate);
    } else if (candidate.square < before.square) {
      kept[kept.length - 1] = candidate;
    }
  }
  return kept;
}

function isDistinct(a: Turn, b: Turn, mismatch: Mismatch, scan: Scan): boolean {
  const { frequencyHz, square } = scan;
  let barrier = 0;
  let barrierHz = a.frequencyHz;
  for (let i = 0; i < square.length; i++) {
    if (frequencyHz[i] <= a.frequencyHz || frequencyHz[i] >= b.frequencyHz) continue;
    if (square[i] > barrier) [barrier, barrierHz] = [square[i], frequencyHz[i]];
  }
  const rise = Math.sqrt(barrier) - Math.sqrt(Math.max(a.square, b.square));
  const noise = Math.max(
    ...[a.frequencyHz, b.frequencyHz, barrierHz].map((f) => mismatch.magnitudeNoiseU95(f) ?? 0),
  );
  return rise > distinctBeyond * noise;
}

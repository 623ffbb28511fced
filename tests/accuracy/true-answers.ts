import { type Complex, type Impedance, reflectionOf } from '../../server/demo/models/lumped.ts';

/** A closed form's impedance against frequency. */
export type ImpedanceCurve = (frequencyHz: number) => Impedance;

export interface TrueResonance {
  readonly frequencyHz: number;
  readonly kind: 'series' | 'parallel';
}

export interface TrueMinimum {
  readonly frequencyHz: number;
  readonly swr: number;
}

/** A frequency at which the SWR passes the limit; `low` where a usable span begins. */
export interface TrueEdge {
  readonly frequencyHz: number;
  readonly maxSwr: number;
  readonly side: 'low' | 'high';
}

/** What the closed form says on a range. Minima at the range's own ends are not listed. */
export interface TrueAnswers {
  readonly resonances: readonly TrueResonance[];
  readonly minima: readonly TrueMinimum[];
  readonly edges: readonly TrueEdge[];
}

const INTERVALS = 4000;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

export function reactanceOf(curve: ImpedanceCurve): (frequencyHz: number) => number {
  return (frequencyHz) => curve(frequencyHz).im;
}

/** |reflection| squared: smooth everywhere, so its minima are well conditioned. */
export function mismatchOf(
  curve: ImpedanceCurve,
  referenceOhm: number,
): (frequencyHz: number) => number {
  return (frequencyHz) => magnitudeSquared(reflectionOf(curve(frequencyHz), referenceOhm));
}

/** |reflection| squared at an SWR. */
export function mismatchAtSwr(swr: number): number {
  return ((swr - 1) / (swr + 1)) ** 2;
}

export function swrAtMismatch(mismatch: number): number {
  const magnitude = Math.sqrt(mismatch);
  return (1 + magnitude) / (1 - magnitude);
}

/**
 * Resonances, interior SWR minima and span edges of a closed form on a range.
 *
 * Bracketed on 4,000 intervals (unless told otherwise) plus every extremum between them (so that two crossings inside one
 * interval are seen), then bisected down to neighbouring doubles. Conditioning: reactance and
 * |reflection|^2 carry a few units of 2^-53 of relative error, their zero crossings move by about
 * 2^-53 f Q/Q, i.e. some 1e-15 f, which is below 1e-9 of the smallest step of the bench. Minima are
 * zeros of a sixth-order central difference of |reflection|^2, whose truncation and rounding stay
 * below 1e-7 of a step (checked against a closed form in the tests).
 */
export function trueAnswers(
  curve: ImpedanceCurve,
  referenceOhm: number,
  lowHz: number,
  highHz: number,
  limits: readonly number[],
  intervals = INTERVALS,
): TrueAnswers {
  const grid = evenly(lowHz, highHz, intervals);
  const impedances = Array.from(grid, (frequencyHz) => curve(frequencyHz));
  const reactance = sampled(
    reactanceOf(curve),
    grid,
    impedances.map((z) => z.im),
  );
  const mismatch = sampled(
    mismatchOf(curve, referenceOhm),
    grid,
    impedances.map((z) => magnitudeSquared(reflectionOf(z, referenceOhm))),
  );
  const difference = (highHz - lowHz) / intervals;
  return {
    resonances: crossings(reactance, 0).map(({ at, rising }) => ({
      frequencyHz: at,
      kind: rising ? 'series' : 'parallel',
    })),
    minima: minimaOf(mismatch, difference),
    edges: limits.flatMap((maxSwr) =>
      crossings(mismatch, mismatchAtSwr(maxSwr)).map(({ at, rising }) => ({
        frequencyHz: at,
        maxSwr,
        side: rising ? ('high' as const) : ('low' as const),
      })),
    ),
  };
}

/** The largest value of |reflection|^2 on a range: at its ends or at a maximum between them. */
export function worstMismatch(
  mismatch: (frequencyHz: number) => number,
  lowHz: number,
  highHz: number,
): number {
  const grid = evenly(lowHz, highHz, 400);
  const coarse = Array.from(grid, (frequencyHz) => mismatch(frequencyHz));
  return sampled(mismatch, grid, coarse).y.reduce((worst, value) => Math.max(worst, value));
}

/** The part of the answers that lies inside a narrower range. */
export function within(answers: TrueAnswers, lowHz: number, highHz: number): TrueAnswers {
  const inside = ({ frequencyHz }: { readonly frequencyHz: number }) =>
    frequencyHz >= lowHz && frequencyHz <= highHz;
  return {
    resonances: answers.resonances.filter(inside),
    minima: answers.minima.filter(inside),
    edges: answers.edges.filter(inside),
  };
}

function evenly(low: number, high: number, intervals: number): Float64Array {
  return Float64Array.from(
    { length: intervals + 1 },
    (_, i) => low + ((high - low) * i) / intervals,
  );
}

function magnitudeSquared({ re, im }: Complex): number {
  return re * re + im * im;
}

interface Sampled {
  readonly of: (x: number) => number;
  readonly x: readonly number[];
  readonly y: readonly number[];
}

/** The function on the grid and at each of its local extrema between grid points. */
function sampled(
  of: (x: number) => number,
  grid: Float64Array,
  coarse: readonly number[],
): Sampled {
  const x = [grid[0]];
  const y = [coarse[0]];
  for (let i = 1; i < grid.length; i++) {
    x.push(grid[i]);
    y.push(coarse[i]);
    if (i + 1 === grid.length) break;
    const bend = Math.sign(coarse[i] - coarse[i - 1]);
    if (bend === 0 || Math.sign(coarse[i + 1] - coarse[i]) === bend) continue;
    const top = goldenExtremum((at) => bend * of(at), grid[i - 1], grid[i + 1]);
    const after = top >= grid[i];
    x.splice(after ? x.length : x.length - 1, 0, top);
    y.splice(after ? y.length : y.length - 1, 0, of(top));
  }
  return { of, x, y };
}

/** Where a function with one maximum on the range is largest, to about 1e-8 of the range. */
function goldenExtremum(of: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  let left = b - GOLDEN * (b - a);
  let right = a + GOLDEN * (b - a);
  let atLeft = of(left);
  let atRight = of(right);
  for (let i = 0; i < 40; i++) {
    if (atLeft > atRight) {
      b = right;
      right = left;
      atRight = atLeft;
      left = b - GOLDEN * (b - a);
      atLeft = of(left);
    } else {
      a = left;
      left = right;
      atLeft = atRight;
      right = a + GOLDEN * (b - a);
      atRight = of(right);
    }
  }
  return (a + b) / 2;
}

function crossings({ of, x, y }: Sampled, level: number): { at: number; rising: boolean }[] {
  const found: { at: number; rising: boolean }[] = [];
  for (let i = 1; i < x.length; i++) {
    const below = y[i - 1] < level;
    if (below === y[i] < level) continue;
    found.push({ at: bisect((at) => of(at) - level, x[i - 1], x[i]), rising: below });
  }
  return found;
}

function minimaOf({ of, x, y }: Sampled, difference: number): TrueMinimum[] {
  const slope = slopeOf(of, difference);
  const minima: TrueMinimum[] = [];
  for (let i = 1; i + 1 < x.length; i++) {
    if (!(y[i] < y[i - 1] && y[i] <= y[i + 1])) continue;
    const at = bisect(slope, x[i - 1], x[i + 1]);
    minima.push({ frequencyHz: at, swr: swrAtMismatch(of(at)) });
  }
  return minima;
}

/** Sixth-order central first difference, up to its positive factor (B. Fornberg, Math. Comp. 51, 1988). */
export function slopeOf(of: (x: number) => number, h: number): (x: number) => number {
  return (x) =>
    45 * (of(x + h) - of(x - h)) -
    9 * (of(x + 2 * h) - of(x - 2 * h)) +
    of(x + 3 * h) -
    of(x - 3 * h);
}

/** The sign change of a function between two arguments, down to neighbouring doubles. */
export function bisect(of: (x: number) => number, low: number, high: number): number {
  const lowNegative = of(low) < 0;
  let a = low;
  let b = high;
  for (;;) {
    const middle = a + (b - a) / 2;
    if (middle <= a || middle >= b) return middle;
    if (of(middle) < 0 === lowNegative) a = middle;
    else b = middle;
  }
}

/**
 * The sign change nearest to a guess, looked for outwards in steps up to the reach; null without one.
 */
export function rootNear(
  of: (x: number) => number,
  guess: number,
  step: number,
  reach: number,
): number | null {
  const atGuess = of(guess);
  if (atGuess === 0) return guess;
  const sign = Math.sign(atGuess);
  for (let inner = 0, outer = step; inner < reach; inner = outer, outer *= 1.6) {
    const above = Math.sign(of(guess + outer)) !== sign;
    const below = Math.sign(of(guess - outer)) !== sign;
    if (!above && !below) continue;
    const up = above ? bisect(of, guess + inner, guess + outer) : Number.POSITIVE_INFINITY;
    const down = below ? bisect(of, guess - outer, guess - inner) : Number.NEGATIVE_INFINITY;
    return up - guess < guess - down ? up : down;
  }
  return null;
}

import { choleskyFactor, choleskySolve } from './cholesky.ts';
import { type Moments, momentsFor, normalMatrix, sumMoments } from './normal-equations.ts';
import {
  evenTerms,
  type FrequencyScale,
  oddTerms,
  type RationalForm,
  type Series,
} from './rational-basis.ts';
import type { WeightedSamples } from './samples.ts';

/** A rational function of frequency, N/D of one degree and form, fitted to samples. */
export interface RationalFit {
  readonly form: RationalForm;
  readonly degree: number;
  readonly scale: FrequencyScale;
  readonly numerator: Series;
  readonly denominator: Series;
  /**
   * Place among the denominator's coefficients, even before odd, of the one that stands still; the
   * others and the numerator's are the unknowns.
   */
  readonly still: number;
  /** Triangle of the unknowns' covariance for unit noise; null if it is not known. */
  readonly triangle: Float64Array | null;
  /** Weighted sum of the squared residuals. */
  readonly squares: number;
}

const linearSteps = 2;
const newtonSteps = 12;
const halvings = 3;
const settledBelow = 1e-6;
/** Later steps are not hoped to gain more than so many times what the last one did. */
const hopefulGains = 4;
/** Weighted mean square below which residuals are rounding of the arithmetic. */
const roundingSquare = 1e-30;

interface Quotient {
  readonly numerator: Series;
  readonly denominator: Series;
}

/** What a fit works on. */
interface Task {
  readonly samples: WeightedSamples;
  readonly form: RationalForm;
  readonly degree: number;
  readonly even: number;
  readonly odd: number;
}

/**
 * Fits by the iteration of C. K. Sanathanan and J. Koerner (IEEE Trans. Automatic Control 8(1),
 * 1963) and then by Gauss–Newton steps on the true residual, so that the answer is the least-squares
 * one and its covariance is known. Needs at least as many numbers as unknowns; null where it
 * degenerates. `weightedBy`: a denominator to begin the iteration with. `squaresWanted`: a fit that
 * will not come down to this is given up early, with more squares than it could have.
 */
export function fitRational(
  samples: WeightedSamples,
  form: RationalForm,
  degree: number,
  weightedBy: Series | null = null,
  squaresWanted = Number.POSITIVE_INFINITY,
): RationalFit | null {
  const even = evenTerms(form, degree);
  const odd = oddTerms(form, degree);
  const task: Task = { samples, form, degree, even, odd };
  const start = linearStart(task, weightedBy);
  return start === null ? null : polish(task, start, squaresWanted);
}

/** The Sanathanan–Koerner iterate of least residual. */
function linearStart(task: Task, weightedBy: Series | null): Quotient | null {
  let here: Quotient = {
    numerator: { even: new Float64Array(1), odd: new Float64Array(0) },
    denominator: weightedBy ?? { even: Float64Array.of(1), odd: new Float64Array(0) },
  };
  let best: Quotient | null = null;
  let leastSquares = Number.POSITIVE_INFINITY;
  const count = momentsFor(task.form, task.degree);
  for (let i = 0; i <= linearSteps; i++) {
    const moments = sumMoments(task.samples, here.numerator, here.denominator, count, true);
    if (i > 0) {
      if (!(moments.squares < leastSquares * (1 - settledBelow))) break;
      best = here;
      leastSquares = moments.squares;
    }
    if (i < linearSteps) here = normalised(linearStep(task, moments, here.denominator));
  }
  return best;
}

/** Solves (N - sample D)/D' = 0 with D' the denominator before, whose largest coefficient stays. */
function linearStep(task: Task, moments: Moments, before: Series): Quotient {
  const { even, odd } = task;
  const still = largest(before, even);
  const matrix = normalMatrix(moments, even, odd);
  const size = 2 * (even + odd);
  const column = (even + odd + still) * size;
  const rightHand = matrix.slice(column, column + size).map((value) => -value);
  return solved(task, matrix, rightHand, still, 1);
}

/** Solves the normal equations for all unknowns but the one that stands still. */
function solved(
  { even, odd }: Task,
  matrix: Float64Array,
  rightHand: Float64Array,
  still: number,
  held: number,
): Quotient {
  const all = 2 * (even + odd);
  const left = even + odd + still;
  const factor = choleskyFactor(without(matrix, all, left), all - 1);
  const x = choleskySolve(factor, withoutOne(rightHand, left));
  const full = new Float64Array(all);
  full.set(x.subarray(0, left));
  full[left] = held;
  full.set(x.subarray(left), left + 1);
  return {
    numerator: { even: full.slice(0, even), odd: full.slice(even, even + odd) },
    denominator: {
      even: full.slice(even + odd, 2 * even + odd),
      odd: full.slice(2 * even + odd),
    },
  };
}

function withoutOne(vector: Float64Array, left: number): Float64Array {
  const rest = new Float64Array(vector.length - 1);
  rest.set(vector.subarray(0, left));
  rest.set(vector.subarray(left + 1), left);
  return rest;
}

/** The matrix without one row and column. */
function without(matrix: Float64Array, size: number, left: number): Float64Array {
  const rest = new Float64Array((size - 1) ** 2);
  for (let j = 0; j < size; j++) {
    if (j === left) continue;
    const into = (j < left ? j : j - 1) * (size - 1);
    rest.set(withoutOne(matrix.subarray(j * size, (j + 1) * size), left), into);
  }
  return rest;
}

/** Place of the largest coefficient, even before odd. */
function largest({ even, odd }: Series, evenCount: number): number {
  let at = 0;
  let size = 0;
  for (let k = 0; k < even.length; k++) {
    if (Math.abs(even[k]) > size) [at, size] = [k, Math.abs(even[k])];
  }
  for (let k = 0; k < odd.length; k++) {
    if (Math.abs(odd[k]) > size) [at, size] = [evenCount + k, Math.abs(odd[k])];
  }
  return at;
}

/** The same quotient with the largest coefficient of its denominator 1 or -1. */
function normalised({ numerator, denominator }: Quotient): Quotient {
  const { even, odd } = denominator;
  const at = largest(denominator, even.length);
  const size = Math.abs(at < even.length ? even[at] : odd[at - even.length]);
  const scaled = (series: Series): Series => ({
    even: series.even.map((c) => c / size),
    odd: series.odd.map((c) => c / size),
  });
  return { numerator: scaled(numerator), denominator: scaled(denominator) };
}

/** Gauss–Newton steps while they help; one that does not is halved a few times and then given up. */
function polish(task: Task, start: Quotient, squaresWanted: number): RationalFit | null {
  const { samples, form, degree, even, odd } = task;
  const count = momentsFor(form, degree);
  const at = ({ numerator, denominator }: Quotient) =>
    sumMoments(samples, numerator, denominator, count, false);
  let here = start;
  let moments = at(here);
  for (let i = 0; i < newtonSteps; i++) {
    const step = newtonStep(task, moments, here.denominator);
    let there: Quotient | null = null;
    let next = moments;
    for (let part = 1, tries = 0; tries <= halvings; part /= 2, tries++) {
      there = moved(here, step, part);
      next = at(there);
      if (next.squares < moments.squares) break;
      there = null;
    }
    if (there === null) break;
    const gain = moments.squares - next.squares;
    here = there;
    moments = next;
    if (gain < settledBelow * moments.squares || moments.squares < roundingSquare) break;
    if (moments.squares - hopefulGains * gain > squaresWanted) break;
  }
  if (!Number.isFinite(moments.squares)) return null;
  const still = largest(here.denominator, even);
  const matrix = normalMatrix(moments, even, odd);
  const size = 2 * (even + odd);
  const { triangle } = choleskyFactor(without(matrix, size, even + odd + still), size - 1);
  const { numerator, denominator } = here;
  const { scale } = samples;
  const { squares } = moments;
  return { form, degree, scale, numerator, denominator, still, triangle, squares };
}

function newtonStep(task: Task, moments: Moments, denominator: Series): Quotient {
  const { even, odd } = task;
  const still = largest(denominator, even);
  const terms = moments.gradient.length / 4;
  const rightHand = new Float64Array(2 * (even + odd));
  let at = 0;
  [even, odd, even, odd].forEach((length, kind) => {
    rightHand.set(moments.gradient.subarray(kind * terms, kind * terms + length), at);
    at += length;
  });
  return solved(task, normalMatrix(moments, even, odd), rightHand, still, 0);
}

function moved(from: Quotient, step: Quotient, part: number): Quotient {
  const sum = (a: Series, b: Series): Series => ({
    even: a.even.map((c, k) => c + part * b.even[k]),
    odd: a.odd.map((c, k) => c + part * b.odd[k]),
  });
  return normalised({
    numerator: sum(from.numerator, step.numerator),
    denominator: sum(from.denominator, step.denominator),
  });
}

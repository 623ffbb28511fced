import { complexColumns, type LeastSquares, solveLeastSquares } from './complex-least-squares.ts';

/**
 * A rational function of frequency, fitted to complex samples: P(x)/Q(x) with both of degree
 * `order` in Chebyshev polynomials of x = (f - centre)/half, and Q's constant term 1.
 */
export interface RationalFit {
  readonly order: number;
  readonly centreHz: number;
  readonly halfHz: number;
  readonly numeratorRe: Float64Array;
  readonly numeratorIm: Float64Array;
  readonly denominatorRe: Float64Array;
  readonly denominatorIm: Float64Array;
  /** Factor of the unknowns' covariance for unit noise per component; null if not to be had. */
  readonly factor: LeastSquares | null;
  /** Sum of the squared residuals, both components. */
  readonly squares: number;
  /** Residuals, model less sample. */
  readonly residualRe: Float64Array;
  readonly residualIm: Float64Array;
}

export interface Samples {
  readonly frequencyHz: Float64Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Number of complex unknowns of a fit of some order. */
export function unknownsOf(order: number): number {
  return 2 * order + 1;
}

const iterationsToLinearise = 4;
const newtonSteps = 4;
const settledBelow = 1e-9;

/**
 * Fits by the iteration of C. K. Sanathanan and J. Koerner (IEEE Trans. Automatic Control 8(1),
 * 1963) and then by Gauss–Newton steps on the true residual, so that the answer is the least-squares
 * one and its covariance is known. Needs at least 2 order + 1 samples; null where it degenerates.
 */
export function fitRational(samples: Samples, order: number): RationalFit | null {
  const { frequencyHz } = samples;
  const last = frequencyHz[frequencyHz.length - 1];
  const centreHz = (frequencyHz[0] + last) / 2;
  const halfHz = (last - frequencyHz[0]) / 2 || 1;
  const basis = chebyshevColumns(frequencyHz, order, centreHz, halfHz);
  let unknowns: Unknowns | null = null;
  for (let i = 0; i < iterationsToLinearise; i++) {
    const next = linearisedStep(samples, basis, order, unknowns);
    if (next === null) return null;
    unknowns = next;
  }
  if (unknowns === null) return null;
  return polish(samples, basis, order, unknowns, centreHz, halfHz);
}

interface Unknowns {
  readonly numeratorRe: Float64Array;
  readonly numeratorIm: Float64Array;
  readonly denominatorRe: Float64Array;
  readonly denominatorIm: Float64Array;
}

/** T_k(x) of every sample, k after k. */
function chebyshevColumns(
  frequencyHz: Float64Array,
  order: number,
  centreHz: number,
  halfHz: number,
): Float64Array {
  const rows = frequencyHz.length;
  const basis = new Float64Array(rows * (order + 1));
  for (let i = 0; i < rows; i++) {
    const x = (frequencyHz[i] - centreHz) / halfHz;
    basis[i] = 1;
    if (order > 0) basis[rows + i] = x;
    for (let k = 2; k <= order; k++) {
      basis[k * rows + i] = 2 * x * basis[(k - 1) * rows + i] - basis[(k - 2) * rows + i];
    }
  }
  return basis;
}

/** Solves P - sample Q = 0, weighted by the denominator before. */
function linearisedStep(
  { re, im }: Samples,
  basis: Float64Array,
  order: number,
  before: Unknowns | null,
): Unknowns | null {
  const rows = re.length;
  const matrix = complexColumns(rows, unknownsOf(order));
  const rhs = complexColumns(rows, 1);
  for (let i = 0; i < rows; i++) {
    const weight = before === null ? 1 : 1 / modulusAt(basis, rows, i, before);
    if (!Number.isFinite(weight)) return null;
    for (let k = 0; k <= order; k++) matrix.re[k * rows + i] = weight * basis[k * rows + i];
    for (let k = 1; k <= order; k++) {
      const t = weight * basis[k * rows + i];
      matrix.re[(order + k) * rows + i] = -re[i] * t;
      matrix.im[(order + k) * rows + i] = -im[i] * t;
    }
    rhs.re[i] = weight * re[i];
    rhs.im[i] = weight * im[i];
  }
  const solved = solveLeastSquares(matrix, rhs);
  return solved === null ? null : split(solved, order);
}

function split({ re, im }: LeastSquares, order: number): Unknowns {
  const denominatorRe = new Float64Array(order + 1);
  const denominatorIm = new Float64Array(order + 1);
  denominatorRe[0] = 1;
  denominatorRe.set(re.subarray(order + 1), 1);
  denominatorIm.set(im.subarray(order + 1), 1);
  return {
    numeratorRe: re.slice(0, order + 1),
    numeratorIm: im.slice(0, order + 1),
    denominatorRe,
    denominatorIm,
  };
}

function modulusAt(basis: Float64Array, rows: number, i: number, unknowns: Unknowns): number {
  const { denominatorRe, denominatorIm } = unknowns;
  let qr = 0;
  let qi = 0;
  for (let k = 0; k < denominatorRe.length; k++) {
    qr += denominatorRe[k] * basis[k * rows + i];
    qi += denominatorIm[k] * basis[k * rows + i];
  }
  return Math.sqrt(qr * qr + qi * qi);
}

interface Linearised {
  readonly residualRe: Float64Array;
  readonly residualIm: Float64Array;
  readonly squares: number;
  /** Solution of the Gauss–Newton equations for the step, with the factor of the covariance. */
  readonly step: LeastSquares | null;
}

/** Residuals at the unknowns, and the next step from there. */
function linearise(
  samples: Samples,
  basis: Float64Array,
  order: number,
  unknowns: Unknowns,
): Linearised {
  const rows = samples.re.length;
  const { numeratorRe, numeratorIm, denominatorRe, denominatorIm } = unknowns;
  const matrix = complexColumns(rows, unknownsOf(order));
  const residualRe = new Float64Array(rows);
  const residualIm = new Float64Array(rows);
  let squares = 0;
  for (let i = 0; i < rows; i++) {
    let pr = 0;
    let pi = 0;
    let qr = 0;
    let qi = 0;
    for (let k = 0; k <= order; k++) {
      const t = basis[k * rows + i];
      pr += numeratorRe[k] * t;
      pi += numeratorIm[k] * t;
      qr += denominatorRe[k] * t;
      qi += denominatorIm[k] * t;
    }
    const q2 = qr * qr + qi * qi;
    const inverseRe = qr / q2;
    const inverseIm = -qi / q2;
    const mr = pr * inverseRe - pi * inverseIm;
    const mi = pr * inverseIm + pi * inverseRe;
    const slopeRe = -(mr * inverseRe - mi * inverseIm);
    const slopeIm = -(mr * inverseIm + mi * inverseRe);
    for (let k = 0; k <= order; k++) {
      const t = basis[k * rows + i];
      matrix.re[k * rows + i] = t * inverseRe;
      matrix.im[k * rows + i] = t * inverseIm;
      if (k === 0) continue;
      matrix.re[(order + k) * rows + i] = t * slopeRe;
      matrix.im[(order + k) * rows + i] = t * slopeIm;
    }
    residualRe[i] = mr - samples.re[i];
    residualIm[i] = mi - samples.im[i];
    squares += residualRe[i] ** 2 + residualIm[i] ** 2;
  }
  const rhs = { rows, columns: 1, re: residualRe.slice(), im: residualIm.slice() };
  return { residualRe, residualIm, squares, step: solveLeastSquares(matrix, rhs) };
}

/** Gauss–Newton steps while they help; a step that does not is halved once and then given up. */
function polish(
  samples: Samples,
  basis: Float64Array,
  order: number,
  start: Unknowns,
  centreHz: number,
  halfHz: number,
): RationalFit | null {
  let unknowns = start;
  let here = linearise(samples, basis, order, unknowns);
  for (let i = 0; i < newtonSteps && here.step !== null; i++) {
    const full = moved(unknowns, here.step, order, 1);
    const there = linearise(samples, basis, order, full);
    if (there.squares < here.squares) {
      const gain = 1 - there.squares / here.squares;
      unknowns = full;
      here = there;
      if (gain < settledBelow) break;
      continue;
    }
    const half = moved(unknowns, here.step, order, 0.5);
    const halfWay = linearise(samples, basis, order, half);
    if (!(halfWay.squares < here.squares)) break;
    unknowns = half;
    here = halfWay;
  }
  if (!Number.isFinite(here.squares)) return null;
  const { residualRe, residualIm, squares, step } = here;
  return { order, centreHz, halfHz, ...unknowns, factor: step, squares, residualRe, residualIm };
}

function moved(from: Unknowns, step: LeastSquares, order: number, part: number): Unknowns {
  const numeratorRe = from.numeratorRe.slice();
  const numeratorIm = from.numeratorIm.slice();
  const denominatorRe = from.denominatorRe.slice();
  const denominatorIm = from.denominatorIm.slice();
  for (let k = 0; k <= order; k++) {
    numeratorRe[k] -= part * step.re[k];
    numeratorIm[k] -= part * step.im[k];
    if (k === 0) continue;
    denominatorRe[k] -= part * step.re[order + k];
    denominatorIm[k] -= part * step.im[order + k];
  }
  return { numeratorRe, numeratorIm, denominatorRe, denominatorIm };
}

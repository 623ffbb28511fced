import type { RationalFit } from './rational-fit.ts';

/** A fitted function at one frequency, with its derivatives by frequency (per hertz). */
export interface RationalValue {
  readonly re: number;
  readonly im: number;
  readonly slopeRe: number;
  readonly slopeIm: number;
  readonly curvatureRe: number;
  readonly curvatureIm: number;
}

/** T_k, T_k' and T_k'' at x for k = 0 … order. */
function chebyshevAt(x: number, order: number): [Float64Array, Float64Array, Float64Array] {
  const t = new Float64Array(order + 1);
  const first = new Float64Array(order + 1);
  const second = new Float64Array(order + 1);
  t[0] = 1;
  if (order > 0) {
    t[1] = x;
    first[1] = 1;
  }
  for (let k = 2; k <= order; k++) {
    t[k] = 2 * x * t[k - 1] - t[k - 2];
    first[k] = 2 * t[k - 1] + 2 * x * first[k - 1] - first[k - 2];
    second[k] = 4 * first[k - 1] + 2 * x * second[k - 1] - second[k - 2];
  }
  return [t, first, second];
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k++) sum += a[k] * b[k];
  return sum;
}

/** Value, slope and curvature of the fit at a frequency: the quotient rule, twice. */
export function valueAt(fit: RationalFit, frequencyHz: number): RationalValue {
  const { order, centreHz, halfHz, numeratorRe, numeratorIm, denominatorRe, denominatorIm } = fit;
  const x = (frequencyHz - centreHz) / halfHz;
  const [t, first, second] = chebyshevAt(x, order);
  const qr = dot(denominatorRe, t);
  const qi = dot(denominatorIm, t);
  const q2 = qr * qr + qi * qi;
  const divided = (re: number, im: number): [number, number] => [
    (re * qr + im * qi) / q2,
    (im * qr - re * qi) / q2,
  ];
  const q1r = dot(denominatorRe, first);
  const q1i = dot(denominatorIm, first);
  const [re, im] = divided(dot(numeratorRe, t), dot(numeratorIm, t));
  const [slopeRe, slopeIm] = divided(
    dot(numeratorRe, first) - (re * q1r - im * q1i),
    dot(numeratorIm, first) - (re * q1i + im * q1r),
  );
  const q2r = dot(denominatorRe, second);
  const q2i = dot(denominatorIm, second);
  const [bendRe, bendIm] = divided(
    dot(numeratorRe, second) - 2 * (slopeRe * q1r - slopeIm * q1i) - (re * q2r - im * q2i),
    dot(numeratorIm, second) - 2 * (slopeRe * q1i + slopeIm * q1r) - (re * q2i + im * q2r),
  );
  const scale = 1 / halfHz;
  return {
    re,
    im,
    slopeRe: slopeRe * scale,
    slopeIm: slopeIm * scale,
    curvatureRe: bendRe * scale * scale,
    curvatureIm: bendIm * scale * scale,
  };
}

/** Weights of a functional: the real part of (value · a + slope · b), complex a and b. */
export interface Functional {
  readonly valueRe: number;
  readonly valueIm: number;
  readonly slopeRe: number;
  readonly slopeIm: number;
}

/**
 * Standard deviation of a functional of the fit at a frequency, for unit noise per component (first
 * order). NaN where the fit knows no covariance.
 */
export function spreadAt(
  fit: RationalFit,
  frequencyHz: number,
  value: RationalValue,
  functional: Functional,
): number {
  const { order, centreHz, halfHz, denominatorRe, denominatorIm, factor } = fit;
  if (factor === null) return Number.NaN;
  const x = (frequencyHz - centreHz) / halfHz;
  const [t, first] = chebyshevAt(x, order);
  const qr = dot(denominatorRe, t);
  const qi = dot(denominatorIm, t);
  const q1r = dot(denominatorRe, first) / halfHz;
  const q1i = dot(denominatorIm, first) / halfHz;
  const q2 = qr * qr + qi * qi;
  const ir = qr / q2;
  const ii = -qi / q2;
  // (T/Q)' = T'/Q - T Q'/Q².
  const gr = -(q1r * (ir * ir - ii * ii) - q1i * 2 * ir * ii);
  const gi = -(q1r * 2 * ir * ii + q1i * (ir * ir - ii * ii));
  const size = 2 * order + 1;
  const rowRe = new Float64Array(size);
  const rowIm = new Float64Array(size);
  const { valueRe: ar, valueIm: ai, slopeRe: br, slopeIm: bi } = functional;
  for (let k = 0; k <= order; k++) {
    const nr = t[k] * ir;
    const ni = t[k] * ii;
    const dr = (first[k] / halfHz) * ir + t[k] * gr;
    const di = (first[k] / halfHz) * ii + t[k] * gi;
    rowRe[k] = ar * nr - ai * ni + br * dr - bi * di;
    rowIm[k] = ar * ni + ai * nr + br * di + bi * dr;
    if (k === 0) continue;
    // Denominator unknowns: minus the value times the numerator's column, and its slope.
    const vr = -(value.re * nr - value.im * ni);
    const vi = -(value.re * ni + value.im * nr);
    const sr = -(value.slopeRe * nr - value.slopeIm * ni + value.re * dr - value.im * di);
    const si = -(value.slopeRe * ni + value.slopeIm * nr + value.re * di + value.im * dr);
    rowRe[order + k] = ar * vr - ai * vi + br * sr - bi * si;
    rowIm[order + k] = ar * vi + ai * vr + br * si + bi * sr;
  }
  return lengthThrough(rowRe, rowIm, factor.inverseRe, factor.inverseIm);
}

/** Length of row · inverse, the inverse triangular and stored column after column. */
function lengthThrough(
  rowRe: Float64Array,
  rowIm: Float64Array,
  inverseRe: Float64Array,
  inverseIm: Float64Array,
): number {
  const size = rowRe.length;
  let squares = 0;
  for (let column = 0; column < size; column++) {
    let sumRe = 0;
    let sumIm = 0;
    for (let k = 0; k <= column; k++) {
      const vr = inverseRe[column * size + k];
      const vi = inverseIm[column * size + k];
      sumRe += rowRe[k] * vr - rowIm[k] * vi;
      sumIm += rowRe[k] * vi + rowIm[k] * vr;
    }
    squares += sumRe * sumRe + sumIm * sumIm;
  }
  return Math.sqrt(squares);
}

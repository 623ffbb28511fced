import { deviationOf } from './cholesky.ts';
import { type Series, scaledSquare, unknownsOf } from './rational-basis.ts';
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

/** A complex number with its first two derivatives by frequency. */
interface Jet {
  re: number;
  im: number;
  slopeRe: number;
  slopeIm: number;
  curvatureRe: number;
  curvatureIm: number;
}

/** Value, slope and curvature of one series. */
function seriesAt(fit: RationalFit, { even, odd }: Series, frequencyHz: number): Jet {
  const { scale } = fit;
  const w = frequencyHz / scale.centreHz;
  const y = scaledSquare(scale, frequencyHz);
  let [t, t1, t2] = [1, 0, 0];
  let [before, before1, before2] = [y, 1, 0];
  let [e, e1, e2, o, o1, o2] = [0, 0, 0, 0, 0, 0];
  for (let k = 0; k < even.length; k++) {
    e += even[k] * t;
    e1 += even[k] * t1;
    e2 += even[k] * t2;
    if (k < odd.length) {
      o += odd[k] * t;
      o1 += odd[k] * t1;
      o2 += odd[k] * t2;
    }
    const next = 2 * y * t - before;
    const next1 = 2 * t + 2 * y * t1 - before1;
    const next2 = 4 * t1 + 2 * y * t2 - before2;
    [before, before1, before2, t, t1, t2] = [t, t1, t2, next, next1, next2];
  }
  // By the chain rule: dy/dw = 2w/half.
  const g = (2 * w) / scale.half;
  const h = 2 / scale.half;
  const per = 1 / scale.centreHz;
  const os = o1 * g;
  return {
    re: e,
    im: w * o,
    slopeRe: per * e1 * g,
    slopeIm: per * (o + w * os),
    curvatureRe: per * per * (e2 * g * g + e1 * h),
    curvatureIm: per * per * (2 * os + w * (o2 * g * g + o1 * h)),
  };
}

/** Value, slope and curvature of the fit at a frequency: the quotient rule, twice. */
export function fitValueAt(fit: RationalFit, frequencyHz: number): RationalValue {
  const n = seriesAt(fit, fit.numerator, frequencyHz);
  const d = seriesAt(fit, fit.denominator, frequencyHz);
  const d2 = d.re * d.re + d.im * d.im;
  const ir = d.re / d2;
  const ii = -d.im / d2;
  const re = n.re * ir - n.im * ii;
  const im = n.re * ii + n.im * ir;
  const ar = n.slopeRe - (re * d.slopeRe - im * d.slopeIm);
  const ai = n.slopeIm - (re * d.slopeIm + im * d.slopeRe);
  const slopeRe = ar * ir - ai * ii;
  const slopeIm = ar * ii + ai * ir;
  const br =
    n.curvatureRe -
    2 * (slopeRe * d.slopeRe - slopeIm * d.slopeIm) -
    (re * d.curvatureRe - im * d.curvatureIm);
  const bi =
    n.curvatureIm -
    2 * (slopeRe * d.slopeIm + slopeIm * d.slopeRe) -
    (re * d.curvatureIm + im * d.curvatureRe);
  const curvatureRe = br * ir - bi * ii;
  const curvatureIm = br * ii + bi * ir;
  return { re, im, slopeRe, slopeIm, curvatureRe, curvatureIm };
}

/** Adds a share of the fit's values at a stretch of frequencies. */
export function addFitValues(
  { scale, numerator, denominator }: RationalFit,
  share: number,
  frequencyHz: Float64Array,
  re: Float64Array,
  im: Float64Array,
  from: number,
  to: number,
): void {
  for (let i = from; i < to; i++) {
    const w = frequencyHz[i] / scale.centreHz;
    const y = scaledSquare(scale, frequencyHz[i]);
    const nr = seriesSum(numerator.even, y);
    const ni = w * seriesSum(numerator.odd, y);
    const dr = seriesSum(denominator.even, y);
    const di = w * seriesSum(denominator.odd, y);
    const part = share / (dr * dr + di * di);
    re[i] += part * (nr * dr + ni * di);
    im[i] += part * (ni * dr - nr * di);
  }
}

/** Sum of Chebyshev polynomials (C. W. Clenshaw, Mathematics of Computation 9, 1955). */
function seriesSum(coefficients: Float64Array, y: number): number {
  let [b, after] = [0, 0];
  for (let k = coefficients.length - 1; k > 0; k--) {
    [b, after] = [2 * y * b - after + coefficients[k], b];
  }
  return coefficients.length === 0 ? 0 : y * b - after + coefficients[0];
}

/** Weights of a functional: the real part of (value · a + slope · b), complex a and b. */
export interface Functional {
  readonly valueRe: number;
  readonly valueIm: number;
  readonly slopeRe: number;
  readonly slopeIm: number;
}

/** What a functional makes of a value. */
export function functionalOf(value: RationalValue, functional: Functional): number {
  return (
    value.re * functional.valueRe -
    value.im * functional.valueIm +
    value.slopeRe * functional.slopeRe -
    value.slopeIm * functional.slopeIm
  );
}

/**
 * Standard deviation of a functional of the fit at a frequency, for unit noise of each number (first
 * order). NaN where the fit knows no covariance.
 */
export function spreadAt(
  fit: RationalFit,
  frequencyHz: number,
  value: RationalValue,
  functional: Functional,
): number {
  const { degree, denominator, still, triangle } = fit;
  if (triangle === null) return Number.NaN;
  const d = seriesAt(fit, denominator, frequencyHz);
  const d2 = d.re * d.re + d.im * d.im;
  const ir = d.re / d2;
  const ii = -d.im / d2;
  // (term/D)' = term'/D - term D'/D².
  const gr = -(d.slopeRe * (ir * ir - ii * ii) - d.slopeIm * 2 * ir * ii);
  const gi = -(d.slopeRe * 2 * ir * ii + d.slopeIm * (ir * ir - ii * ii));
  const gradient = new Float64Array(unknownsOf(degree));
  const { valueRe: ar, valueIm: ai, slopeRe: br, slopeIm: bi } = functional;
  const { re, im, slopeRe, slopeIm } = value;
  const { even, odd } = denominator;
  const terms = termsAt(fit, frequencyHz);
  let free = even.length + odd.length;
  for (let k = 0; k < even.length + odd.length; k++) {
    const [tr, ti, ur, ui] = terms.subarray(4 * k, 4 * k + 4);
    const nr = tr * ir - ti * ii;
    const ni = tr * ii + ti * ir;
    const sr = ur * ir - ui * ii + tr * gr - ti * gi;
    const si = ur * ii + ui * ir + tr * gi + ti * gr;
    gradient[k] = ar * nr - ai * ni + br * sr - bi * si;
    if (k === still) continue;
    const vr = re * nr - im * ni;
    const vi = re * ni + im * nr;
    const wr = slopeRe * nr - slopeIm * ni + re * sr - im * si;
    const wi = slopeRe * ni + slopeIm * nr + re * si + im * sr;
    gradient[free] = -(ar * vr - ai * vi + br * wr - bi * wi);
    free += 1;
  }
  return deviationOf(triangle, gradient);
}

/** Real and imaginary part of each term, even before odd, and of its slope per hertz: four numbers. */
function termsAt({ denominator, scale }: RationalFit, frequencyHz: number): Float64Array {
  const even = denominator.even.length;
  const odd = denominator.odd.length;
  const w = frequencyHz / scale.centreHz;
  const y = scaledSquare(scale, frequencyHz);
  const g = (2 * w) / scale.half;
  const per = 1 / scale.centreHz;
  const terms = new Float64Array(4 * (even + odd));
  let [t, t1, before, before1] = [1, 0, y, 1];
  for (let k = 0; k < even; k++) {
    terms[4 * k] = t;
    terms[4 * k + 2] = per * t1 * g;
    if (k < odd) {
      terms[4 * (even + k) + 1] = w * t;
      terms[4 * (even + k) + 3] = per * (t + w * t1 * g);
    }
    [before, before1, t, t1] = [t, t1, 2 * y * t - before, 2 * t + 2 * y * t1 - before1];
  }
  return terms;
}

/**
 * Largest |D'/D| at some frequencies and midway between them, times a step: about the step over the
 * distance of the nearest pole from the real frequencies.
 */
export function sharpestPole(fit: RationalFit, frequencyHz: Float64Array, stepHz: number): number {
  let sharpest = 0;
  for (let i = 1; i < frequencyHz.length; i++) {
    for (const f of [frequencyHz[i], 0.5 * (frequencyHz[i] + frequencyHz[i - 1])]) {
      const d = seriesAt(fit, fit.denominator, f);
      const square = (d.slopeRe ** 2 + d.slopeIm ** 2) / (d.re ** 2 + d.im ** 2);
      sharpest = Math.max(sharpest, square);
    }
  }
  return Math.sqrt(sharpest) * stepHz;
}

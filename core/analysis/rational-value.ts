import { deviationOf } from './least-squares.ts';
import { polynomialsOf, scaledSquare } from './rational-basis.ts';
import { type RationalFit, unknownsOf } from './rational-fit.ts';

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

/** Value, slope and curvature of one series of terms. */
function seriesAt(fit: RationalFit, coefficients: Float64Array, frequencyHz: number): Jet {
  const { form, scale } = fit;
  const w = frequencyHz / scale.centreHz;
  const y = scaledSquare(scale, frequencyHz);
  const stride = form === 'square' ? 1 : 2;
  let [t, t1, t2] = [1, 0, 0];
  let [before, before1, before2] = [y, 1, 0];
  let [e, e1, e2, o, o1, o2] = [0, 0, 0, 0, 0, 0];
  for (let k = 0; k < coefficients.length; k += stride) {
    const even = coefficients[k];
    e += even * t;
    e1 += even * t1;
    e2 += even * t2;
    if (stride === 2 && k + 1 < coefficients.length) {
      const odd = coefficients[k + 1];
      o += odd * t;
      o1 += odd * t1;
      o2 += odd * t2;
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
  const terms = termsAt(fit, frequencyHz);
  let free = degree + 1;
  for (let k = 0; k <= degree; k++) {
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

/** Real and imaginary part of each term and of its slope per hertz, four numbers a term. */
function termsAt({ form, degree, scale }: RationalFit, frequencyHz: number): Float64Array {
  const w = frequencyHz / scale.centreHz;
  const y = scaledSquare(scale, frequencyHz);
  const g = (2 * w) / scale.half;
  const per = 1 / scale.centreHz;
  const terms = new Float64Array(4 * (degree + 2));
  let [t, t1, before, before1] = [1, 0, y, 1];
  for (let p = 0; p < polynomialsOf(form, degree); p++) {
    const even = 4 * (form === 'square' ? p : 2 * p);
    terms[even] = t;
    terms[even + 2] = per * t1 * g;
    if (form === 'reflection' && 2 * p + 1 <= degree) {
      terms[even + 5] = w * t;
      terms[even + 7] = per * (t + w * t1 * g);
    }
    [before, before1, t, t1] = [t, t1, 2 * y * t - before, 2 * t + 2 * y * t1 - before1];
  }
  return terms;
}

/**
 * Largest |D'/D| times the step, at the samples and midway between them: about the step over the
 * distance of the nearest pole from the real frequencies.
 */
export function sharpestPole(fit: RationalFit, frequencyHz: Float64Array): number {
  let sharpest = 0;
  for (let i = 1; i < frequencyHz.length; i++) {
    const stepHz = frequencyHz[i] - frequencyHz[i - 1];
    for (let half = 1; half <= 2; half++) {
      const d = seriesAt(fit, fit.denominator, frequencyHz[i] - (half - 1) * 0.5 * stepHz);
      const square = (d.slopeRe * d.slopeRe + d.slopeIm * d.slopeIm) / (d.re * d.re + d.im * d.im);
      sharpest = Math.max(sharpest, square * stepHz * stepHz);
    }
  }
  return Math.sqrt(sharpest);
}

import type { RationalForm, Series } from './rational-basis.ts';
import type { WeightedSamples } from './samples.ts';

/**
 * Sums over the samples from which the normal equations of a quotient N/D follow. Products of two
 * Chebyshev polynomials are sums of two others, so the sums of `value` times T_m suffice: seven
 * rows of moments, m = 0 … count - 1.
 */
export interface Moments {
  readonly count: number;
  /** Rows: g, gw², g·Re V, gw²·Re V, gw·Im V, g|V|², gw²|V|², with g = weight/|D|². */
  readonly rows: Float64Array;
  /** Gradient by E_N, O_N, E_D, O_D of half the negative squares; four rows. */
  readonly gradient: Float64Array;
  /** Weighted sum of the squared residuals. */
  readonly squares: number;
}

/** Moments that the highest polynomial of a series needs. */
export function momentsFor(form: RationalForm, degree: number): number {
  return form === 'square' ? 2 * degree + 1 : 2 * (degree >> 1) + 1;
}

/**
 * One pass over the samples at the function N/D. `asLinear`: V is the sample, as the linearised
 * equations N - V D = 0 want; else V is N/D, as the true residual's derivative wants.
 */
export function sumMoments(
  samples: WeightedSamples,
  numerator: Series,
  denominator: Series,
  count: number,
  asLinear: boolean,
): Moments {
  const { re, im, weight, w, y } = samples;
  const rows = new Float64Array(7 * count);
  const terms = (count + 1) >> 1;
  const gradient = new Float64Array(4 * terms);
  const t = new Float64Array(count);
  t[0] = 1;
  let squares = 0;
  for (let i = 0; i < y.length; i++) {
    const wi = w[i];
    fillChebyshev(t, y[i]);
    const nr = dot(numerator.even, t);
    const ni = wi * dot(numerator.odd, t);
    const dr = dot(denominator.even, t);
    const di = wi * dot(denominator.odd, t);
    const d2 = dr * dr + di * di;
    const mr = (nr * dr + ni * di) / d2;
    const mi = (ni * dr - nr * di) / d2;
    const g = weight[i] / d2;
    const errorRe = re[i] - mr;
    const errorIm = im[i] - mi;
    squares += weight[i] * (errorRe * errorRe + errorIm * errorIm);
    const vr = asLinear ? re[i] : mr;
    const vi = asLinear ? im[i] : mi;
    addMoments(rows, count, t, g, wi, vr, vi);
    if (asLinear) continue;
    // conj(1/D) times the error, and conj(V) times that.
    const zr = g * (dr * errorRe - di * errorIm);
    const zi = g * (dr * errorIm + di * errorRe);
    const ur = zr * vr + zi * vi;
    const ui = zi * vr - zr * vi;
    for (let k = 0; k < terms; k++) {
      gradient[k] += t[k] * zr;
      gradient[terms + k] += t[k] * wi * zi;
      gradient[2 * terms + k] -= t[k] * ur;
      gradient[3 * terms + k] -= t[k] * wi * ui;
    }
  }
  return { count, rows, gradient, squares };
}

function addMoments(
  rows: Float64Array,
  count: number,
  t: Float64Array,
  g: number,
  w: number,
  vr: number,
  vi: number,
): void {
  const gw2 = g * w * w;
  const gr = g * vr;
  const gw2r = gw2 * vr;
  const gwi = g * w * vi;
  const v2 = vr * vr + vi * vi;
  const gv = g * v2;
  const gw2v = gw2 * v2;
  for (let m = 0; m < count; m++) {
    const tm = t[m];
    const at = 7 * m;
    rows[at] += g * tm;
    rows[at + 1] += gw2 * tm;
    rows[at + 2] += gr * tm;
    rows[at + 3] += gw2r * tm;
    rows[at + 4] += gwi * tm;
    rows[at + 5] += gv * tm;
    rows[at + 6] += gw2v * tm;
  }
}

function fillChebyshev(t: Float64Array, y: number): void {
  if (t.length > 1) t[1] = y;
  for (let m = 2; m < t.length; m++) t[m] = 2 * y * t[m - 1] - t[m - 2];
}

function dot(a: Float64Array, t: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k++) sum += a[k] * t[k];
  return sum;
}

/**
 * The normal matrix of the unknowns E_N, O_N, E_D, O_D in this order, symmetric and full, by
 * T_a T_b = (T_{a+b} + T_{|a-b|})/2.
 */
export function normalMatrix({ rows }: Moments, even: number, odd: number): Float64Array {
  const size = 2 * (even + odd);
  const matrix = new Float64Array(size * size);
  const starts = [0, even, even + odd, 2 * even + odd];
  const lengths = [even, odd, even, odd];
  for (const [a, b, row, sign] of blocks) {
    for (let i = 0; i < lengths[a]; i++) {
      for (let j = 0; j < lengths[b]; j++) {
        const sum = rows[7 * (i + j) + row] + rows[7 * Math.abs(i - j) + row];
        const value = 0.5 * sign * sum;
        matrix[starts[a] + i + (starts[b] + j) * size] = value;
        matrix[starts[b] + j + (starts[a] + i) * size] = value;
      }
    }
  }
  return matrix;
}

/** Blocks of the normal matrix: two kinds of unknowns, the row of moments, the sign. */
const blocks: readonly (readonly [number, number, number, number])[] = [
  [0, 0, 0, 1],
  [1, 1, 1, 1],
  [0, 2, 2, -1],
  [1, 3, 3, -1],
  [0, 3, 4, 1],
  [1, 2, 4, -1],
  [2, 2, 5, 1],
  [3, 3, 6, 1],
];

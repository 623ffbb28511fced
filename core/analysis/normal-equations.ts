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
  const squares = fillPerSample(samples, numerator, denominator, asLinear);
  const rows = new Float64Array(7 * count);
  for (let m = 0; m < count; m++) sumRows(samples, m, rows);
  const terms = (count + 1) >> 1;
  const gradient = new Float64Array(4 * terms);
  if (!asLinear) for (let k = 0; k < terms; k++) sumGradient(samples, k, terms, gradient);
  return { count, rows, gradient, squares };
}

/** The eleven numbers of every sample that the sums are made of; returns the residuals' squares. */
function fillPerSample(
  samples: WeightedSamples,
  numerator: Series,
  denominator: Series,
  asLinear: boolean,
): number {
  const { re, im, weight, w, scratch } = samples;
  const n = re.length;
  scratch.fill(0, 0, 4 * n);
  addSeries(samples, numerator.even, 0);
  addSeries(samples, numerator.odd, n);
  addSeries(samples, denominator.even, 2 * n);
  addSeries(samples, denominator.odd, 3 * n);
  let squares = 0;
  for (let i = 0; i < n; i++) {
    const wi = w[i];
    const nr = scratch[i];
    const ni = wi * scratch[n + i];
    const dr = scratch[2 * n + i];
    const di = wi * scratch[3 * n + i];
    const inverse = 1 / (dr * dr + di * di);
    const mr = (nr * dr + ni * di) * inverse;
    const mi = (ni * dr - nr * di) * inverse;
    const g = weight[i] * inverse;
    const errorRe = re[i] - mr;
    const errorIm = im[i] - mi;
    squares += weight[i] * (errorRe * errorRe + errorIm * errorIm);
    const vr = asLinear ? re[i] : mr;
    const vi = asLinear ? im[i] : mi;
    const gw2 = g * wi * wi;
    const v2 = vr * vr + vi * vi;
    scratch[i] = g;
    scratch[n + i] = gw2;
    scratch[2 * n + i] = g * vr;
    scratch[3 * n + i] = gw2 * vr;
    scratch[4 * n + i] = g * wi * vi;
    scratch[5 * n + i] = g * v2;
    scratch[6 * n + i] = gw2 * v2;
    // conj(1/D) times the error, and conj(V) times that.
    const zr = g * (dr * errorRe - di * errorIm);
    const zi = g * (dr * errorIm + di * errorRe);
    scratch[7 * n + i] = zr;
    scratch[8 * n + i] = wi * zi;
    scratch[9 * n + i] = zr * vr + zi * vi;
    scratch[10 * n + i] = wi * (zi * vr - zr * vi);
  }
  return squares;
}

function addSeries(
  { chebyshev, scratch, re }: WeightedSamples,
  coefficients: Float64Array,
  into: number,
): void {
  const n = re.length;
  for (let k = 0; k < coefficients.length; k++) {
    const c = coefficients[k];
    const t = k * n;
    for (let i = 0; i < n; i++) scratch[into + i] += c * chebyshev[t + i];
  }
}

function sumRows({ chebyshev, scratch, re }: WeightedSamples, m: number, rows: Float64Array): void {
  const n = re.length;
  const at = m * n;
  let [a, b, c, d, e, f, g] = [0, 0, 0, 0, 0, 0, 0];
  for (let i = 0; i < n; i++) {
    const t = chebyshev[at + i];
    a += t * scratch[i];
    b += t * scratch[n + i];
    c += t * scratch[2 * n + i];
    d += t * scratch[3 * n + i];
    e += t * scratch[4 * n + i];
    f += t * scratch[5 * n + i];
    g += t * scratch[6 * n + i];
  }
  const into = 7 * m;
  rows[into] = a;
  rows[into + 1] = b;
  rows[into + 2] = c;
  rows[into + 3] = d;
  rows[into + 4] = e;
  rows[into + 5] = f;
  rows[into + 6] = g;
}

function sumGradient(
  { chebyshev, scratch, re }: WeightedSamples,
  k: number,
  terms: number,
  gradient: Float64Array,
): void {
  const n = re.length;
  const at = k * n;
  let [a, b, c, d] = [0, 0, 0, 0];
  for (let i = 0; i < n; i++) {
    const t = chebyshev[at + i];
    a += t * scratch[7 * n + i];
    b += t * scratch[8 * n + i];
    c -= t * scratch[9 * n + i];
    d -= t * scratch[10 * n + i];
  }
  gradient[k] = a;
  gradient[terms + k] = b;
  gradient[2 * terms + k] = c;
  gradient[3 * terms + k] = d;
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

/** A tall matrix of complex numbers, column after column. */
export interface ComplexColumns {
  readonly rows: number;
  readonly columns: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export interface LeastSquares {
  /** The unknowns. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** The inverse of the triangular factor, column after column: covariance is its square. */
  readonly inverseRe: Float64Array;
  readonly inverseIm: Float64Array;
}

/** Columns that add less than this part of their length to the earlier ones carry no information. */
const dependentBelow = 1e-13;

/** An all-zero matrix to be filled. */
export function complexColumns(rows: number, columns: number): ComplexColumns {
  const size = rows * columns;
  return { rows, columns, re: new Float64Array(size), im: new Float64Array(size) };
}

/**
 * Solves min |A x - b| by modified Gram–Schmidt with one reorthogonalisation (Å. Björck, Numerical
 * Methods for Least Squares Problems, SIAM 1996, section 2.4). `matrix` and `rhs` are overwritten.
 * Null if the columns depend on each other within rounding.
 */
export function solveLeastSquares(
  matrix: ComplexColumns,
  rhs: ComplexColumns,
): LeastSquares | null {
  const { columns, re, im, rows } = matrix;
  const triangleRe = new Float64Array(columns * columns);
  const triangleIm = new Float64Array(columns * columns);
  const projectedRe = new Float64Array(columns);
  const projectedIm = new Float64Array(columns);
  for (let column = 0; column < columns; column++) {
    const start = column * rows;
    const before = norm(re, im, start, rows);
    for (let pass = 0; pass < 2; pass++) {
      for (let earlier = 0; earlier < column; earlier++) {
        const at = column * columns + earlier;
        const [partRe, partIm] = project(re, im, earlier * rows, re, im, start, rows);
        triangleRe[at] += partRe;
        triangleIm[at] += partIm;
      }
    }
    const length = norm(re, im, start, rows);
    if (!(length > dependentBelow * before)) return null;
    triangleRe[column * columns + column] = length;
    for (let i = start; i < start + rows; i++) {
      re[i] /= length;
      im[i] /= length;
    }
    const [partRe, partIm] = project(re, im, start, rhs.re, rhs.im, 0, rows);
    projectedRe[column] = partRe;
    projectedIm[column] = partIm;
  }
  return backSubstitute(columns, triangleRe, triangleIm, projectedRe, projectedIm);
}

/** Takes from the second vector its part along the first (of length 1), and returns that part. */
function project(
  aRe: Float64Array,
  aIm: Float64Array,
  aStart: number,
  bRe: Float64Array,
  bIm: Float64Array,
  bStart: number,
  rows: number,
): [number, number] {
  let partRe = 0;
  let partIm = 0;
  for (let i = 0; i < rows; i++) {
    const ar = aRe[aStart + i];
    const ai = aIm[aStart + i];
    const br = bRe[bStart + i];
    const bi = bIm[bStart + i];
    partRe += ar * br + ai * bi;
    partIm += ar * bi - ai * br;
  }
  for (let i = 0; i < rows; i++) {
    const ar = aRe[aStart + i];
    const ai = aIm[aStart + i];
    bRe[bStart + i] -= ar * partRe - ai * partIm;
    bIm[bStart + i] -= ar * partIm + ai * partRe;
  }
  return [partRe, partIm];
}

function norm(re: Float64Array, im: Float64Array, start: number, rows: number): number {
  let sum = 0;
  for (let i = start; i < start + rows; i++) sum += re[i] * re[i] + im[i] * im[i];
  return Math.sqrt(sum);
}

function backSubstitute(
  size: number,
  triangleRe: Float64Array,
  triangleIm: Float64Array,
  projectedRe: Float64Array,
  projectedIm: Float64Array,
): LeastSquares {
  const inverseRe = new Float64Array(size * size);
  const inverseIm = new Float64Array(size * size);
  for (let column = 0; column < size; column++) {
    inverseRe[column * size + column] = 1 / triangleRe[column * size + column];
    for (let row = column - 1; row >= 0; row--) {
      let sumRe = 0;
      let sumIm = 0;
      for (let k = row + 1; k <= column; k++) {
        const tr = triangleRe[k * size + row];
        const ti = triangleIm[k * size + row];
        const vr = inverseRe[column * size + k];
        const vi = inverseIm[column * size + k];
        sumRe += tr * vr - ti * vi;
        sumIm += tr * vi + ti * vr;
      }
      const diagonal = triangleRe[row * size + row];
      inverseRe[column * size + row] = -sumRe / diagonal;
      inverseIm[column * size + row] = -sumIm / diagonal;
    }
  }
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  for (let row = 0; row < size; row++) {
    for (let k = row; k < size; k++) {
      const vr = inverseRe[k * size + row];
      const vi = inverseIm[k * size + row];
      re[row] += vr * projectedRe[k] - vi * projectedIm[k];
      im[row] += vr * projectedIm[k] + vi * projectedRe[k];
    }
  }
  return { re, im, inverseRe, inverseIm };
}

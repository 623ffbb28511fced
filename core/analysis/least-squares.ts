/** A tall real matrix, column after column; the last column is the right-hand side. */
export interface TallSystem {
  readonly rows: number;
  /** Columns without the right-hand side. */
  readonly unknowns: number;
  readonly values: Float64Array;
}

/** The solution of a least-squares problem, with what its covariance follows from. */
export interface LeastSquares {
  readonly solution: Float64Array;
  /** Upper triangle R, row k and column j at `k + j * unknowns`: covariance is (RᵀR)⁻¹. */
  readonly triangle: Float64Array;
}

/** Columns that add less than this part of their length to the earlier ones carry no information. */
const dependentBelow = 1e-13;

/** An all-zero system to be filled. */
export function tallSystem(rows: number, unknowns: number): TallSystem {
  return { rows, unknowns, values: new Float64Array(rows * (unknowns + 1)) };
}

/**
 * Solves min |A x - b| by Householder reflections (G. H. Golub, Numerische Mathematik 7, 1965); the
 * system is overwritten. Null if the columns depend on each other within rounding.
 */
export function solveLeastSquares(system: TallSystem): LeastSquares | null {
  const { rows, unknowns, values } = system;
  if (rows < unknowns) return null;
  for (let column = 0; column < unknowns; column++) {
    if (!reflectBelow(values, rows, unknowns, column)) return null;
  }
  const triangle = new Float64Array(unknowns * unknowns);
  for (let j = 0; j < unknowns; j++) {
    for (let k = 0; k <= j; k++) triangle[k + j * unknowns] = values[j * rows + k];
  }
  const solution = new Float64Array(unknowns);
  const rightHand = unknowns * rows;
  for (let k = unknowns - 1; k >= 0; k--) {
    let sum = values[rightHand + k];
    for (let j = k + 1; j < unknowns; j++) sum -= triangle[k + j * unknowns] * solution[j];
    solution[k] = sum / triangle[k + k * unknowns];
  }
  return { solution, triangle };
}

/** Turns one column's part below the diagonal to zero and the later columns with it. */
function reflectBelow(
  values: Float64Array,
  rows: number,
  unknowns: number,
  column: number,
): boolean {
  const start = column * rows;
  const end = start + rows;
  let above = 0;
  for (let i = start; i < start + column; i++) above += values[i] * values[i];
  let below = 0;
  for (let i = start + column; i < end; i++) below += values[i] * values[i];
  const length = Math.sqrt(below);
  if (!(length > dependentBelow * Math.sqrt(above + below))) return false;
  const head = values[start + column];
  const diagonal = head > 0 ? -length : length;
  const pivot = head - diagonal;
  const factor = -1 / (diagonal * pivot);
  values[start + column] = pivot;
  for (let other = column + 1; other <= unknowns; other++) {
    const shift = (other - column) * rows;
    let sum = 0;
    for (let i = start + column; i < end; i++) sum += values[i] * values[i + shift];
    sum *= factor;
    for (let i = start + column; i < end; i++) values[i + shift] -= sum * values[i];
  }
  values[start + column] = diagonal;
  return true;
}

/** |R⁻ᵀ g|: the standard deviation, for unit noise, of the unknowns' combination g. */
export function deviationOf(triangle: Float64Array, gradient: Float64Array): number {
  const unknowns = gradient.length;
  const solved = new Float64Array(unknowns);
  let squares = 0;
  for (let j = 0; j < unknowns; j++) {
    let sum = gradient[j];
    for (let k = 0; k < j; k++) sum -= triangle[k + j * unknowns] * solved[k];
    solved[j] = sum / triangle[j + j * unknowns];
    squares += solved[j] * solved[j];
  }
  return Math.sqrt(squares);
}

/** The Cholesky factor of a normal matrix. */
export interface CholeskyFactor {
  readonly size: number;
  /** Upper triangle R with RᵀR the matrix; row k and column j at `k + j * size`. */
  readonly triangle: Float64Array;
}

/** Below this part of its diagonal a pivot is rounding: its direction carries no information. */
const dependentBelow = 3e-13;

/**
 * Factors a symmetric positive definite matrix, of which the upper triangle is read (row k and column
 * j at `k + j * size`). A direction without information gets an infinite pivot, so that solutions
 * leave it where it is and uncertainties leave it out.
 */
export function choleskyFactor(matrix: Float64Array, size: number): CholeskyFactor {
  const triangle = new Float64Array(size * size);
  for (let j = 0; j < size; j++) {
    const column = j * size;
    for (let k = 0; k < j; k++) {
      let sum = matrix[k + column];
      const other = k * size;
      for (let i = 0; i < k; i++) sum -= triangle[i + other] * triangle[i + column];
      triangle[k + column] = sum / triangle[k + other];
    }
    const diagonal = matrix[j + column];
    let rest = diagonal;
    for (let i = 0; i < j; i++) rest -= triangle[i + column] * triangle[i + column];
    const isKnown = rest > dependentBelow * diagonal;
    triangle[j + column] = isKnown ? Math.sqrt(rest) : Number.POSITIVE_INFINITY;
  }
  return { size, triangle };
}

/** Solves RᵀR x = b. */
export function choleskySolve({ size, triangle }: CholeskyFactor, b: Float64Array): Float64Array {
  const x = forwardSolve(triangle, b);
  for (let k = size - 1; k >= 0; k--) {
    let sum = x[k];
    for (let j = k + 1; j < size; j++) sum -= triangle[k + j * size] * x[j];
    x[k] = sum / triangle[k + k * size];
  }
  return x;
}

/** R⁻ᵀ b. */
function forwardSolve(triangle: Float64Array, b: Float64Array): Float64Array {
  const size = b.length;
  const x = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    let sum = b[j];
    for (let k = 0; k < j; k++) sum -= triangle[k + j * size] * x[k];
    x[j] = sum / triangle[j + j * size];
  }
  return x;
}

/** |R⁻ᵀ g|: the standard deviation, for unit noise, of the unknowns' combination g. */
export function deviationOf(triangle: Float64Array, gradient: Float64Array): number {
  let squares = 0;
  for (const part of forwardSolve(triangle, gradient)) squares += part * part;
  return Math.sqrt(squares);
}

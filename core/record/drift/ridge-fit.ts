/** A column of a linear model and the precision (1 / variance) of what is known of its factor beforehand about zero. */
export interface ModelColumn {
  readonly values: Float64Array;
  /** 0: nothing is known. */
  readonly priorPrecision: number;
}

/** A weighted least-squares fit, kept in the form that further columns are tried on. */
export interface RidgeFit {
  readonly factors: Float64Array;
  readonly standardErrors: Float64Array;
  readonly residuals: Float64Array;
  /** What another column would do: its factor, and by how much chi-squared would fall. */
  readonly tryColumn: (column: Float64Array) => ColumnTrial;
}

export interface ColumnTrial {
  readonly factor: number;
  readonly gain: number;
}

/** A column that others explain to this part is no new one. */
const collinear = 1e-6;

/** Fits `y` by the columns; `weights` are 1 / variance of each value. Normal equations by Cholesky. */
export function ridgeFit(
  columns: readonly ModelColumn[],
  y: Float64Array,
  weights: Float64Array,
): RidgeFit {
  const inverse = inverseOf(normalMatrix(columns, weights));
  const factors = times(inverse, projections(columns, y, weights));
  const residuals = y.map((value, i) =>
    columns.reduce((rest, column, k) => rest - factors[k] * column.values[i], value),
  );
  return {
    factors,
    standardErrors: Float64Array.from(inverse, (row, k) => Math.sqrt(Math.max(0, row[k]))),
    residuals,
    tryColumn: (column) => {
      const onto = projections(columns, column, weights);
      const explained = dot(onto, times(inverse, onto));
      const own = weighted(column, column, weights);
      const free = own - explained;
      if (!(free > collinear * own)) return { factor: 0, gain: 0 };
      const factor = weighted(column, residuals, weights) / free;
      return { factor, gain: factor * factor * free };
    },
  };
}

function normalMatrix(columns: readonly ModelColumn[], weights: Float64Array): Float64Array[] {
  return columns.map((row, j) =>
    Float64Array.from(columns, (column, k) => {
      const prior = j === k ? row.priorPrecision + 1e-9 : 0;
      return weighted(row.values, column.values, weights) + prior;
    }),
  );
}

function projections(
  columns: readonly ModelColumn[],
  y: Float64Array,
  weights: Float64Array,
): Float64Array {
  return Float64Array.from(columns, ({ values }) => weighted(values, y, weights));
}

function weighted(a: Float64Array, b: Float64Array, weights: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i] * weights[i];
  return sum;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

function times(matrix: readonly Float64Array[], vector: Float64Array): Float64Array {
  return Float64Array.from(matrix, (row) => dot(row, vector));
}

/** The inverse of a symmetric positive matrix, by Cholesky's factor and its inverse. */
function inverseOf(matrix: readonly Float64Array[]): Float64Array[] {
  const size = matrix.length;
  const lower = matrix.map(() => new Float64Array(size));
  const inverse = matrix.map(() => new Float64Array(size));
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i][j];
      for (let k = 0; k < j; k++) sum -= lower[i][k] * lower[j][k];
      lower[i][j] = i === j ? Math.sqrt(Math.max(sum, 1e-12)) : sum / lower[j][j];
    }
    inverse[i][i] = 1 / lower[i][i];
    for (let j = 0; j < i; j++) {
      let sum = 0;
      for (let k = j; k < i; k++) sum -= lower[i][k] * inverse[k][j];
      inverse[i][j] = sum / lower[i][i];
    }
  }
  return matrix.map((_, i) =>
    Float64Array.from(matrix, (__, j) => {
      let sum = 0;
      for (let k = Math.max(i, j); k < size; k++) sum += inverse[k][i] * inverse[k][j];
      return sum;
    }),
  );
}

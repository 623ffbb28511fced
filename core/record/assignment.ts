/** A pair that must not be. */
export const forbidden = Number.POSITIVE_INFINITY;

/**
 * Pairs rows with columns so that the sum of costs is least, where leaving a row or a column without
 * a partner costs `alone` each. Answers the column of each row, null for one that stays alone.
 *
 * The assignment problem, solved by shortest augmenting paths with dual variables (Kuhn, Naval
 * Research Logistics Quarterly 2, 1955; Munkres, J. SIAM 5, 1957) on the square that has a stand-in
 * for each partner that may be missing.
 */
export function assign(
  costs: readonly (readonly number[])[],
  columns: number,
  alone: number,
): readonly (number | null)[] {
  const rows = costs.length;
  const size = rows + columns;
  const large = 1e6 * (1 + alone);
  const costAt = (row: number, column: number): number => {
    if (row < rows && column < columns) return Math.min(costs[row][column], large);
    if (row >= rows && column >= columns) return 0;
    const isOwnStandIn = row < rows ? column - columns === row : row - rows === column;
    return isOwnStandIn ? alone : large;
  };
  const rowOf = matched(size, costAt);
  const columnOf: (number | null)[] = Array.from({ length: rows }, () => null);
  for (let column = 0; column < columns; column++) {
    const row = rowOf[column];
    if (row < rows && costs[row][column] < large) columnOf[row] = column;
  }
  return columnOf;
}

/** The row of each column in the perfect matching of least cost of a square. */
function matched(size: number, costAt: (row: number, column: number) => number): Int32Array {
  const rowPrice = new Float64Array(size + 1);
  const columnPrice = new Float64Array(size + 1);
  // One more column, the last, holds the row that looks for a partner.
  const rowOf = new Int32Array(size + 1).fill(-1);
  const cameFrom = new Int32Array(size + 1);
  for (let row = 0; row < size; row++) {
    const least = new Float64Array(size + 1).fill(Number.POSITIVE_INFINITY);
    const isDone = new Uint8Array(size + 1);
    let column = size;
    rowOf[column] = row;
    while (rowOf[column] !== -1) {
      isDone[column] = 1;
      const from = rowOf[column];
      let step = Number.POSITIVE_INFINITY;
      let next = column;
      for (let to = 0; to < size; to++) {
        if (isDone[to] === 1) continue;
        const reduced = costAt(from, to) - rowPrice[from] - columnPrice[to];
        if (reduced < least[to]) {
          least[to] = reduced;
          cameFrom[to] = column;
        }
        if (least[to] < step) {
          step = least[to];
          next = to;
        }
      }
      for (let to = 0; to <= size; to++) {
        if (isDone[to] === 1) {
          rowPrice[rowOf[to]] += step;
          columnPrice[to] -= step;
        } else least[to] -= step;
      }
      column = next;
    }
    while (column !== size) {
      rowOf[column] = rowOf[cameFrom[column]];
      column = cameFrom[column];
    }
  }
  return rowOf;
}

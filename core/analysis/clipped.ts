/** A run of points by their places. */
export interface Run {
  readonly first: number;
  readonly last: number;
}

/** A shorter run of equal values may be chance or rounding. */
const shortestRun = 5;
/** On a rounded top the steps beside the highest are a fifth as long; on a cut-off one far shorter. */
const timesNeighbour = 8;

/**
 * Runs in which values stand still at their greatest and beside which they do not: a curve that is
 * cut off comes to its limit at full slope, one that is only rounded comes in ever longer steps.
 */
export function clippedRuns(values: Float64Array): readonly Run[] {
  let greatest = values[0];
  for (const value of values) greatest = Math.max(greatest, value);
  const runs: Run[] = [];
  let before = 0;
  for (const { first, last } of equalRuns(values)) {
    const length = last - first + 1;
    const after = last + 1 < values.length ? runFrom(values, last + 1) : 0;
    const beside = Math.max(before, after);
    if (values[first] === greatest && length >= shortestRun) {
      if (beside > 0 && length >= timesNeighbour * beside) runs.push({ first, last });
    }
    before = length;
  }
  return runs;
}

function equalRuns(values: Float64Array): Run[] {
  const runs: Run[] = [];
  for (let first = 0; first < values.length; ) {
    const length = runFrom(values, first);
    runs.push({ first, last: first + length - 1 });
    first += length;
  }
  return runs;
}

/** Length of the run of equal values that begins at a place. */
function runFrom(values: Float64Array, first: number): number {
  let end = first + 1;
  while (end < values.length && values[end] === values[first]) end += 1;
  return end - first;
}

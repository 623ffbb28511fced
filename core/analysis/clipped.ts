/** A run of points by their places. */
export interface Run {
  readonly first: number;
  readonly last: number;
}

/** A shorter run of equal values may be chance or rounding. */
const shortestRun = 5;

/**
 * Runs in which values stand still at their greatest, entered or left by a jump of more than two of
 * the smallest steps between neighbours, as a curve that is cut off has and one that is only rounded
 * has not.
 */
export function clippedRuns(values: Float64Array): readonly Run[] {
  let greatest = values[0];
  let smallestStep = Number.POSITIVE_INFINITY;
  for (let i = 1; i < values.length; i++) {
    greatest = Math.max(greatest, values[i]);
    const step = Math.abs(values[i] - values[i - 1]);
    if (step > 0) smallestStep = Math.min(smallestStep, step);
  }
  const runs: Run[] = [];
  let first = -1;
  for (let i = 0; i <= values.length; i++) {
    if (i < values.length && values[i] === greatest) {
      if (first < 0) first = i;
      continue;
    }
    if (first >= 0 && i - first >= shortestRun) {
      const before = first > 0 ? greatest - values[first - 1] : 0;
      const after = i < values.length ? greatest - values[i] : 0;
      if (Math.max(before, after) > 2 * smallestStep) runs.push({ first, last: i - 1 });
    }
    first = -1;
  }
  return runs;
}

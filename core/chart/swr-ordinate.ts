/**
 * Where an SWR stands between the foot (0: SWR 1) and the head (1: no limit) of a chart: at the
 * magnitude of its reflection, (SWR - 1)/(SWR + 1). SWR 1 to 3 takes the lower half, and every
 * SWR has a place. A reflection above 1, which only errors make, stands at the head.
 */
export function swrOrdinate(swr: number): number {
  if (!(swr >= 1) || swr === Number.POSITIVE_INFINITY) return 1;
  return (swr - 1) / (swr + 1);
}

/** The first to stand where the axis has no room for all. */
const valuesByWeight = [1, Number.POSITIVE_INFINITY, 2, 3, 1.5, 5, 10, 1.2];

/** Round SWR values that stand at least this far apart on an axis of this length, ascending. */
export function swrTickValues(lengthPx: number, leastPx: number): readonly number[] {
  const kept: number[] = [];
  for (const value of valuesByWeight) {
    const isFree = kept.every(
      (other) => Math.abs(swrOrdinate(other) - swrOrdinate(value)) * lengthPx >= leastPx,
    );
    if (isFree) kept.push(value);
  }
  return kept.toSorted((a, b) => a - b);
}

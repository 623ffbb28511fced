/** The middle value; the mean of the two middle ones for an even number. NaN for none. */
export function median(values: ArrayLike<number>): number {
  return medianOfSorted(Float64Array.from(values).sort());
}

/** As `median`, of values already in ascending order. */
export function medianOfSorted(sorted: ArrayLike<number>): number {
  const middle = sorted.length >> 1;
  if (sorted.length === 0) return Number.NaN;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

/** 1/Φ⁻¹(3/4): makes the median absolute deviation a standard deviation for normal values. */
const normalConsistency = 1.482602218505602;

/** The scaled median absolute deviation about the median: a standard deviation that outliers do not move. */
export function robustScale(values: ArrayLike<number>): number {
  const centre = median(values);
  return normalConsistency * median(Float64Array.from(values, (value) => Math.abs(value - centre)));
}

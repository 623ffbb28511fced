/** A model looked at from end to end. */
export interface Scan {
  readonly frequencyHz: Float64Array;
  /** Squared magnitude of the reflection. */
  readonly square: Float64Array;
  /** Parts of the reflection; all zero where its sign is not known. */
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Frequencies at which a model is looked at for signs and turns, ascending. */
export function scanFrequencies(frequencyHz: Float64Array): Float64Array {
  const count = frequencyHz.length;
  const between = Math.max(1, Math.min(8, Math.ceil(400 / count)));
  const scan = new Float64Array((count - 1) * between + 1);
  for (let i = 0; i < count - 1; i++) {
    const step = (frequencyHz[i + 1] - frequencyHz[i]) / between;
    for (let k = 0; k < between; k++) scan[i * between + k] = frequencyHz[i] + k * step;
  }
  scan[scan.length - 1] = frequencyHz[count - 1];
  return scan;
}

/** A change of sign between two neighbours of a scan (zeros between them left out). */
export interface SignChange {
  readonly before: number;
  readonly after: number;
}

/** The changes of sign of `values` less `level`, in order. */
export function signChanges(values: Float64Array, level = 0): SignChange[] {
  const changes: SignChange[] = [];
  let last = -1;
  for (let i = 0; i < values.length; i++) {
    if (values[i] === level) continue;
    if (last >= 0 && values[i] > level !== values[last] > level) {
      changes.push({ before: last, after: i });
    }
    last = i;
  }
  return changes;
}

/** Place of the value farthest from `level` between two places, both among them. */
export function farthestFrom(
  values: Float64Array,
  level: number,
  from: number,
  to: number,
): number {
  let at = from;
  for (let i = from; i <= to; i++) {
    if (Math.abs(values[i] - level) > Math.abs(values[at] - level)) at = i;
  }
  return at;
}

import { type PiecewiseModel, pieceAt, valueAt } from './piecewise-model.ts';

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

/** Real and imaginary part of a model at the scan's frequencies. */
export function scanModel(
  model: PiecewiseModel,
  scan: Float64Array,
): { readonly re: Float64Array; readonly im: Float64Array } {
  const re = new Float64Array(scan.length);
  const im = new Float64Array(scan.length);
  for (let i = 0; i < scan.length; i++) {
    const value = valueAt(pieceAt(model, scan[i]), scan[i]);
    re[i] = value.re;
    im[i] = value.im;
  }
  return { re, im };
}

/** A change of sign between two neighbours of a scan (zeros between them left out). */
export interface SignChange {
  readonly before: number;
  readonly after: number;
}

/** The changes of sign of a row of values, in order. */
export function signChanges(values: Float64Array): SignChange[] {
  const changes: SignChange[] = [];
  let last = -1;
  for (let i = 0; i < values.length; i++) {
    if (values[i] === 0) continue;
    if (last >= 0 && values[i] > 0 !== values[last] > 0) changes.push({ before: last, after: i });
    last = i;
  }
  return changes;
}

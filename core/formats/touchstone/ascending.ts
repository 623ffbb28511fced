import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from './faults.ts';

export interface Ordered {
  readonly arrays: readonly Float64Array[];
  readonly assumptions: readonly Assumption[];
}

/**
 * Brings points into strictly ascending frequency (the first array). One-port files are sorted; in
 * a two-port file of version 1 a step back is an error, since there it separates sections. Equal
 * frequencies are joined if the values are equal too, else refused: which to take would be a guess.
 */
export function inOrder(
  arrays: readonly Float64Array[],
  line: Int32Array,
  refuseSteps: boolean,
): Result<Ordered, ReadError> {
  const [frequency] = arrays;
  const step = firstStepBack(frequency);
  if (step < 0) return ok({ arrays, assumptions: [] });
  const at = { line: line[step] };
  if (refuseSteps && frequency[step] < frequency[step - 1]) {
    const detail = `Line ${line[step]} steps back in frequency.`;
    return refuse('frequency_steps_back', detail, 'Order the points by frequency.', at);
  }
  const order = Uint32Array.from(frequency, (_, i) => i).sort(
    (a, b) => frequency[a] - frequency[b] || a - b,
  );
  const isSorted = order.every((from, i) => from === i);
  const sorted = arrays.map((array) => Float64Array.from(order, (from) => array[from]));
  const joined = joinEqual(sorted, order, line);
  if (!joined.ok || isSorted) return joined;
  const detail = 'The points were not in ascending frequency; they were sorted.';
  const assumptions = [{ code: 'points_sorted', detail, ...at }, ...joined.value.assumptions];
  return ok({ arrays: joined.value.arrays, assumptions });
}

function firstStepBack(frequency: Float64Array): number {
  for (let i = 1; i < frequency.length; i++) if (!(frequency[i] > frequency[i - 1])) return i;
  return -1;
}

function joinEqual(
  sorted: readonly Float64Array[],
  order: Uint32Array,
  line: Int32Array,
): Result<Ordered, ReadError> {
  const [frequency] = sorted;
  let kept = 0;
  for (let i = 0; i < frequency.length; i++) {
    if (kept > 0 && frequency[i] === frequency[kept - 1]) {
      if (sorted.every((array) => array[i] === array[kept - 1])) continue;
      const here = line[order[i]];
      const detail = `Line ${here} gives ${frequency[i]} Hz a second time, with other values.`;
      return refuse('frequency_twice', detail, 'Keep one of the points.', { line: here });
    }
    for (const array of sorted) array[kept] = array[i];
    kept += 1;
  }
  const arrays = sorted.map((array) => array.subarray(0, kept));
  const twice = frequency.length - kept;
  if (twice === 0) return ok({ arrays, assumptions: [] });
  const detail = `${twice} points stood twice with equal values and were taken once.`;
  return ok({ arrays, assumptions: [{ code: 'points_twice', detail }] });
}

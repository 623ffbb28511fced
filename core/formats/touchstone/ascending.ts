import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from './faults.ts';
import type { Reflections } from './reflections.ts';

export interface Ordered {
  readonly reflections: Reflections;
  readonly assumptions: readonly Assumption[];
}

/**
 * Brings points into strictly ascending frequency. One-port files are sorted; in a two-port file of
 * version 1 a step back is an error, since there it separates sections. Equal frequencies are
 * joined if the values are equal too, else refused: which to take would be a guess. Errors:
 * `frequency_steps_back`, `frequency_twice`.
 */
export function inOrder(points: Reflections, refuseSteps: boolean): Result<Ordered, ReadError> {
  const { frequencyHz, line } = points;
  const step = firstStepBack(frequencyHz);
  if (step < 0) return ok({ reflections: points, assumptions: [] });
  const at = { line: line[step] };
  if (refuseSteps && frequencyHz[step] < frequencyHz[step - 1]) {
    const detail = `Line ${line[step]} steps back in frequency.`;
    return refuse('frequency_steps_back', detail, 'Order the points by frequency.', at);
  }
  const order = Uint32Array.from(frequencyHz, (_, i) => i).sort(
    (a, b) => frequencyHz[a] - frequencyHz[b] || a - b,
  );
  const isSorted = order.every((from, i) => from === i);
  const joined = joinEqual(taken(points, order));
  if (!joined.ok || isSorted) return joined;
  const detail = 'The points were not in ascending frequency; they were sorted.';
  const assumptions = [{ code: 'points_sorted', detail, ...at }, ...joined.value.assumptions];
  return ok({ reflections: joined.value.reflections, assumptions });
}

function firstStepBack(frequencyHz: Float64Array): number {
  for (let i = 1; i < frequencyHz.length; i++) {
    if (!(frequencyHz[i] > frequencyHz[i - 1])) return i;
  }
  return -1;
}

/** The points at these indices, in this order. */
function taken(points: Reflections, indices: Uint32Array): Reflections {
  const pick = (values: Float64Array) => Float64Array.from(indices, (from) => values[from]);
  return {
    frequencyHz: pick(points.frequencyHz),
    reflectionRe: pick(points.reflectionRe),
    reflectionIm: pick(points.reflectionIm),
    line: Int32Array.from(indices, (from) => points.line[from]),
  };
}

function joinEqual(points: Reflections): Result<Ordered, ReadError> {
  const { frequencyHz, reflectionRe, reflectionIm, line } = points;
  const kept: number[] = [];
  for (let i = 0; i < frequencyHz.length; i++) {
    const before = kept[kept.length - 1];
    if (before === undefined || frequencyHz[i] !== frequencyHz[before]) {
      kept.push(i);
    } else if (
      reflectionRe[i] !== reflectionRe[before] ||
      reflectionIm[i] !== reflectionIm[before]
    ) {
      const detail = `Line ${line[i]} gives ${frequencyHz[i]} Hz a second time, with other values than line ${line[before]}.`;
      return refuse('frequency_twice', detail, 'Keep one of the points.', { line: line[i] });
    }
  }
  const twice = frequencyHz.length - kept.length;
  if (twice === 0) return ok({ reflections: points, assumptions: [] });
  const detail = `${twice} points stood twice with equal values and were taken once.`;
  return ok({
    reflections: taken(points, Uint32Array.from(kept)),
    assumptions: [{ code: 'points_twice', detail }],
  });
}

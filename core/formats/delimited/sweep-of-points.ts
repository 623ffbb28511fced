import { ok, type Result } from '../../result.ts';
import { makeSweep, type PhaseKnowledge, type Sweep } from '../../sweep.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { inOrder } from '../touchstone/ascending.ts';
import { refuse } from '../touchstone/faults.ts';
import type { Reflections } from '../touchstone/reflections.ts';
import { suspectMagnitude } from '../touchstone/suspicions.ts';

export interface SweepOfPoints {
  readonly sweep: Sweep;
  readonly assumptions: readonly Assumption[];
}

/**
 * Makes a sweep of points: descending ones are turned round, others sorted, equal ones joined, each
 * told as an assumption. Where no phase is known the real parts are the magnitudes. Error:
 * `frequency_twice`.
 */
export function sweepOfPoints(
  points: Reflections,
  phase: PhaseKnowledge,
  referenceOhm: number,
): Result<SweepOfPoints, ReadError> {
  const turned = turnIfDescending(points);
  const ordered = inOrder(points, false);
  if (!ordered.ok) return ordered;
  const { frequencyHz, reflectionRe, reflectionIm, line } = ordered.value.reflections;
  const base = { frequencyHz, referenceOhm };
  const sweep = makeSweep(
    phase === 'none'
      ? { ...base, phase, reflectionMagnitude: reflectionRe }
      : { ...base, phase, reflectionRe, reflectionIm },
  );
  if (!sweep.ok) {
    const { code, detail } = sweep.error;
    return refuse(code, detail, 'Check the file and the mapping.', { line: line[0] });
  }
  const assumptions = [
    ...turned,
    ...ordered.value.assumptions,
    ...suspectMagnitude(ordered.value.reflections),
    ...suspectFrequencies(frequencyHz, line[0]),
  ];
  return ok({ sweep: sweep.value, assumptions });
}

function turnIfDescending(points: Reflections): Assumption[] {
  const { frequencyHz, reflectionRe, reflectionIm, line } = points;
  if (frequencyHz.length < 2) return [];
  for (let i = 1; i < frequencyHz.length; i++) {
    if (!(frequencyHz[i] < frequencyHz[i - 1])) return [];
  }
  const firstLine = line[0];
  for (const values of [frequencyHz, reflectionRe, reflectionIm, line]) values.reverse();
  const detail = 'The points stood in descending frequency; they were turned round.';
  return [{ code: 'points_reversed', detail, line: firstLine }];
}

function suspectFrequencies(frequencyHz: Float64Array, line: number): Assumption[] {
  const assumptions: Assumption[] = [];
  const lowest = frequencyHz[0];
  const highest = frequencyHz[frequencyHz.length - 1];
  if (lowest === 0) {
    const detail = 'The point at 0 Hz was kept; nothing is said of wavelengths there.';
    assumptions.push({ code: 'zero_frequency', detail, line });
  }
  if (lowest > 10e9 || highest < 1000) {
    const detail = `All frequencies lie ${highest < 1000 ? 'below 1 kHz' : 'above 10 GHz'}: check the unit of the frequency.`;
    assumptions.push({ code: 'unit_suspect', detail, line });
  }
  return assumptions;
}

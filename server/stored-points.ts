import type { Sweep } from '../core/sweep.ts';
import type { StoredPoints, SweepMeasured } from './store/port.ts';

/** The points of a sweep as they are stored. */
export function toStoredPoints(sweep: Sweep): StoredPoints {
  const { frequencyHz } = sweep;
  if (sweep.phase === 'none') {
    const { reflectionMagnitude } = sweep;
    return { frequencyHz, reflectionRe: null, reflectionIm: null, reflectionMagnitude };
  }
  const { reflectionRe, reflectionIm } = sweep;
  return { frequencyHz, reflectionRe, reflectionIm, reflectionMagnitude: null };
}

/** The sweep that was stored; its promises were checked when the file was read. */
export function toSweep(
  { phase, referenceOhm }: Pick<SweepMeasured, 'phase' | 'referenceOhm'>,
  points: StoredPoints,
): Sweep {
  const { frequencyHz, reflectionRe, reflectionIm, reflectionMagnitude } = points;
  if (phase === 'none') {
    if (reflectionMagnitude === null) throw new Error('The stored points lack the magnitude.');
    return { phase, frequencyHz, referenceOhm, reflectionMagnitude };
  }
  if (reflectionRe === null || reflectionIm === null) {
    throw new Error('The stored points lack the complex reflection.');
  }
  return { phase, frequencyHz, referenceOhm, reflectionRe, reflectionIm };
}

import type { Summary } from '../analysis/summary.ts';
import { type FrequencyUnit, frequencyText } from './frequency-scale.ts';
import type { NumberText } from './number-text.ts';
import type { MarkShape } from './svg.ts';

/**
 * A place of note in a sweep. Least SWR and resonance are two things with two marks; a reactance
 * whose sign is not known has a third.
 */
export interface SweepMark {
  readonly kind: 'minimum' | 'resonance' | 'reactance';
  readonly shape: MarkShape;
  readonly frequencyHz: number;
  /** Null where it is not known there. */
  readonly swr: number | null;
  readonly resistanceOhm: number | null;
  readonly text: string;
}

/**
 * The marks of a sweep, those first that most deserve a label. Short texts leave the unit to the
 * axis.
 */
export function sweepMarks(
  { minimumSwr, resonances, reactanceMagnitudeMinima }: Summary,
  unit: FrequencyUnit,
  numbers: NumberText,
  isShort = false,
): readonly SweepMark[] {
  const written = (hz: number, u95Hz: number | null) => {
    const text = frequencyText(hz, u95Hz, unit, numbers);
    return isShort ? text.slice(0, text.indexOf(' ')) : text;
  };
  const at = isShort ? ':' : ' at';
  const marks: SweepMark[] = [];
  if (minimumSwr !== null) {
    const { frequencyHz, frequencyU95Hz, swr, resistanceOhm, atEdge } = minimumSwr;
    const place = `SWR ${numbers.fixed(swr, 2)} at ${written(frequencyHz, frequencyU95Hz)}`;
    const text = `${atEdge ? 'least swept: ' : 'least '}${place}`;
    marks.push({ kind: 'minimum', shape: 'disc', frequencyHz, swr, resistanceOhm, text });
  }
  for (const { frequencyHz, frequencyU95Hz, swr, resistanceOhm } of bySwr(resonances)) {
    const text = `X = 0${at} ${written(frequencyHz, frequencyU95Hz)}`;
    marks.push({ kind: 'resonance', shape: 'diamond', frequencyHz, swr, resistanceOhm, text });
  }
  for (const { frequencyHz, frequencyU95Hz, resistanceOhm } of reactanceMagnitudeMinima) {
    const text = `|X| least${at} ${written(frequencyHz, frequencyU95Hz)}`;
    marks.push({ kind: 'reactance', shape: 'square', frequencyHz, swr: null, resistanceOhm, text });
  }
  return marks;
}

/** A resonance at low SWR is of use; one far up is often the line's own. */
function bySwr<Resonance extends { readonly swr: number | null }>(
  resonances: readonly Resonance[],
): readonly Resonance[] {
  const worth = ({ swr }: Resonance) => swr ?? Number.POSITIVE_INFINITY;
  return resonances.toSorted((a, b) => Math.sign(worth(a) - worth(b)) || 0);
}

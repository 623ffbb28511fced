import type { HistoryRow, MeasuredResonance } from '../measures.ts';
import { followResonances } from '../tracks.ts';

/** What is followed through time. Frequencies and widths in hertz, resistance in ohm. */
export const driftMeasures = [
  'resonance_hz',
  'minimum_swr_hz',
  'minimum_swr',
  'span_width_hz',
  'resistance_ohm',
] as const;
export type DriftMeasure = (typeof driftMeasures)[number];

export type Wetness = 'dry' | 'wet' | 'unknown';

/** A positive value with the half-width of its 95 % interval; null if that is unknown. */
export interface DriftValue {
  readonly value: number;
  readonly u95: number | null;
}

/** One sweep of an antenna's series in one band. */
export interface DriftSweep {
  readonly sweepId: string;
  /** Milliseconds since 1970, UTC. */
  readonly measuredAtMs: number;
  readonly analyzerId: string | null;
  readonly wetness: Wetness;
  readonly eraIndex: number;
  readonly values: Readonly<Partial<Record<DriftMeasure, DriftValue>>>;
  /** Whether the sweep has a resonance in the band; null where it could not have shown one. */
  readonly resonant: boolean | null;
}

/** Less of a band than this tells nothing of what is missing in it. */
const sweptEnough = 0.5;

/**
 * The series of one band, ascending in time. `rows` ascend in time and are of one plane. The
 * resonance is that of the track with the most sweeps.
 */
export function driftSeries(rows: readonly HistoryRow[], band: string): readonly DriftSweep[] {
  const tracks = followResonances(rows, band);
  const longest = tracks.toSorted((a, b) => b.points.length - a.points.length).at(0);
  const followed = new Map(longest?.points.map(({ row, resonance }) => [row.sweepId, resonance]));
  return rows.flatMap((row) => {
    const measures = row.measures.bands.find((one) => one.band === band);
    if (measures === undefined || measures.sweptFraction < sweptEnough) return [];
    const { minimum, span } = measures;
    const values = {
      ...ofResonance(followed.get(row.sweepId)),
      ...(minimum === null || minimum.atEdge
        ? {}
        : {
            minimum_swr_hz: { value: minimum.frequencyHz, u95: minimum.frequencyU95Hz },
            minimum_swr: { value: minimum.swr, u95: minimum.swrU95 },
          }),
      ...(span === null || span.lowOpen || span.highOpen || span.widthHz <= 0
        ? {}
        : { span_width_hz: { value: span.widthHz, u95: span.widthU95Hz } }),
    };
    const { sweepId, measuredAtMs, analyzerId, eraIndex, condition } = row;
    const wetness = condition === null ? 'unknown' : condition === 'dry' ? 'dry' : 'wet';
    const resonant = row.measures.phase === 'signed' ? measures.resonances.length > 0 : null;
    return [{ sweepId, measuredAtMs, analyzerId, wetness, eraIndex, values, resonant }];
  });
}

function ofResonance(resonance: MeasuredResonance | undefined): DriftSweep['values'] {
  if (resonance === undefined) return {};
  const { frequencyHz, frequencyU95Hz, resistanceOhm, resistanceU95Ohm } = resonance;
  return {
    resonance_hz: { value: frequencyHz, u95: frequencyU95Hz },
    ...(resistanceOhm === null || !(resistanceOhm > 0)
      ? {}
      : { resistance_ohm: { value: resistanceOhm, u95: resistanceU95Ohm } }),
  };
}

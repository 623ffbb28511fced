import type { BandMeasures, HistoryRow, MeasuredResonance } from '../../core/record/measures.ts';

/** Rows of a history for tests of what follows from many sweeps. */

export const dayMs = 24 * 3600 * 1000;
export const yearMs = 365.25 * dayMs;

/** A series resonance with a half-width of a few hundred hertz. */
export function resonanceAt(
  frequencyHz: number,
  facts: Partial<MeasuredResonance> = {},
): MeasuredResonance {
  return {
    frequencyHz,
    frequencyU95Hz: 300,
    kind: 'series',
    resistanceOhm: 60,
    resistanceU95Ohm: 0.5,
    swr: 1.2,
    swrU95: 0.01,
    q: 12,
    qU95: 0.2,
    grazing: false,
    ...facts,
  };
}

/** What one sweep measured in the 20 m band. */
export function bandOf(
  resonances: readonly MeasuredResonance[],
  facts: Partial<BandMeasures> = {},
): BandMeasures {
  const at = resonances[0]?.frequencyHz ?? 14.1e6;
  return {
    band: '20m',
    sweptFraction: 1,
    usableFraction: 0.8,
    resonances,
    minimum: { frequencyHz: at, frequencyU95Hz: 400, swr: 1.2, swrU95: 0.01, atEdge: false },
    span: {
      maxSwr: 2,
      lowHz: at - 150e3,
      lowU95Hz: 300,
      highHz: at + 150e3,
      highU95Hz: 400,
      widthHz: 300e3,
      widthU95Hz: 500,
      lowOpen: false,
      highOpen: false,
    },
    flags: [],
    ...facts,
  };
}

/** One sweep of the 20 m band in the history of its antenna. */
export function rowAt(
  measuredAtMs: number,
  bands: readonly BandMeasures[],
  facts: Partial<Omit<HistoryRow, 'measures'>> & {
    readonly measures?: Partial<HistoryRow['measures']>;
  } = {},
): HistoryRow {
  return {
    sweepId: `sweep at ${measuredAtMs}`,
    measuredAtMs,
    analyzerId: 'bench',
    condition: 'dry',
    eraIndex: 0,
    ...facts,
    measures: {
      analysisVersion: '1',
      plane: 'measured',
      phase: 'signed',
      referenceOhm: 50,
      maxSwr: 2,
      bands,
      ...facts.measures,
    },
  };
}

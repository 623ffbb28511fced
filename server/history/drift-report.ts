import { type DriftReport, type DueTest, driftOf } from '../../core/record/drift/drift.ts';
import { driftSeries } from '../../core/record/drift/drift-series.ts';
import type { HistoryRow } from '../../core/record/measures.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord } from '../store/port.ts';
import { clubIntervalDays } from './due-tests.ts';
import { measuredRows } from './measured-rows.ts';

/** The newest sweeps that drift is judged by; the work grows with their square. */
export const mostDriftSweeps = 400;

export interface BandDrift extends DriftReport {
  readonly band: string;
  readonly sweeps: number;
}

export interface AntennaDrift {
  /** Sweeps looked at: the newest ones, all at one plane. */
  readonly sweeps: number;
  /** Sweeps left out since they were taken at the other plane. */
  readonly atOtherPlane: number;
  readonly plane: HistoryRow['measures']['plane'] | null;
  readonly bands: readonly BandDrift[];
}

/** How an antenna fared in each of its design bands, or in every band it was swept in. */
export async function antennaDrift(
  service: Service,
  antenna: AntennaRecord,
  band: string | undefined,
): Promise<AntennaDrift> {
  const filter = band === undefined ? {} : { band };
  const newest = await measuredRows(service, antenna, filter, mostDriftSweeps);
  const all = newest.map(({ row }) => row).toReversed();
  const plane = all.at(-1)?.measures.plane ?? null;
  const rows = all.filter(({ measures }) => measures.plane === plane);
  const due = await dueTest(service, antenna, rows.at(-1));
  const bands = bandsOf(antenna, rows, band).map((name) => {
    const series = driftSeries(rows, name);
    return { band: name, sweeps: series.length, ...driftOf(series, undefined, due) };
  });
  return { sweeps: rows.length, atOtherPlane: all.length - rows.length, plane, bands };
}

function bandsOf(
  antenna: AntennaRecord,
  rows: readonly HistoryRow[],
  band: string | undefined,
): readonly string[] {
  const seen = new Set(rows.flatMap(({ measures }) => measures.bands.map((one) => one.band)));
  const { designBands } = antenna.facts;
  const asked = designBands.length === 0 ? [...seen] : designBands.filter((one) => seen.has(one));
  return band === undefined ? asked : [...seen].filter((one) => one === band);
}

async function dueTest(
  service: Service,
  antenna: AntennaRecord,
  newest: HistoryRow | undefined,
): Promise<DueTest> {
  const { testIntervalDays } = antenna.facts;
  const days = testIntervalDays ?? (await clubIntervalDays(service, antenna.clubId));
  const nowMs = service.now();
  if (days === null || newest === undefined) return { nowMs, dueMs: null };
  return { nowMs, dueMs: newest.measuredAtMs + days * 24 * 3600 * 1000 };
}

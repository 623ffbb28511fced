import type { HistoryRow } from '../../core/record/measures.ts';
import { eraIndexAt, eraStartsMs } from '../../core/record/work.ts';
import { clubCablesOf } from '../lines/club-cables.ts';
import { basisOf, measuresBasis } from '../report-basis.ts';
import { assumptionsOf, readSweepOf } from '../reports.ts';
import type { Service } from '../service.ts';
import type {
  HistoryEntry,
  HistoryFilter,
  HistoryOrder,
  StoredMeasures,
  WorkRecord,
} from '../store/history-store.ts';
import {
  type AnalyzerRecord,
  type AntennaRecord,
  type CableRecord,
  type Page,
  type PageRequest,
  StoreError,
  type SweepRecord,
} from '../store/port.ts';
import { viewOf } from '../sweep-view.ts';
import { storedMeasures } from './measures.ts';

/** One sweep of a history: its record, and its measures as statistics take them. */
export interface MeasuredRow {
  readonly record: SweepRecord;
  readonly row: HistoryRow;
}

/** The part of the service that measures are made from. */
type Kept = Pick<Service, 'store'>;

/** What the measures of an antenna's sweeps follow from, read once for many sweeps. */
interface Judging {
  readonly antenna: AntennaRecord;
  readonly own: readonly CableRecord[];
  readonly analyzers: Map<string, AnalyzerRecord | null>;
}

/**
 * A page of an antenna's history, each sweep with its measures on the present basis. Measures that
 * were made on another one (the limit was edited since) are made anew and kept.
 */
export async function measuredPage(
  service: Service,
  antenna: AntennaRecord,
  filter: HistoryFilter,
  page: PageRequest,
  order: HistoryOrder = 'newest_first',
): Promise<Page<MeasuredRow>> {
  const { store } = service;
  const { clubId, id } = antenna;
  const entries = await store.listHistory(clubId, id, filter, page, order);
  return { items: await measuredEntries(service, antenna, entries.items), next: entries.next };
}

/** Entries of an antenna's history with their measures on the present basis, as `measuredPage`. */
export async function measuredEntries(
  service: Service,
  antenna: AntennaRecord,
  entries: readonly HistoryEntry[],
): Promise<MeasuredRow[]> {
  const startsMs = eraStarts(await service.store.allWork(antenna.clubId, antenna.id));
  const judging = await judgingOf(service, antenna);
  const items: MeasuredRow[] = [];
  for (const { record, stored } of entries) {
    const { measures } = await presentMeasures(service, judging, { record, stored });
    items.push({ record, row: rowOf(record, startsMs, measures) });
  }
  return items;
}

/** The first `most` sweeps of a history in the given order, with their measures. */
export async function measuredRows(
  service: Service,
  antenna: AntennaRecord,
  filter: HistoryFilter,
  most: number,
  order: HistoryOrder = 'newest_first',
): Promise<readonly MeasuredRow[]> {
  const page = { limit: most, after: null };
  return (await measuredPage(service, antenna, filter, page, order)).items;
}

/** One sweep with its measures on the present basis. */
export async function measuredRow(
  service: Service,
  antenna: AntennaRecord,
  record: SweepRecord,
): Promise<HistoryRow> {
  const { store } = service;
  const judging = await judgingOf(service, antenna);
  const made = await madeMeasures(service, judging, record);
  return rowOf(record, eraStarts(await store.allWork(antenna.clubId, antenna.id)), made.measures);
}

/** Makes the measures that a migration left to be made; ends when all are, or when told to stop. */
export async function fillHistory(service: Kept, isStopping: () => boolean): Promise<void> {
  const { store } = service;
  for (;;) {
    const records = await store.listUnmeasured(20);
    if (records.length === 0) return;
    for (const record of records) {
      if (isStopping()) return;
      const { clubId, facts } = record;
      const antenna = await store.findEditable('antennas', clubId, facts.antennaId);
      if (antenna === null) throw new Error(`The antenna of sweep ${record.id} is gone.`);
      const made = await madeMeasures(service, await judgingOf(service, antenna), record);
      await store.keepMeasures(clubId, record.id, made);
    }
  }
}

function eraStarts(work: readonly WorkRecord[]): readonly number[] {
  return eraStartsMs(
    work.map(({ doneAt, facts }) => ({ kind: facts.kind, doneAtMs: Date.parse(doneAt) })),
  );
}

function rowOf(
  { id, facts, receivedAt }: SweepRecord,
  startsMs: readonly number[],
  measures: HistoryRow['measures'],
): HistoryRow {
  const measuredAtMs = Date.parse(facts.measuredAt ?? receivedAt);
  return {
    sweepId: id,
    measuredAtMs,
    analyzerId: facts.analyzerId,
    condition: facts.weather ?? null,
    eraIndex: eraIndexAt(startsMs, measuredAtMs),
    measures,
  };
}

async function judgingOf(service: Kept, antenna: AntennaRecord): Promise<Judging> {
  const own = await clubCablesOf(service, antenna.clubId, antenna.facts.feedLine);
  return { antenna, own, analyzers: new Map() };
}

async function presentMeasures(
  service: Service,
  judging: Judging,
  { record, stored }: HistoryEntry,
): Promise<StoredMeasures> {
  const basis = await basisFor(service, judging, record);
  if (stored !== null && stored.basis === measuresBasis(basis)) return stored;
  const made = await madeMeasures(service, judging, record);
  try {
    await service.store.keepMeasures(record.clubId, record.id, made);
  } catch (error) {
    // What is asked for is known; keeping it only saves time, so a full disk is no reason to refuse.
    if (!(error instanceof StoreError)) throw error;
  }
  return made;
}

async function madeMeasures(
  service: Kept,
  judging: Judging,
  record: SweepRecord,
): Promise<StoredMeasures> {
  const basis = await basisFor(service, judging, record);
  const sweep = await readSweepOf(service, record);
  // At the plane it was taken: a history shows what was measured.
  return storedMeasures(viewOf(basis, sweep, assumptionsOf(record)), basis);
}

async function basisFor(
  { store }: Kept,
  { antenna, own, analyzers }: Judging,
  record: SweepRecord,
) {
  const { analyzerId } = record.facts;
  if (analyzerId !== null && !analyzers.has(analyzerId)) {
    analyzers.set(analyzerId, await store.findEditable('analyzers', record.clubId, analyzerId));
  }
  const analyzer = analyzerId === null ? null : analyzers.get(analyzerId);
  return basisOf(antenna.facts, analyzer?.facts.residualErrors ?? null, own, record);
}

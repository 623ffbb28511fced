import { isGoodBand } from '../../core/record/baseline.ts';
import { byUrgency, type Due, dueOf } from '../../core/record/due.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord, PageRequest } from '../store/port.ts';
import { measuredRows } from './measured-rows.ts';

/** One antenna in the list of what is due. */
export interface DueTest {
  readonly antenna: AntennaRecord;
  readonly due: Due;
  readonly intervalFrom: 'antenna' | 'club' | 'default';
  /** The newest good sweep. */
  readonly lastTest: { readonly sweepId: string; readonly measuredAtMs: number } | null;
}

/** Where neither antenna nor club says otherwise: once a year (common practice, no source). */
export const usualIntervalDays = 365;

/** Among so many of the newest sweeps a good one is looked for. */
const mostLookedAt = 10;

/** How often the club tests antennas that have no interval of their own; null: not at all. */
export async function clubIntervalDays(service: Service, clubId: string): Promise<number | null> {
  const told = await service.store.testInterval(clubId);
  return told === undefined ? usualIntervalDays : told;
}

/** When each antenna of a club is to be tested again, the longest overdue first. */
export async function dueTests(service: Service, clubId: string): Promise<readonly DueTest[]> {
  const told = await service.store.testInterval(clubId);
  const ofClub = told === undefined ? usualIntervalDays : told;
  const tests: DueTest[] = [];
  for (const antenna of await allAntennas(service, clubId)) {
    const own = antenna.facts.testIntervalDays ?? null;
    const lastTest = await lastGoodSweep(service, antenna);
    const due = dueOf({
      addedAtMs: Date.parse(antenna.createdAt),
      lastTestMs: lastTest?.measuredAtMs ?? null,
      intervalDays: own ?? ofClub,
      nowMs: service.now(),
    });
    const fromClub = told === undefined ? 'default' : 'club';
    tests.push({ antenna, due, lastTest, intervalFrom: own === null ? fromClub : 'antenna' });
  }
  return tests.toSorted((a, b) => byUrgency(a.due, b.due));
}

/** Every antenna of a club. */
export async function allAntennas(
  service: Service,
  clubId: string,
): Promise<readonly AntennaRecord[]> {
  const antennas: AntennaRecord[] = [];
  let after: PageRequest['after'] = null;
  do {
    const page: PageRequest = { limit: 500, after };
    const { items, next } = await service.store.listEditables('antennas', clubId, page);
    antennas.push(...items);
    after = next;
  } while (after !== null);
  return antennas;
}

async function lastGoodSweep(
  service: Service,
  antenna: AntennaRecord,
): Promise<DueTest['lastTest']> {
  const rows = await measuredRows(service, antenna, {}, mostLookedAt);
  return rows.find(({ row }) => row.measures.bands.some(isGoodBand))?.row ?? null;
}

import {
  automaticBaseline,
  type BandBaseline,
  chosenBaseline,
} from '../../core/record/baseline.ts';
import type { HistoryRow } from '../../core/record/measures.ts';
import { startsEra } from '../../core/record/work.ts';
import type { Service } from '../service.ts';
import type { ChosenBaseline, WorkRecord } from '../store/history-store.ts';
import type { AntennaRecord } from '../store/port.ts';
import { measuredRow, measuredRows } from './measured-rows.ts';

/** One era of an antenna and what it began with. */
export interface EraBaseline {
  readonly eraIndex: number;
  /** What began it; null for the first. */
  readonly begunBy: WorkRecord | null;
  readonly bands: readonly BandBaseline[];
}

/** An automatic baseline looks at so many sweeps of an era at most. */
const mostLookedAt = 40;

/** The work that began each era of an antenna, oldest first; null for the first era. */
export async function erasOf(
  service: Service,
  antenna: AntennaRecord,
): Promise<readonly (WorkRecord | null)[]> {
  const work = await service.store.allWork(antenna.clubId, antenna.id);
  return [null, ...work.filter(({ facts }) => startsEra(facts.kind))];
}

/** The baseline of each era of an antenna, oldest first: chosen where a member chose one. */
export async function baselinesOf(
  service: Service,
  antenna: AntennaRecord,
): Promise<readonly EraBaseline[]> {
  const eras = await erasOf(service, antenna);
  const chosen = await service.store.chosenBaselines(antenna.clubId, antenna.id);
  const baselines: EraBaseline[] = [];
  for (const eraIndex of eras.keys()) {
    baselines.push(await eraBaseline(service, antenna, eras, chosen, eraIndex));
  }
  return baselines;
}

/** The baseline of those eras of an antenna that are asked for. */
export async function baselinesOfEras(
  service: Service,
  antenna: AntennaRecord,
  eraIndexes: ReadonlySet<number>,
): Promise<readonly EraBaseline[]> {
  if (eraIndexes.size === 0) return [];
  const eras = await erasOf(service, antenna);
  const chosen = await service.store.chosenBaselines(antenna.clubId, antenna.id);
  const baselines: EraBaseline[] = [];
  for (const eraIndex of eraIndexes) {
    baselines.push(await eraBaseline(service, antenna, eras, chosen, eraIndex));
  }
  return baselines;
}

async function eraBaseline(
  service: Service,
  antenna: AntennaRecord,
  eras: readonly (WorkRecord | null)[],
  chosen: readonly ChosenBaseline[],
  eraIndex: number,
): Promise<EraBaseline> {
  const begunBy = eras[eraIndex] ?? null;
  const own = chosen.find(({ era }) => era === (begunBy?.id ?? ''))?.sweepIds ?? [];
  const bands =
    own.length > 0
      ? chosenBaseline(await rowsOf(service, antenna, own))
      : automaticBaseline(await firstRows(service, antenna, begunBy, eras[eraIndex + 1] ?? null));
  return { eraIndex, begunBy, bands };
}

async function rowsOf(
  service: Service,
  antenna: AntennaRecord,
  sweepIds: readonly string[],
): Promise<readonly HistoryRow[]> {
  const rows: HistoryRow[] = [];
  for (const id of sweepIds) {
    const record = await service.store.findSweep(antenna.clubId, id);
    if (record?.facts.antennaId !== antenna.id) continue;
    rows.push(await measuredRow(service, antenna, record));
  }
  return rows.toSorted((a, b) => a.measuredAtMs - b.measuredAtMs);
}

/** The first sweeps of an era at the plane of the first of them. */
async function firstRows(
  service: Service,
  antenna: AntennaRecord,
  begunBy: WorkRecord | null,
  endedBy: WorkRecord | null,
): Promise<readonly HistoryRow[]> {
  const filter = {
    ...(begunBy === null ? {} : { from: begunBy.doneAt }),
    ...(endedBy === null ? {} : { until: endedBy.doneAt }),
  };
  const found = await measuredRows(service, antenna, filter, mostLookedAt, 'oldest_first');
  const rows = found.map(({ row }) => row);
  return rows.filter(({ measures }) => measures.plane === rows[0].measures.plane);
}

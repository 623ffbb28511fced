import { loadResistanceOhm } from '../../core/record/agreement/load-resistance.ts';
import type { DriftSweep } from '../../core/record/drift/drift-series.ts';
import type { Service } from '../service.ts';
import type { LoadCheckRecord } from '../store/port.ts';
import { toSweep } from '../stored-points.ts';

/** Of each analyzer so many of the newest checks are looked at. */
const mostLookedAt = 200;

/** The checks of some analyzers that `isWanted` takes, oldest first. */
export async function loadChecksOf(
  { store }: Service,
  clubId: string,
  analyzerIds: readonly string[],
  isWanted: (check: LoadCheckRecord) => boolean,
): Promise<readonly LoadCheckRecord[]> {
  const page = { limit: mostLookedAt, after: null };
  const lists = await Promise.all(analyzerIds.map((id) => store.listLoadChecks(clubId, id, page)));
  return lists
    .flatMap(({ items }) => items.filter(isWanted))
    .toSorted((a, b) => checkedAtMs(a) - checkedAtMs(b));
}

/** What checks show of each resistor, a series for each, oldest first. Opens and shorts have none. */
export async function loadSeries(
  service: Service,
  checks: readonly LoadCheckRecord[],
): Promise<readonly (readonly DriftSweep[])[]> {
  const series = new Map<number, DriftSweep[]>();
  for (const check of checks) {
    const { loadOhm } = check.facts;
    if (loadOhm === null || loadOhm === 0) continue;
    const value = await resistanceOf(service, check);
    if (value === null) continue;
    const own = series.get(loadOhm) ?? [];
    series.set(loadOhm, [...own, asSweep(check, value)]);
  }
  return [...series.values()];
}

function asSweep(check: LoadCheckRecord, value: number): DriftSweep {
  return {
    sweepId: check.id,
    measuredAtMs: checkedAtMs(check),
    analyzerId: check.facts.analyzerId,
    wetness: 'dry',
    eraIndex: 0,
    values: { resistance_ohm: { value, u95: null } },
    resonant: null,
  };
}

async function resistanceOf(
  { store }: Service,
  { clubId, id, measured }: LoadCheckRecord,
): Promise<number | null> {
  const points = await store.readLoadCheckPoints(clubId, id);
  if (points === null) throw new Error(`The points of check ${id} are gone.`);
  return loadResistanceOhm(toSweep(measured, points));
}

function checkedAtMs({ facts, receivedAt }: LoadCheckRecord): number {
  return Date.parse(facts.measuredAt ?? receivedAt);
}

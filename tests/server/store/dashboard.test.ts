import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { NewSweep } from '../../../server/store/port.ts';
import { standingsQuery } from '../../../server/store/sqlite/dashboard-query.ts';
import type { SqliteStore } from '../../../server/store/sqlite/sqlite-store.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { actorOf, antennaFacts, idOf, newSweep } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
const good = idOf(20);
const spoilt = idOf(21);
let path: string;
let store: SqliteStore;

beforeAll(async () => {
  path = join(newFolder(), 'ledger.sqlite');
  store = await storeWithClub(path);
  for (const id of [good, spoilt]) {
    const facts = antennaFacts(idOf(10));
    await store.addEditable('antennas', actorOf(club), { id, key: `a-${id.slice(-2)}`, facts });
  }
  await add(1000, 10);
});
afterAll(async () => {
  await store.close();
  removeAll();
});

/** So many sweeps of either antenna; all of the second one are spoilt. */
async function add(from: number, count: number): Promise<void> {
  const sweeps = Array.from({ length: count }, (_, i) => [
    sweepAt(from + i, good, []),
    sweepAt(from + i, spoilt, ['values_clipped']),
  ]).flat();
  await Promise.all(sweeps.map((sweep) => store.addSweep(sweep)));
}

function sweepAt(number: number, antenna: string, flags: readonly string[]): NewSweep {
  const id = idOf(number * 100 + Number(antenna.slice(-2)));
  const sweep = newSweep(club, id, antenna, id);
  const { basis, measures } = sweep.measures;
  const bands = measures.bands.map((band) => ({ ...band, flags }));
  const measuredAt = new Date(Date.parse('2020-01-01T00:00:00Z') + number * 3600_000).toISOString();
  return {
    ...sweep,
    record: { ...sweep.record, facts: { ...sweep.record.facts, measuredAt } },
    measures: { basis, measures: { ...measures, bands } },
  };
}

/** How many rows of history and measures the query looks at, counted by a function in it. */
function rowsLookedAt(hand: Database.Database): number {
  let rows = 0;
  hand.function('counted', (value) => {
    rows += 1;
    return value;
  });
  const counting = standingsQuery
    .replaceAll(
      'SELECT sweep_id, sort_at FROM history',
      'SELECT counted(sweep_id) AS sweep_id, sort_at FROM history',
    )
    .replaceAll('json_each(judged.measures,', 'json_each(counted(judged.measures),');
  expect(counting.match(/counted\(/g)).toHaveLength(3);
  hand.prepare(counting).all({ clubId: club });
  return rows;
}

describe('how the antennas of a club stand', () => {
  it('is the newest good sweep of each design band, and the newest of all', async () => {
    const newest = (antenna: string) => idOf(1009 * 100 + Number(antenna.slice(-2)));
    const standings = await store.listStandings(club);
    const ids = standings.map(({ antennaId, band, entry }) => [antennaId, band, entry.record.id]);
    expect(ids).toEqual([
      [good, '20m', newest(good)],
      [good, null, newest(good)],
      [spoilt, null, newest(spoilt)],
    ]);
    expect(await store.listStandings(idOf(999))).toEqual([]);
  });

  it('costs the same by two thousand sweeps: from an index, by rows that do not grow', async () => {
    const hand = new Database(path);
    const few = rowsLookedAt(hand);
    await add(2000, 1000);
    hand.exec('ANALYZE');
    hand.close();
    const again = new Database(path);
    const plan = again.prepare<unknown[], { readonly detail: string }>(
      `EXPLAIN QUERY PLAN ${standingsQuery}`,
    );
    const steps = plan.all({ clubId: club }).map(({ detail }) => detail);
    expect(steps.filter((step) => /^SEARCH history USING COVERING INDEX/.test(step))).toHaveLength(
      2,
    );
    // Scanned is only what does not grow with sweeps: antennas, their bands, the newest eight, flags.
    const scanned = steps.filter((step) => /^SCAN/.test(step));
    expect(scanned.length).toBeGreaterThanOrEqual(3);
    for (const step of scanned) {
      expect(step).toMatch(
        /^SCAN (antenna$|(wanted|part|flag) .*VIRTUAL TABLE|recent$|\(subquery-\d+\)$)/,
      );
    }
    expect(steps.join('\n')).not.toMatch(/TEMP B-TREE/);
    expect(again.prepare('SELECT count(*) FROM sweep').pluck().get()).toBe(2020);
    expect(rowsLookedAt(again)).toBe(few);
    again.close();
  });
});

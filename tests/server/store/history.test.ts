import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { fillHistory } from '../../../server/history/measured-rows.ts';
import { projectRoot } from '../../../server/project-files.ts';
import type { HistoryFilter, HistoryOrder } from '../../../server/store/history-store.ts';
import type { NewSweep, PageRequest } from '../../../server/store/port.ts';
import { openWriter } from '../../../server/store/sqlite/connection.ts';
import { migrate, readMigrations } from '../../../server/store/sqlite/migrations.ts';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { packPoints } from '../../../server/store/sqlite/points-codec.ts';
import type { SqliteStore } from '../../../server/store/sqlite/sqlite-store.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { actorOf, antennaFacts, at, idOf, newSweep } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
const antenna = idOf(20);
const all: PageRequest = { limit: 10, after: null };
let path: string;
let store: SqliteStore;
beforeEach(async () => {
  path = join(newFolder(), 'ledger.sqlite');
  store = await storeWithClub(path);
});
afterEach(async () => {
  await store.close();
  removeAll();
});

function sweepOn(day: number, facts: Partial<NewSweep['record']['facts']> = {}): NewSweep {
  const sweep = newSweep(club, idOf(100 + day), antenna, `day ${day}`);
  const measuredAt = `2026-01-${String(day).padStart(2, '0')}T12:00:00.000Z`;
  return {
    ...sweep,
    record: { ...sweep.record, facts: { ...sweep.record.facts, measuredAt, ...facts } },
  };
}

async function days(filter: HistoryFilter = {}, order?: HistoryOrder): Promise<readonly string[]> {
  const { items } = await store.listHistory(club, antenna, filter, all, order);
  return items.map(({ record }) => record.id.slice(-2));
}

describe('the history of an antenna in the store', () => {
  beforeEach(async () => {
    await store.addSweep(sweepOn(3, { weather: 'dry', analyzerId: idOf(50) }));
    await store.addSweep(sweepOn(1, { weather: 'rain', analyzerId: idOf(50) }));
    await store.addSweep(sweepOn(2));
  });

  it('is in the order of measurement, from either end', async () => {
    expect(await days()).toEqual(['03', '02', '01']);
    expect(await days({}, 'oldest_first')).toEqual(['01', '02', '03']);
  });

  it('begins where it is asked to, that instant among it, and ends before another', async () => {
    const from = '2026-01-02T12:00:00.000Z';
    const until = '2026-01-03T12:00:00.000Z';
    for (const order of ['newest_first', 'oldest_first'] as const) {
      expect(await days({ from, until }, order)).toEqual(['02']);
    }
  });

  it('is limited by band, weather and analyzer in every combination', async () => {
    const analyzerId = idOf(50);
    for (const order of ['newest_first', 'oldest_first'] as const) {
      expect(await days({ band: '20m', analyzerId, weather: 'rain' }, order)).toEqual(['01']);
      expect(await days({ analyzerId: null, weather: null }, order)).toEqual(['02']);
      expect(await days({ band: '40m' }, order)).toEqual([]);
    }
  });

  it('goes on by pages from either end', async () => {
    for (const order of ['newest_first', 'oldest_first'] as const) {
      const page = { limit: 2, after: null };
      const { items, next } = await store.listHistory(club, antenna, {}, page, order);
      const rest = await store.listHistory(club, antenna, {}, { limit: 2, after: next }, order);
      const ids = [...items, ...rest.items].map(({ record }) => record.id);
      expect(new Set(ids).size).toBe(3);
      expect(rest.next).toBeNull();
    }
  });

  it('is told to no other club', async () => {
    expect((await store.listHistory(idOf(3), antenna, {}, all)).items).toEqual([]);
  });

  it('takes measures that were made anew in place of the old ones', async () => {
    const [{ record, stored }] = (await store.listHistory(club, antenna, {}, all)).items;
    if (stored === null) throw new Error('It was stored with measures.');
    const [band] = stored.measures.bands;
    const measures = { ...stored.measures, bands: [{ ...band, band: '40m' }] };
    await store.keepMeasures(club, record.id, { basis: 'another', measures });
    expect(await days({ band: '40m' })).toEqual(['03']);
    expect(await days({ band: '20m' })).toEqual(['02', '01']);
    const [now] = (await store.listHistory(club, antenna, {}, all)).items;
    expect(now.stored).toEqual({ basis: 'another', measures });
  });
});

describe('work on an antenna in the store', () => {
  it('is found, listed and kept in the order in which it was done', async () => {
    const facts = {
      kind: 'moved',
      lengthChangeM: null,
      doneBy: null,
      note: '',
      invented: true,
    } as const;
    for (const [n, doneAt] of [
      [1, '2026-02-02T00:00:00.000Z'],
      [2, '2026-02-01T00:00:00.000Z'],
    ] as const) {
      await store.addWork(actorOf(club), { id: idOf(n), antennaId: antenna, doneAt, facts });
    }
    expect((await store.allWork(club, antenna)).map(({ id }) => id)).toEqual([idOf(2), idOf(1)]);
    const page = await store.listWork(club, antenna, { limit: 1, after: null });
    expect(page.items.map(({ id }) => id)).toEqual([idOf(1)]);
    const rest = await store.listWork(club, antenna, { limit: 1, after: page.next });
    expect(rest.items.map(({ id }) => id)).toEqual([idOf(2)]);
    expect(await store.findWork(club, idOf(1))).toMatchObject({ addedAt: at, facts });
    expect(await store.findWork(idOf(3), idOf(1))).toBeNull();
  });
});

describe('a store from before there were histories', () => {
  it('has its sweeps in them after the migration, and their measures once these are made', async () => {
    await store.close();
    path = join(newFolder(), 'older.sqlite');
    await writeOlderFile(sweepOn(1));
    const { record } = sweepOn(1);
    store = await openSqliteStore({ path });
    await store.addEditable('antennas', actorOf(club), {
      id: antenna,
      key: 'dipole',
      facts: antennaFacts(idOf(10)),
    });
    const [before] = (await store.listHistory(club, antenna, {}, all)).items;
    expect(before).toEqual({ record, stored: null });
    expect(await days({ band: '20m' })).toEqual([]);

    await fillHistory({ store }, () => true);
    expect(await store.listUnmeasured(10)).toEqual([record]);
    await fillHistory({ store }, () => false);
    expect(await store.listUnmeasured(10)).toEqual([]);
    const [after] = (await store.listHistory(club, antenna, { band: '20m' }, all)).items;
    expect(after.stored?.measures.bands[0]?.sweptFraction).toBeCloseTo(200 / 350, 6);
  });
});

/** A file as the service before wrote it, with one sweep. */
async function writeOlderFile({ record, file, points }: NewSweep): Promise<void> {
  const { id, facts, measured, receivedAt, uploadedBy } = record;
  const migrations = readMigrations(join(projectRoot(), 'migrations'));
  const first = migrations.findIndex(({ name }) => name.includes('history'));
  expect(first).toBeGreaterThan(0);
  const hand = openWriter(path);
  migrate(hand, migrations.slice(0, first), at, () => {});
  const sha256 = Buffer.from(measured.fileSha256, 'hex');
  const insert = (table: string, ...values: unknown[]) =>
    hand
      .prepare(`INSERT INTO ${table} VALUES (${values.map(() => '?').join(', ')})`)
      .run(...values);
  insert('club (id, key, name, invented, created_at)', club, 'ours', 'Ours', 1, at);
  insert(
    'file (club_id, sha256, bytes, codec, body)',
    club,
    sha256,
    file.length,
    'none',
    Buffer.from(file),
  );
  insert(
    'sweep (club_id, id, received_at, uploaded_by, file_sha256, measured, points)',
    club,
    id,
    receivedAt,
    uploadedBy,
    sha256,
    JSON.stringify(measured),
    packPoints(points),
  );
  insert(
    'sweep_facts (club_id, sweep_id, revision, facts, at, member_id)',
    club,
    id,
    1,
    JSON.stringify(facts),
    at,
    uploadedBy,
  );
  insert(
    'sweep_current (club_id, sweep_id, revision, antenna_id, sort_at)',
    club,
    id,
    1,
    facts.antennaId,
    facts.measuredAt,
  );
  hand.close();
}

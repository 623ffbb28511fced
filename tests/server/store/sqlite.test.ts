import {
  copyFileSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  writeFileSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, describe, expect, it } from 'vitest';
import { projectRoot } from '../../../server/project-files.ts';
import {
  checkSqliteVersion,
  openReader,
  openWriter,
} from '../../../server/store/sqlite/connection.ts';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { listQueries } from '../../../server/store/sqlite/reader.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { actorOf, idOf, newSweep, siteFacts } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';
import { describeStore } from './conformance.ts';

const { newFolder, removeAll } = temporaryFolders();
afterEach(removeAll);

describeStore('a SQLite file', async () => {
  const store = await openSqliteStore({ path: join(newFolder(), 'ledger.sqlite') });
  return { store, close: () => store.close() };
});

describe('the database file', () => {
  it('is written with every commit flushed, and read without writing', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    const store = await storeWithClub(path);
    await store.close();
    const writer = openWriter(path);
    expect(writer.pragma('synchronous', { simple: true })).toBe(2);
    expect(writer.pragma('journal_mode', { simple: true })).toBe('wal');
    expect(writer.pragma('page_size', { simple: true })).toBe(8192);
    expect(writer.pragma('foreign_keys', { simple: true })).toBe(1);
    expect(writer.pragma('trusted_schema', { simple: true })).toBe(0);
    const reader = openReader(path);
    expect(() => reader.exec('DELETE FROM club')).toThrow(/readonly/);
    reader.close();
    writer.close();
  });

  it('lets no hand change what was measured', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    const store = await storeWithClub(path);
    await store.addEditable('sites', actorOf(club), { id: idOf(5), key: 's', facts: siteFacts });
    await store.addSweep(newSweep(club, idOf(30), idOf(20), 'x'));
    const check = newSweep(club, idOf(31), idOf(20), 'check');
    const facts = { analyzerId: idOf(7), loadOhm: 50, measuredAt: null, note: '', invented: true };
    await store.addLoadCheck({ ...check, record: { ...check.record, facts } });
    await store.close();
    const hand = new Database(path);
    const kept = [
      'load_check',
      'file',
      'sweep',
      'sweep_facts',
      'summary',
      'resource_revision',
      'event',
    ];
    for (const table of kept) {
      expect(() => hand.exec(`DELETE FROM ${table}`), table).toThrow(/is kept/);
      expect(() => hand.exec(`UPDATE ${table} SET club_id = 'x'`), table).toThrow(/is kept/);
    }
    expect(() => hand.exec('DELETE FROM resource')).toThrow(/is kept/);
    expect(() => hand.exec('DELETE FROM sweep_current')).toThrow(/is kept/);
    hand.close();
    const writer = openWriter(path);
    for (const table of kept) {
      const replacing = `REPLACE INTO ${table} SELECT * FROM ${table}`;
      expect(() => writer.exec(replacing), table).toThrow(/is kept/);
    }
    writer.close();
  });

  it('answers every list from an index, without sorting', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    const store = await storeWithClub(path);
    await store.close();
    const hand = new Database(path);
    const queries = Object.entries(listQueries);
    expect(queries.length).toBeGreaterThanOrEqual(3);
    for (const [name, sql] of queries) {
      const parameters = Object.fromEntries(
        [...sql.matchAll(/@(\w+)/g)].map(([, parameter]) => [parameter, '']),
      );
      const plan = hand.prepare(`EXPLAIN QUERY PLAN ${sql}`).all({ ...parameters, limit: 1 });
      expect(JSON.stringify(plan), name).not.toMatch(/SCAN|TEMP B-TREE/);
    }
    hand.close();
  });

  it('is told from the file of another program, which stays as it was', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    const other = new Database(path);
    other.exec('CREATE TABLE theirs (x)');
    other.close();
    const before = readFileSync(path);
    await expect(openSqliteStore({ path })).rejects.toMatchObject({ kind: 'unavailable' });
    expect(readFileSync(path).equals(before)).toBe(true);
  });

  it('is told as corrupt where it is no database at all', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    writeFileSync(path, 'not a database '.repeat(1000));
    await expect(openSqliteStore({ path })).rejects.toMatchObject({ kind: 'corrupt' });
  });

  it('finds a changed byte of a kept file', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    const store = await storeWithClub(path);
    await store.addSweep(newSweep(club, idOf(30), idOf(20), 'short'));
    await store.addSweep(newSweep(club, idOf(31), idOf(20), 'whole'));
    await store.close();
    const hand = new Database(path);
    hand.exec('DROP TRIGGER file_is_kept_update');
    const changed = hand
      .prepare("UPDATE file SET body = CAST('shore' AS BLOB) WHERE body = CAST('short' AS BLOB)")
      .run();
    expect(changed.changes).toBe(1);
    hand.close();
    const reopened = await openSqliteStore({ path });
    await expect(reopened.readSweepFile(club, idOf(30))).rejects.toMatchObject({ kind: 'corrupt' });
    expect(await reopened.readSweepFile(club, idOf(31))).not.toBeNull();
    await reopened.close();
  });
});

describe('SQLite versions', () => {
  it.each(['3.51.2', '3.46.1', '2.8.17', '3.52.0'])('%s is refused', (version) => {
    expect(() => checkSqliteVersion(version)).toThrow(/not safe/);
  });
  it.each(['3.51.3', '3.53.2', '4.0.0'])('%s is taken', (version) => {
    expect(() => checkSqliteVersion(version)).not.toThrow();
  });
});

describe('a full disk', () => {
  it('refuses the sweep that does not fit whole, goes on reading, and recovers', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    const store = await storeWithClub(path, { maxPages: 60 });
    await store.addSweep(newSweep(club, idOf(30), idOf(20), 'fits'));
    const big = newSweep(club, idOf(31), idOf(20), 'too big');
    // Roots of whole numbers have no few decimal places: eight bytes each, more than 60 pages.
    const frequencyHz = Float64Array.from({ length: 90_000 }, (_, i) => Math.sqrt(i + 2));
    const tooBig = { ...big, points: { ...big.points, frequencyHz } };
    await expect(store.addSweep(tooBig)).rejects.toMatchObject({ kind: 'full' });
    const [, beside] = await Promise.allSettled([
      store.addSweep(tooBig),
      store.addSweep(newSweep(club, idOf(33), idOf(20), 'beside it')),
    ]);
    expect(beside.status).toBe('fulfilled');
    expect(await store.findSweep(club, idOf(31))).toBeNull();
    expect(await store.findSweep(club, idOf(30))).not.toBeNull();
    const small = await store.addSweep(newSweep(club, idOf(32), idOf(20), 'fits again'));
    expect(small.outcome).toBe('added');
    await store.close();
  });
});

describe('migrations', () => {
  const released = join(projectRoot(), 'migrations');

  function copyOfMigrations(): string {
    const folder = join(newFolder(), 'migrations');
    mkdirSync(folder);
    for (const name of readdirSync(released))
      copyFileSync(join(released, name), join(folder, name));
    return folder;
  }

  it('refuse a schema newer than they know', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    await (await storeWithClub(path)).close();
    const hand = new Database(path);
    hand.pragma('user_version = 99');
    hand.close();
    await expect(openSqliteStore({ path })).rejects.toThrow(/newer service/);
  });

  it('refuse to go on from a file that was edited after it was applied', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    await (await storeWithClub(path)).close();
    const migrationsFolder = copyOfMigrations();
    writeFileSync(join(migrationsFolder, '0001_initial.sql'), '-- edited\n');
    await expect(openSqliteStore({ path, migrationsFolder })).rejects.toThrow(/was changed/);
  });

  it('keep a verified copy of what was there before a change, whatever copies there are', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    await (await storeWithClub(path)).close();
    const migrationsFolder = copyOfMigrations();
    const next = readdirSync(migrationsFolder).length + 1;
    const name = `${String(next).padStart(4, '0')}_more.sql`;
    writeFileSync(join(migrationsFolder, name), 'CREATE TABLE more (x INTEGER) STRICT;\n');
    writeFileSync(`${path}.schema-${next - 1}`, 'of an earlier try');
    const now = () => Date.parse('2026-06-01T12:00:00.000Z');
    const store = await openSqliteStore({ path, migrationsFolder, now });
    expect((await store.listClubs()).length).toBe(1);
    await store.close();
    const copy = `${path}.schema-${next - 1}-20260601T120000000Z`;
    const kept = new Database(copy, { readonly: true });
    expect(kept.prepare('SELECT count(*) FROM club').pluck().get()).toBe(1);
    expect(existsSync(`${copy}.part`)).toBe(false);
    kept.close();
  });

  it('leave nothing of one that fails', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    await (await storeWithClub(path)).close();
    const migrationsFolder = copyOfMigrations();
    const next = readdirSync(migrationsFolder).length + 1;
    const name = `${String(next).padStart(4, '0')}_broken.sql`;
    writeFileSync(
      join(migrationsFolder, name),
      'CREATE TABLE half (x INTEGER) STRICT; nonsense;\n',
    );
    await expect(openSqliteStore({ path, migrationsFolder })).rejects.toThrow(/nonsense/);
    expect(readdirSync(dirname(path))).toEqual(['ledger.sqlite']);
    const store = await openSqliteStore({ path });
    expect((await store.listClubs()).length).toBe(1);
    await store.close();
    const hand = new Database(path);
    expect(
      hand.prepare("SELECT count(*) FROM sqlite_schema WHERE name = 'half'").pluck().get(),
    ).toBe(0);
    hand.close();
  });
});

describe('a backup', () => {
  it('is a whole store of its own, made while records come in', async () => {
    const folder = newFolder();
    const store = await storeWithClub(join(folder, 'ledger.sqlite'));
    const uploads = Array.from({ length: 20 }, (_, i) =>
      store.addSweep(newSweep(club, idOf(100 + i), idOf(20), `sweep ${i}`)),
    );
    await Promise.all(uploads.slice(0, 10));
    await store.backup(join(folder, 'backup.sqlite'));
    await Promise.all(uploads);
    await store.close();
    expect(readdirSync(folder).filter((name) => name.endsWith('.part'))).toEqual([]);
    const restored = await openSqliteStore({ path: join(folder, 'backup.sqlite') });
    expect(await restored.readSweepFile(club, idOf(105))).not.toBeNull();
    await restored.close();
  });

  it('that cannot be finished leaves nothing', async () => {
    const folder = newFolder();
    const store = await storeWithClub(join(folder, 'ledger.sqlite'));
    const taken = join(folder, 'taken');
    mkdirSync(taken);
    await expect(store.backup(taken)).rejects.toMatchObject({ kind: 'unavailable' });
    expect(existsSync(`${taken}.part`)).toBe(false);
    await store.close();
  });

  it('is refused where a file of it does not match its hash', async () => {
    const folder = newFolder();
    const path = join(folder, 'ledger.sqlite');
    const store = await storeWithClub(path);
    await store.addSweep(newSweep(club, idOf(30), idOf(20), 'a line of a file\n'.repeat(100)));
    const hand = new Database(path);
    hand.exec("DROP TRIGGER file_is_kept_update; UPDATE file SET body = x'00'");
    hand.close();
    await expect(store.backup(join(folder, 'backup.sqlite'))).rejects.toMatchObject({
      kind: 'corrupt',
    });
    expect(existsSync(join(folder, 'backup.sqlite'))).toBe(false);
    await store.close();
  });
});

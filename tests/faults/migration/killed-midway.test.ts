import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { copyFileSync, mkdirSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import Database from 'better-sqlite3';
import { afterEach, describe, expect, it } from 'vitest';
import { projectRoot } from '../../../server/project-files.ts';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { idOf, newSweep } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
afterEach(removeAll);

const opener = new URL('./open-store.ts', import.meta.url).pathname;
const released = join(projectRoot(), 'migrations');
const next = readdirSync(released).length + 1;
const mebibyte = 1024 * 1024;

/** Writes more than the page cache holds, so that the log grows before the commit, then never ends. */
const endless = `
CREATE TABLE slow (x BLOB) STRICT;
INSERT INTO slow WITH RECURSIVE n (i) AS (SELECT 1 UNION ALL SELECT i + 1 FROM n LIMIT 64) SELECT randomblob(1048576) FROM n;
CREATE TABLE later (x INTEGER) STRICT;
INSERT INTO later WITH RECURSIVE n (i) AS (SELECT 1 UNION ALL SELECT i + 1 FROM n) SELECT count(*) FROM n;
`;

function migrationsAnd(sql: string): string {
  const folder = join(newFolder(), 'migrations');
  mkdirSync(folder);
  for (const name of readdirSync(released)) copyFileSync(join(released, name), join(folder, name));
  writeFileSync(join(folder, `${String(next).padStart(4, '0')}_slow.sql`), sql);
  return folder;
}

async function storeWithSweep(): Promise<string> {
  const path = join(newFolder(), 'ledger.sqlite');
  const store = await storeWithClub(path);
  await store.addSweep(newSweep(club, idOf(30), idOf(20), 'before'));
  await store.close();
  return path;
}

/** Opens the store in a process and kills that once the log of writes has so many bytes. */
async function killAtLogSize(path: string, migrations: string, way: string, bytes: number) {
  const args = ['--import', 'tsx', opener, path, migrations, way];
  // The limit only ends a process that never gets there; the test then fails by the signal.
  const child = spawn(process.execPath, args, {
    stdio: ['ignore', 'inherit', 'inherit'],
    timeout: 60_000,
  });
  const ended = once(child, 'exit');
  while (child.exitCode === null && child.signalCode === null && logBytes(path) < bytes)
    await pause(5);
  child.kill('SIGKILL');
  const [, signal] = await ended;
  expect(signal).toBe('SIGKILL');
}

function logBytes(path: string): number {
  return statSync(`${path}-wal`, { throwIfNoEntry: false })?.size ?? 0;
}

/** Version and whether the migration's first table is there. */
function schemaOf(path: string) {
  const hand = new Database(path);
  const version: unknown = hand.pragma('user_version', { simple: true });
  const integrity: unknown = hand.pragma('integrity_check', { simple: true });
  const tables = hand.prepare("SELECT count(*) FROM sqlite_schema WHERE name = 'slow'").pluck();
  const found = { version, integrity, slowTables: tables.get() };
  hand.close();
  return found;
}

describe('a migration killed midway', () => {
  it.each([1, 16, 40])(
    '(with %i MiB in the log of writes) leaves the schema before it, and all records',
    async (size) => {
      const path = await storeWithSweep();
      await killAtLogSize(path, migrationsAnd(endless), 'as-served', size * mebibyte);
      expect(schemaOf(path)).toEqual({ version: next - 1, integrity: 'ok', slowTables: 0 });

      const quick = migrationsAnd('CREATE TABLE slow (x BLOB) STRICT;');
      const store = await openSqliteStore({ path, migrationsFolder: quick });
      expect(String(await store.readSweepFile(club, idOf(30)))).toBe('before');
      await store.close();
      expect(schemaOf(path)).toEqual({ version: next, integrity: 'ok', slowTables: 1 });
    },
  );

  it('would be found between two schemas if it ran without a transaction', async () => {
    const path = await storeWithSweep();
    await killAtLogSize(path, migrationsAnd(endless), 'bare', 40 * mebibyte);
    expect(schemaOf(path)).toEqual({ version: next - 1, integrity: 'ok', slowTables: 1 });
  });
});

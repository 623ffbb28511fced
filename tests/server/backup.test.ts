import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import Fastify from 'fastify';
import { afterEach, describe, expect, it } from 'vitest';
import { backupsIn, scheduleBackups } from '../../server/backup-schedule.ts';
import { makeLog } from '../../server/log.ts';
import { measureRequests } from '../../server/metrics.ts';
import { ledgerPath } from '../../server/store/ledger-path.ts';
import { openSqliteStore } from '../../server/store/sqlite/open.ts';
import { club, storeWithClub } from '../support/open-test-store.ts';
import { idOf, newSweep } from '../support/store-records.ts';
import { temporaryFolders } from '../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
afterEach(removeAll);

/** Runs the built command as `npm run` does. */
function run(command: 'backup' | 'restore', file: string, dataDir: string) {
  const program = new URL(`../../dist/server/${command}.js`, import.meta.url).pathname;
  const env = { PATH: process.env['PATH'], DATA_DIR: dataDir };
  return spawnSync(process.execPath, [program, file], { env, encoding: 'utf8' });
}

async function ledgerWithSweep() {
  const folder = newFolder();
  const store = await storeWithClub(ledgerPath(folder));
  await store.addSweep(newSweep(club, idOf(30), idOf(20), 'a line of a file\n'.repeat(100)));
  return { folder, store };
}

describe('a backup on demand', () => {
  it('is made beside a running service, and restored into an empty folder', async () => {
    const { folder, store } = await ledgerWithSweep();
    const file = join(newFolder(), 'kept.sqlite');
    expect(run('backup', file, folder)).toMatchObject({ status: 0, stderr: '' });
    const sent = await store.readSweepFile(club, idOf(30));
    await store.close();

    const fresh = join(newFolder(), 'fresh');
    expect(run('restore', file, fresh)).toMatchObject({ status: 0, stderr: '' });
    expect(readdirSync(fresh)).toEqual(['ledger.sqlite']);
    const restored = await openSqliteStore({ path: ledgerPath(fresh) });
    expect(await restored.readSweepFile(club, idOf(30))).toEqual(sent);
    await restored.close();
  });

  it('never takes the place of a file', async () => {
    const { folder, store } = await ledgerWithSweep();
    await store.close();
    const file = join(newFolder(), 'taken');
    writeFileSync(file, 'what was there');
    expect(run('backup', file, folder)).toMatchObject({ status: 1 });
    expect(readFileSync(file, 'utf8')).toBe('what was there');
  });

  it('says so where there is no ledger, and makes none', () => {
    const folder = newFolder();
    const { status, stderr } = run('backup', join(folder, 'kept.sqlite'), folder);
    expect(status).toBe(1);
    expect(stderr).toMatch(/no ledger/);
    expect(readdirSync(folder)).toEqual([]);
  });
});

describe('restoring', () => {
  async function backupFile(): Promise<string> {
    const { store } = await ledgerWithSweep();
    const file = join(newFolder(), 'kept.sqlite');
    await store.backup(file);
    await store.close();
    return file;
  }

  it('leaves a ledger alone that is in use, or was', async () => {
    const file = await backupFile();
    const { folder, store } = await ledgerWithSweep();
    await store.addSweep(newSweep(club, idOf(31), idOf(20), 'newer than the backup'));
    expect(run('restore', file, folder)).toMatchObject({ status: 1 });
    expect(await store.findSweep(club, idOf(31))).not.toBeNull();
    await store.close();
    const before = readFileSync(ledgerPath(folder));
    expect(run('restore', file, folder)).toMatchObject({ status: 1 });
    expect(readFileSync(ledgerPath(folder)).equals(before)).toBe(true);
  });

  it('refuses a folder where a log was left that would be played into the ledger', async () => {
    const file = await backupFile();
    const folder = newFolder();
    writeFileSync(`${ledgerPath(folder)}-wal`, '');
    expect(run('restore', file, folder)).toMatchObject({ status: 1 });
    expect(existsSync(ledgerPath(folder))).toBe(false);
  });

  it.each([
    [
      'a byte of a file was changed',
      "DROP TRIGGER file_is_kept_update; UPDATE file SET body = x'00'",
    ],
    ['a row lost its parent', 'DROP TRIGGER file_is_kept_delete; DELETE FROM file'],
    [
      'an entry of the audit trail was changed',
      "DROP TRIGGER audit_is_kept_update; UPDATE audit SET act = 'x'",
    ],
    ['the database is of another program', 'PRAGMA application_id = 1'],
  ])('refuses a backup in which %s, and leaves nothing', async (_fault, sql) => {
    const file = await backupFile();
    const hand = new Database(file);
    hand.pragma('foreign_keys = 0');
    hand.exec(sql);
    hand.close();
    const folder = join(newFolder(), 'fresh');
    expect(run('restore', file, folder)).toMatchObject({ status: 1 });
    expect(readdirSync(folder)).toEqual([]);
  });

  it('refuses a file that is no database', () => {
    const folder = newFolder();
    const file = join(folder, 'text');
    writeFileSync(file, 'not a database '.repeat(1000));
    const { status, stderr } = run('restore', file, join(folder, 'fresh'));
    expect(status).toBe(1);
    expect(stderr).not.toMatch(/ at /);
    expect(readdirSync(join(folder, 'fresh'))).toEqual([]);
  });
});

describe('backups by the clock', () => {
  const hour = 3_600_000;
  const clock = { ms: Date.parse('2026-06-01T12:00:00Z') };
  const now = () => clock.ms;
  const log = makeLog('silent');

  it('are made when the newest is old enough, and the oldest go', async () => {
    const { folder, store } = await ledgerWithSweep();
    const plan = { folder: join(folder, 'backups'), everyHours: 24, keep: 2 };
    const backups = scheduleBackups(store, now, log, plan);
    expect(backups.lastGoodAt()).toBeNull();
    for (const hours of [0, 23, 1, 24]) {
      clock.ms += hours * hour;
      await backups.makeIfDue();
    }
    expect(backupsIn(plan.folder)).toEqual([
      'ledger-20260602T120000Z.sqlite',
      'ledger-20260603T120000Z.sqlite',
    ]);
    expect(backups.lastGoodAt()).toBe(clock.ms);
    backups.stop();

    // A restart goes on from what is there.
    const again = scheduleBackups(store, now, log, plan);
    expect(again.lastGoodAt()).toBe(clock.ms);
    await again.makeIfDue();
    expect(backupsIn(plan.folder)).toHaveLength(2);
    again.stop();
    await store.close();
  });

  it('are told in the metrics by their begin, or not at all', () => {
    const name = 'sweep_ledger_last_backup_timestamp_seconds';
    expect(measureRequests(Fastify(), () => 5000)()).toContain(`\n${name} 5\n`);
    expect(measureRequests(Fastify(), () => null)()).not.toContain(name);
  });

  it('that fail leave the good ones and their age, and are tried again', async () => {
    const folder = newFolder();
    writeFileSync(join(folder, 'ledger-20260101T000000Z.sqlite'), '');
    writeFileSync(join(folder, 'ledger-20260102T000000Z.sqlite.part'), 'of a killed process');
    let tries = 0;
    const failing = {
      backup: async () => {
        tries += 1;
        throw new Error('the disk is gone');
      },
    };
    const backups = scheduleBackups(failing, now, log, { folder, everyHours: 24, keep: 1 });
    await backups.makeIfDue();
    await backups.makeIfDue();
    expect(tries).toBe(2);
    expect(backups.lastGoodAt()).toBe(Date.parse('2026-01-01T00:00:00Z'));
    expect(readdirSync(folder)).toEqual(['ledger-20260101T000000Z.sqlite']);
    backups.stop();
  });

  it('do not wait for a clock that was wrong to be right', async () => {
    const folder = newFolder();
    mkdirSync(folder, { recursive: true });
    writeFileSync(join(folder, 'ledger-20990101T000000Z.sqlite'), '');
    const made: string[] = [];
    const store = { backup: async (path: string) => void made.push(path) };
    const backups = scheduleBackups(store, now, log, { folder, everyHours: 24, keep: 7 });
    await backups.makeIfDue();
    expect(made).toHaveLength(1);
    backups.stop();
  });
});

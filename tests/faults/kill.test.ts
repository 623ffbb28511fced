import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { once } from 'node:events';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openSqliteStore } from '../../server/store/sqlite/open.ts';
import { club, storeWithClub } from '../support/open-test-store.ts';
import { idOf, newSweep } from '../support/store-records.ts';
import { temporaryFolders } from '../support/temporary-folders.ts';

const client = new URL('./keep-uploading.ts', import.meta.url).pathname;
const { newFolder, removeAll } = temporaryFolders();
afterAll(removeAll);

interface Acknowledged {
  readonly id: string;
  readonly sha256: string;
}

/** Lets a client upload until so many sweeps are acknowledged, then kills it outright. */
async function uploadUntilKilled(
  path: string,
  first: number,
  killAfter: number,
  acknowledge: 'when-kept' | 'early',
): Promise<readonly Acknowledged[]> {
  const args = ['--import', 'tsx', client, path, String(first), acknowledge];
  const child = spawn(process.execPath, args, { stdio: ['ignore', 'pipe', 'inherit'] });
  let output = '';
  child.stdout.on('data', (chunk: Buffer) => {
    output += chunk;
    if (output.split('\n').length > killAfter) child.kill('SIGKILL');
  });
  const [, signal] = await once(child, 'close');
  expect(signal).toBe('SIGKILL');
  return output
    .split('\n')
    .slice(0, -1)
    .map((line) => line.split(' '))
    .map(([id, sha256]) => ({ id, sha256 }));
}

/** The acknowledged sweeps of which anything is not there or not what it was. */
async function lostOf(path: string, acknowledged: readonly Acknowledged[]) {
  const { points, summary } = newSweep(club, idOf(1), idOf(20), '');
  const store = await openSqliteStore({ path });
  const lost: Acknowledged[] = [];
  for (const sweep of acknowledged) {
    const file = (await store.readSweepFile(club, sweep.id)) ?? new Uint8Array();
    const isWhole =
      createHash('sha256').update(file).digest('hex') === sweep.sha256 &&
      (await store.findSweep(club, sweep.id))?.measured.fileSha256 === sweep.sha256 &&
      JSON.stringify(await store.readSweepPoints(club, sweep.id)) === JSON.stringify(points) &&
      (await store.readSummary(club, sweep.id, '1'))?.summaryJson === summary.summaryJson;
    if (!isWhole) lost.push(sweep);
  }
  await store.close();
  return lost;
}

/** How many rows each table of a sweep has: equal unless there are half records. */
function rowCounts(path: string): readonly unknown[] {
  const hand = new Database(path, { readonly: true });
  expect(hand.pragma('integrity_check', { simple: true })).toBe('ok');
  expect(hand.pragma('foreign_key_check')).toEqual([]);
  const tables = ['sweep', 'file', 'sweep_facts', 'sweep_current', 'summary'];
  const counts = [...tables, "event WHERE kind = 'sweep_added'"].map((rows) =>
    hand.prepare(`SELECT count(*) FROM ${rows}`).pluck().get(),
  );
  hand.close();
  return counts;
}

describe('a process that is killed while sweeps come in', () => {
  let path: string;
  const acknowledged: Acknowledged[] = [];
  beforeAll(async () => {
    path = join(newFolder(), 'ledger.sqlite');
    await (await storeWithClub(path)).close();
  });

  it.each([
    [1, 1],
    [2, 13],
    [3, 57],
    [4, 200],
    [5, 31],
  ])(
    '(time %i, after %i sweeps) loses none that was acknowledged, and keeps none by half',
    async (round, killAfter) => {
      const before = acknowledged.length;
      const fresh = await uploadUntilKilled(path, round * 1_000_000, killAfter, 'when-kept');
      acknowledged.push(...fresh);
      expect(acknowledged.length).toBeGreaterThanOrEqual(before + killAfter);
      expect(await lostOf(path, acknowledged)).toEqual([]);
      const [sweeps, ...others] = rowCounts(path);
      expect(sweeps).toBeGreaterThanOrEqual(acknowledged.length);
      expect(others).toEqual(others.map(() => sweeps));
    },
  );
});

describe('a store that acknowledges before it keeps', () => {
  it('would be found out', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    await (await storeWithClub(path)).close();
    const acknowledged = await uploadUntilKilled(
      path,
      1_000_000,
      Number.POSITIVE_INFINITY,
      'early',
    );
    expect(acknowledged.length).toBeGreaterThan(0);
    expect((await lostOf(path, acknowledged)).length).toBeGreaterThan(0);
  });
});

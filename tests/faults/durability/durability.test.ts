import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { storeWithClub } from '../../support/open-test-store.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';
import { flushesIn } from './flushes.ts';

const { newFolder, removeAll } = temporaryFolders();
afterEach(removeAll);

const program = new URL('./commit-one-by-one.ts', import.meta.url).pathname;
const traced = spawnSync('strace', ['-f', '-e', 'trace=none', 'true'], { encoding: 'utf8' });
const why = traced.error?.message ?? traced.stderr;
if (traced.status !== 0) console.warn(`Flushes are not counted, strace does not run: ${why}`);

async function trace(synchronous: 'FULL' | 'NORMAL') {
  const folder = newFolder();
  const path = join(folder, 'ledger.sqlite');
  await (await storeWithClub(path)).close();
  const output = join(folder, 'trace');
  const calls = ['-f', '-y', '-s', '40', '-e', 'trace=fsync,fdatasync,write', '-o', output];
  const node = [process.execPath, '--import', 'tsx', program, path, synchronous];
  const { status, stderr } = spawnSync('strace', [...calls, ...node], { encoding: 'utf8' });
  expect(status, stderr).toBe(0);
  const found = flushesIn(readFileSync(output, 'utf8'));
  expect(found).toHaveLength(21);
  return found;
}

describe.skipIf(traced.status !== 0)('a sweep that is acknowledged', () => {
  it('was flushed to disk before, each time', async () => {
    for (const { number, flushes } of await trace('FULL')) {
      expect(flushes, `sweep ${number}`).toBeGreaterThanOrEqual(1);
    }
  });

  it('was not where SQLite leaves that for later, which the count finds out', async () => {
    const unflushed = (await trace('NORMAL')).filter(({ flushes }) => flushes === 0);
    expect(unflushed.length).toBeGreaterThanOrEqual(19);
  });
});

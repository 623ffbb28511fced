import { createHash } from 'node:crypto';
import { rmSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, describe, expect, it } from 'vitest';
import { ledgerPath } from '../../../server/store/ledger-path.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { idOf, newSweep } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';
import {
  addTestAntenna,
  end,
  freePort,
  numberedFile,
  startService,
  tokenOf,
  uploadNumbered,
} from '../built-service.ts';
import { databaseFaults, lostUploads } from './check.ts';
import { killAgainAndAgain } from './kill-again-and-again.ts';

const { newFolder, removeAll } = temporaryFolders();
afterEach(removeAll);

describe('the service killed outright twenty times while uploads come in', () => {
  it('has every upload that it acknowledged, once, and none by half', async () => {
    const outcome = await killAgainAndAgain(newFolder(), 20, 20_261_201);
    expect(outcome.faults).toEqual([]);
    // Fifteen of the kills come after an upload was acknowledged; of four under way none is acknowledged yet.
    expect(outcome.acknowledged).toBeGreaterThanOrEqual(15);
    expect(outcome.sweeps).toBeGreaterThanOrEqual(outcome.acknowledged);
    expect(outcome.sweeps).toBeLessThanOrEqual(outcome.acknowledged + 4);
  }, 300_000);
});

describe('the check of a service after a kill', () => {
  async function killedAfterUploads() {
    const folder = newFolder();
    const port = await freePort();
    const first = startService(folder, port);
    await first.listening;
    const token = tokenOf(first);
    await addTestAntenna(first.url, token);
    // What came so far goes from the log into the database.
    await end(first, 'SIGTERM');
    const second = startService(folder, port);
    await second.listening;
    const acknowledged = [];
    for (const number of [1, 2, 3]) {
      const answer = await uploadNumbered(second.url, token, number);
      const { id } = (await answer.json()) as { id: string };
      const sha256 = createHash('sha256').update(numberedFile(number)).digest('hex');
      acknowledged.push({ number, id, sha256 });
    }
    await end(second, 'SIGKILL');
    return { folder, port, token, acknowledged };
  }

  it('finds out a service that loses its log of writes', async () => {
    const { folder, port, token, acknowledged } = await killedAfterUploads();
    for (const ending of ['-wal', '-shm']) rmSync(`${ledgerPath(folder)}${ending}`);
    const service = startService(folder, port);
    await service.listening;
    const lost = await lostUploads(service.url, token, acknowledged);
    await end(service, 'SIGKILL');
    expect(lost).toEqual(['upload 1: 404', 'upload 2: 404', 'upload 3: 404']);
  });

  it('finds out another file in place of the one that was sent', async () => {
    const { folder, port, token, acknowledged } = await killedAfterUploads();
    const service = startService(folder, port);
    await service.listening;
    const [first, second, third] = acknowledged;
    const mixed = [first, { ...second, id: third.id }];
    const lost = await lostUploads(service.url, token, mixed);
    await end(service, 'SIGKILL');
    expect(lost).toEqual(['upload 2: another SHA-256']);
  });

  it.each([
    ['summary', /half a sweep/],
    ['sweep_current', /half a sweep/],
    ['event', /half a sweep/],
    ['sweep_facts', /half a sweep/],
    ['sweep', /a file of no sweep/],
    ['file', /half a sweep/],
  ])('finds out a record without its row in %s', async (table, fault) => {
    const folder = newFolder();
    const path = join(folder, 'ledger.sqlite');
    const store = await storeWithClub(path);
    await store.addSweep(newSweep(club, idOf(30), idOf(20), 'a file'));
    await store.close();
    expect(databaseFaults(path)).toEqual([]);
    const hand = new Database(path);
    hand.pragma('foreign_keys = 0');
    const triggers = hand
      .prepare("SELECT name FROM sqlite_schema WHERE type = 'trigger' AND tbl_name = ?")
      .pluck()
      .all(table);
    for (const trigger of triggers) hand.exec(`DROP TRIGGER ${trigger}`);
    hand.exec(`DELETE FROM ${table}`);
    hand.close();
    expect(databaseFaults(path).join('\n')).toMatch(fault);
  });
});

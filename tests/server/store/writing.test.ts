import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, describe, expect, it } from 'vitest';
import { packText, unpackText } from '../../../server/store/sqlite/compression.ts';
import { runTogether } from '../../../server/store/sqlite/group-commit.ts';
import { writeActs } from '../../../server/store/sqlite/write-acts.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { actorOf, idOf, newSweep, siteFacts } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
afterEach(removeAll);

/** A writer's connection that tells what it runs, on a file with a club in it. */
async function toldWriter() {
  const path = join(newFolder(), 'ledger.sqlite');
  await (await storeWithClub(path)).close();
  const told: string[] = [];
  const connection = new Database(path, { verbose: (sql) => told.push(String(sql)), timeout: 0 });
  connection.pragma('foreign_keys = 1');
  return { path, connection, told, acts: writeActs(connection) };
}

function siteJob(number: number, key: string, at?: string) {
  const actor = { ...actorOf(club), ...(at === undefined ? {} : { at }) };
  const facts = JSON.stringify(siteFacts);
  const fresh = { kind: 'sites', actor, id: idOf(number), key, siteId: null, facts };
  return { id: number, act: 'addResource', args: [fresh], origin: null } as const;
}

const lockJob = (id: number) => ({ id, act: 'takeLock', args: [], origin: null }) as const;

describe('acts that wait for the writer together', () => {
  it('share one commit, and one that fails takes no other with it', async () => {
    const { connection, told, acts } = await toldWriter();
    const jobs = [siteJob(1, 'a'), siteJob(2, 'a'), siteJob(3, 'b')];
    const results = runTogether(connection, acts, jobs);
    expect(results).toMatchObject([
      { id: 1, value: { key: 'a' } },
      { id: 2, failure: { kind: 'conflict', field: 'key' } },
      { id: 3, value: { key: 'b' } },
    ]);
    expect(told.filter((sql) => sql === 'COMMIT')).toHaveLength(1);
    const keys = connection.prepare('SELECT key FROM resource ORDER BY key').pluck().all();
    const events = connection.prepare("SELECT count(*) FROM event WHERE kind = 'sites_added'");
    expect(keys).toEqual(['a', 'b']);
    expect(events.pluck().get()).toBe(2);
    connection.close();
  });

  it('are refused at once, not one after the other, while another program writes', async () => {
    const { path, connection, told, acts } = await toldWriter();
    const other = new Database(path);
    other.exec('BEGIN IMMEDIATE');
    const results = runTogether(connection, acts, [siteJob(1, 'a'), siteJob(2, 'b')]);
    expect(results).toMatchObject([
      { id: 1, failure: { kind: 'unavailable' } },
      { id: 2, failure: { kind: 'unavailable' } },
    ]);
    expect(told.filter((sql) => sql.startsWith('BEGIN'))).toHaveLength(1);
    expect(runTogether(connection, acts, [lockJob(3)])).toMatchObject([
      { id: 3, failure: { kind: 'unavailable' } },
    ]);
    other.exec('ROLLBACK');
    other.close();
    expect(runTogether(connection, acts, [lockJob(4)])).toEqual([{ id: 4, value: null }]);
    connection.close();
  });

  it('do not blame a key for a fault of the service itself', async () => {
    const { connection, acts } = await toldWriter();
    expect(runTogether(connection, acts, [siteJob(1, 'a', 'yesterday')])).toMatchObject([
      { failure: { kind: 'unavailable', field: null } },
    ]);
    connection.close();
  });
});

describe('a derived answer', () => {
  it('never comes back other than it was kept, whichever bit is flipped', async () => {
    const text = '{"resonances":[{"frequency_hz":14123456}]}';
    const packed = await packText(text);
    let told = 0;
    for (let bit = 0; bit < 8 * packed.length; bit++) {
      const damaged = Uint8Array.from(packed);
      damaged[bit >> 3] ^= 1 << (bit & 7);
      const [outcome] = await Promise.allSettled([unpackText(damaged)]);
      // The padding of the last block may differ and the text be whole.
      if (outcome.status === 'fulfilled') expect(outcome.value, `bit ${bit}`).toBe(text);
      else {
        expect(outcome.reason, `bit ${bit}`).toMatchObject({ kind: 'corrupt' });
        told += 1;
      }
    }
    expect(told).toBeGreaterThan(8 * (packed.length - 2));
  });
});

describe('a damaged record', () => {
  it('is told as corrupt, and the others are still read', async () => {
    const path = join(newFolder(), 'ledger.sqlite');
    const store = await storeWithClub(path);
    await store.addSweep(newSweep(club, idOf(30), idOf(20), 'damaged'));
    await store.addSweep(newSweep(club, idOf(31), idOf(20), 'whole'));
    const hand = new Database(path);
    hand.exec('PRAGMA ignore_check_constraints = 1; DROP TRIGGER sweep_facts_are_kept_update');
    hand.prepare("UPDATE sweep_facts SET facts = '{' WHERE sweep_id = ?").run(idOf(30));
    hand.close();
    await expect(store.findSweep(club, idOf(30))).rejects.toMatchObject({ kind: 'corrupt' });
    expect(await store.findSweep(club, idOf(31))).not.toBeNull();
    await store.close();
  });
});

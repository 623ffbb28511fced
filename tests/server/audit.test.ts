import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { addMember, bearer } from '../support/members.ts';
import { temporaryFolders } from '../support/temporary-folders.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

const { newFolder, removeAll } = temporaryFolders();
let club: TestApp;
beforeEach(async () => {
  club = await makeTestApp();
});
afterEach(async () => {
  await club.close();
  removeAll();
});

const list = async (query = '') => (await club.call({ url: `/v1/audit${query}` })).json();

/** A checked copy of the club's ledger, for hands that change it. */
async function copyOfLedger(): Promise<string> {
  const file = join(newFolder(), 'copy.sqlite');
  await club.service.store.backup(file);
  return file;
}

/** Runs the built command as `npm run audit` does. */
function audit(file: string) {
  const program = new URL('../../dist/server/audit.js', import.meta.url).pathname;
  const env = { PATH: process.env['PATH'] };
  return spawnSync(process.execPath, [program, file], { env, encoding: 'utf8' });
}

describe('the audit trail', () => {
  it('tells who did what to what, when and from where, newest first', async () => {
    await addAntenna(club);
    const { id } = (await upload(club, resonatorFile())).json();
    const { items } = await list();
    expect(items[0]).toMatchObject({
      member_id: club.actor.memberId,
      act: 'sweep_added',
      subject_id: id,
      outcome: 'done',
      address: '127.0.0.1',
    });
    const acts = items.map(({ act }: { act: string }) => act);
    expect(acts).toEqual(['sweep_added', 'antennas_added', 'sites_added', 'club_added']);
    expect(items.at(-1).address).toBeNull();
  });

  it('is given page by page', async () => {
    await addAntenna(club);
    const first = await list('?limit=2');
    const second = await list(`?limit=2&cursor=${first.page.next}`);
    const seqs = [...first.items, ...second.items].map(({ seq }: { seq: number }) => seq);
    expect(seqs).toEqual([3, 2, 1]);
    expect(second.page.next).toBeNull();
  });

  it('has no entry of an act that failed', async () => {
    await addAntenna(club);
    const before = await list();
    const payload = { key: before.items[0].subject_id.slice(0, 8), name: 'Twin' };
    await club.call({ method: 'POST', url: '/v1/sites', payload });
    const twin = await club.call({ method: 'POST', url: '/v1/sites', payload });
    expect(twin.statusCode).toBe(409);
    expect((await list()).items).toHaveLength(before.items.length + 1);
  });

  it('loses the addresses of a member who is erased, and still holds', async () => {
    const { id, token } = await addMember(club, 'keeper');
    const payload = { key: 'hill', name: 'Hill' };
    const headers = bearer(token);
    await club.call({ method: 'POST', url: '/v1/sites', headers, payload });
    const entryOfSite = async () =>
      (await list()).items.find(({ act }: { act: string }) => act === 'sites_added');
    expect(await entryOfSite()).toMatchObject({ member_id: id, address: '127.0.0.1' });
    const erased = await club.call({ method: 'POST', url: `/v1/members/${id}/erase` });
    expect(erased.statusCode).toBe(200);
    expect(await entryOfSite()).toMatchObject({ member_id: id, address: null });
    expect(audit(await copyOfLedger())).toMatchObject({ status: 0, stderr: '' });
  });
});

describe('the command that verifies the audit trail', () => {
  it('prints how long it is and where it ends', async () => {
    await addAntenna(club);
    const { items } = await list();
    const { status, stdout } = audit(await copyOfLedger());
    expect(status).toBe(0);
    expect(stdout).toContain(`3 entries, head ${items[0].hash}`);
  });

  it('follows the rule that stands in the schema: SHA-256 over what was before and the content', async () => {
    const [{ seq, at, member_id, act, subject_id, outcome, hash }] = (await list()).items;
    const { clubId } = club.actor;
    const content = JSON.stringify([seq, clubId, at, member_id, act, subject_id, outcome, null]);
    const start = Buffer.alloc(32);
    expect(createHash('sha256').update(start).update(content).digest('hex')).toBe(hash);
  });

  const sabotages = [
    ['the act of an entry', "UPDATE audit SET act = 'sites_edited' WHERE seq = 2", 2],
    ['who did it', "UPDATE audit SET member_id = 'x' WHERE seq = 1", 1],
    ['the outcome of the newest', "UPDATE audit SET outcome = 'stale' WHERE seq = 3", 3],
    ['an address', "UPDATE audit_origin SET address = '192.0.2.1' WHERE seq = 3", 3],
    ['an entry that was taken out', 'DELETE FROM audit WHERE seq = 2', 2],
  ] as const;

  it.each(sabotages)('finds %s changed by hand', async (_what, sql, entry) => {
    await addAntenna(club);
    const file = await copyOfLedger();
    const hand = new Database(file);
    hand.pragma('foreign_keys = 0');
    expect(() => hand.exec(sql)).toThrow(/is kept/);
    for (const trigger of ['audit_is_kept_update', 'audit_is_kept_delete']) {
      hand.exec(`DROP TRIGGER ${trigger}`);
    }
    hand.exec(`DROP TRIGGER audit_origin_is_kept_update; ${sql}`);
    hand.close();
    const { status, stderr } = audit(file);
    expect(status).toBe(1);
    expect(stderr).toContain(`entry ${entry} `);
  });

  it('finds a file that is no ledger', () => {
    expect(audit(join(newFolder(), 'none.sqlite'))).toMatchObject({ status: 1 });
  });
});

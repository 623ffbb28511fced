import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import type { MemberFacts } from '../../../server/store/people.ts';
import { openReader } from '../../../server/store/sqlite/connection.ts';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { peopleListQueries } from '../../../server/store/sqlite/people-reader.ts';
import type { SqliteStore } from '../../../server/store/sqlite/sqlite-store.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { actorOf, at, idOf } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
afterAll(removeAll);

const actor = actorOf(club);
const firstSteward = actor.memberId;
const other = idOf(77);
const facts: MemberFacts = {
  role: 'measurer',
  active: true,
  shownAs: 'name',
  person: { name: 'Invented Person', callSign: 'XX0XXX', contact: 'by the door' },
};
const token = { id: idOf(30), memberId: idOf(20), label: 'phone', scopes: null, expiresAt: null };
const secret = new Uint8Array(32).fill(9);

let path: string;
let store: SqliteStore;
beforeEach(async () => {
  path = join(newFolder(), 'ledger.sqlite');
  store = await storeWithClub(path);
  return () => store.close();
});

const addMember = (id = idOf(20), more: Partial<MemberFacts> = {}) =>
  store.people.addMember(actor, { id, facts: { ...facts, ...more } });

describe('a member in the store', () => {
  it('is found in the club alone, with a pseudonym of their own', async () => {
    const added = await addMember();
    expect(added).toMatchObject({ revision: 1, pseudonym: 'Member 2', erasedAt: null, facts });
    expect(await store.people.findMember(club, idOf(20))).toEqual(added);
    expect(await store.people.findMember(other, idOf(20))).toBeNull();
    expect((await store.people.listMembers(other, { limit: 9, after: null })).items).toEqual([]);
  });

  it('is edited from the present revision alone', async () => {
    await addMember();
    const next: MemberFacts = { ...facts, role: 'keeper', person: null };
    const edited = await store.people.editMember(actor, idOf(20), 1, next);
    expect(edited).toMatchObject({ outcome: 'changed', record: { revision: 2, facts: next } });
    await expect(store.people.editMember(actor, idOf(20), 1, facts)).rejects.toMatchObject({
      kind: 'stale',
    });
  });

  it('is listed page by page', async () => {
    for (const n of [20, 21, 22]) await addMember(idOf(n));
    const first = await store.people.listMembers(club, { limit: 2, after: null });
    const second = await store.people.listMembers(club, { limit: 2, after: first.next });
    expect([...first.items, ...second.items].map(({ id }) => id)).toEqual([
      idOf(20),
      idOf(21),
      idOf(22),
      firstSteward,
    ]);
    expect(second.next).toBeNull();
  });

  it('who is the last steward can neither step down, nor leave, nor be erased', async () => {
    const steward = { ...facts, role: 'steward' as const };
    const down = () => store.people.editMember(actor, firstSteward, 1, facts);
    const left = { ...steward, active: false };
    expect(await down()).toEqual({ outcome: 'last-steward' });
    expect(await store.people.editMember(actor, firstSteward, 1, left)).toEqual({
      outcome: 'last-steward',
    });
    expect(await store.people.eraseMember(actor, firstSteward)).toEqual({
      outcome: 'last-steward',
    });
    await addMember(idOf(20), { role: 'steward' });
    expect((await down()).outcome).toBe('changed');
  });
});

describe('an erased member', () => {
  const textOfFile = () => readFileSync(path, 'latin1');

  it('leaves an id and a pseudonym, and no trace of the person in the file', async () => {
    await addMember();
    await store.people.addToken(actor, { ...token, label: "the person's phone" }, secret);
    await store.close();
    expect(textOfFile()).toContain('Invented Person');

    store = await openSqliteStore({ path });
    expect(await store.people.eraseMember(actor, idOf(20))).toMatchObject({
      outcome: 'changed',
      record: {
        id: idOf(20),
        pseudonym: 'Member 2',
        erasedAt: at,
        facts: { active: false, shownAs: 'pseudonym', person: null },
      },
    });
    expect(await store.people.eraseMember(actor, idOf(20))).toEqual({ outcome: 'erased-before' });
    expect(await store.people.editMember(actor, idOf(20), 2, facts)).toEqual({
      outcome: 'erased-before',
    });
    expect(await store.findToken(secret)).toBeNull();
    await store.close();
    for (const trace of ['Invented Person', 'XX0XXX', 'by the door', "the person's phone"]) {
      expect(textOfFile()).not.toContain(trace);
    }
    store = await openSqliteStore({ path });
  });
});

describe('a token in the store', () => {
  beforeEach(async () => {
    await addMember();
  });

  it('is found by its hash with the role of its member', async () => {
    await store.people.addToken(
      actor,
      { ...token, scopes: ['read'], expiresAt: '2027-01-01T00:00:00.000Z' },
      secret,
    );
    expect(await store.findToken(secret)).toMatchObject({
      memberId: idOf(20),
      role: 'measurer',
      scopes: ['read'],
      expiresAt: '2027-01-01T00:00:00.000Z',
      lastUsedAt: null,
    });
    await store.people.noteTokenUse(club, token.id, at);
    expect(await store.findToken(secret)).toMatchObject({ lastUsedAt: at });
  });

  it('is found no more once it is revoked, or its member has left', async () => {
    await store.people.addToken(actor, token, secret);
    await store.people.revokeToken({ ...actor, clubId: other }, token.id);
    expect(await store.findToken(secret)).not.toBeNull();
    await store.people.editMember(actor, idOf(20), 1, { ...facts, active: false });
    expect(await store.findToken(secret)).toBeNull();
    await store.people.editMember(actor, idOf(20), 2, facts);
    expect(await store.findToken(secret)).not.toBeNull();
    await store.people.revokeToken(actor, token.id);
    expect(await store.findToken(secret)).toBeNull();
    expect(await store.people.findMemberToken(club, token.id)).toMatchObject({ revokedAt: at });
  });

  it('is not made for a member of another club, nor for one who has left', async () => {
    const fromOther = { ...actor, clubId: other };
    expect(await store.people.addToken(fromOther, token, secret)).toBeNull();
    await store.people.editMember(actor, idOf(20), 1, { ...facts, active: false });
    expect(await store.people.addToken(actor, token, secret)).toBeNull();
  });

  it('is listed for its member and its club alone', async () => {
    await store.people.addToken(actor, token, secret);
    const page = { limit: 9, after: null };
    const idsOf = async (clubId: string, memberId: string | null) =>
      (await store.people.listTokens(clubId, memberId, page)).items.map(({ id }) => id);
    expect(await idsOf(club, idOf(20))).toEqual([token.id]);
    expect(await idsOf(club, null)).toEqual([idOf(2), token.id]);
    expect(await idsOf(other, null)).toEqual([]);
    expect(await store.people.findMemberToken(other, token.id)).toBeNull();
  });
});

describe('the club in the store', () => {
  it('is edited from the present revision alone; its dashboard is closed at first', async () => {
    const before = await store.people.findClub(club);
    expect(before).toMatchObject({ revision: 1, facts: { name: 'Ours', publicDashboard: false } });
    const next = { name: 'Ours too', publicDashboard: true };
    const edited = await store.people.editClub(actor, 1, next);
    expect(edited).toMatchObject({ revision: 2, facts: next });
    expect(await store.people.findClub(club)).toEqual(edited);
    await expect(store.people.editClub(actor, 1, next)).rejects.toMatchObject({ kind: 'stale' });
    expect(await store.people.findClub(other)).toBeNull();
  });
});

it('each list of people is read along an index, without sorting', () => {
  const connection = openReader(path);
  const lists = Object.entries(peopleListQueries);
  expect(lists.length).toBe(3);
  for (const [name, sql] of lists) {
    const asked = { clubId: '', memberId: '', id: '', limit: 1 };
    const plan = connection.prepare(`EXPLAIN QUERY PLAN ${sql}`).all(asked);
    const text = plan.map((step) => Object.values(step as object).at(-1)).join('; ');
    expect([name, text]).toEqual([name, expect.stringMatching(/SEARCH .*club_id=\?/)]);
    expect([name, text]).toEqual([name, expect.not.stringMatching(/SCAN|TEMP B-TREE/)]);
  }
  connection.close();
});

import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { AntennaRecord, Page, PageRequest, Store } from '../../../server/store/port.ts';
import {
  actorOf,
  analyzerFacts,
  antennaFacts,
  at,
  cableFacts,
  idOf,
  newLineCheck,
  newSweep,
  siteFacts,
} from '../../support/store-records.ts';

export interface OpenedStore {
  readonly store: Store;
  close(): Promise<void>;
}

const club = idOf(1);
const otherClub = idOf(2);
const firstPage: PageRequest = { limit: 10, after: null };

/** What every adapter of the port must do; `open` makes an empty store. */
export function describeStore(name: string, open: () => Promise<OpenedStore>): void {
  describe(`the store port over ${name}`, () => {
    let opened: OpenedStore;
    let store: Store;
    beforeEach(async () => {
      opened = await open();
      store = opened.store;
      for (const [id, key, secret] of [
        [club, 'ours', 1],
        [otherClub, 'theirs', 2],
      ] as const) {
        await store.addClub(
          { id, key, name: key, invented: true, createdAt: at },
          {
            id: idOf(100 + secret),
            clubId: id,
            memberId: idOf(900),
            label: 'first',
            createdAt: at,
            secretSha256: new Uint8Array(32).fill(secret),
          },
        );
      }
    });
    afterEach(() => opened.close());

    it('finds a token by the hash of its secret and by nothing else', async () => {
      expect(await store.findToken(new Uint8Array(32).fill(2))).toMatchObject({
        clubId: otherClub,
      });
      expect(await store.findToken(new Uint8Array(32).fill(3))).toBeNull();
    });

    it('has another version after each write, and the same one while nothing is written', async () => {
      const before = store.version();
      await store.listClubs();
      expect(store.version()).toBe(before);
      await store.addEditable('sites', actorOf(club), {
        id: idOf(1),
        key: 'field',
        facts: siteFacts,
      });
      expect(store.version()).not.toBe(before);
    });

    it('lists its clubs', async () => {
      expect((await store.listClubs()).map(({ key }) => key)).toEqual(['ours', 'theirs']);
    });

    it('refuses a second club of the same key', async () => {
      const again = { id: idOf(3), key: 'ours', name: 'Twin', invented: true, createdAt: at };
      const token = {
        id: idOf(103),
        clubId: idOf(3),
        memberId: idOf(900),
        label: 'first',
        createdAt: at,
        secretSha256: new Uint8Array(32).fill(3),
      };
      await expect(store.addClub(again, token)).rejects.toMatchObject({
        kind: 'conflict',
        field: 'key',
      });
      expect(await store.findToken(token.secretSha256)).toBeNull();
    });

    it('finds what was added by id and by key, and not for another club', async () => {
      const fresh = { id: idOf(10), key: 'field', facts: siteFacts };
      const added = await store.addEditable('sites', actorOf(club), fresh);
      expect(added).toMatchObject({ revision: 1, createdAt: at, updatedAt: at, facts: siteFacts });
      expect(await store.findEditable('sites', club, 'field')).toEqual(added);
      expect(await store.findEditable('sites', club, idOf(10))).toEqual(added);
      expect(await store.findEditable('sites', otherClub, idOf(10))).toBeNull();
      expect(await store.findEditable('analyzers', club, 'field')).toBeNull();
    });

    it('refuses a key in use within its kind and club, and leaves nothing behind', async () => {
      await store.addEditable('sites', actorOf(club), { id: idOf(10), key: 'a', facts: siteFacts });
      const twin = { id: idOf(11), key: 'a', facts: siteFacts };
      await expect(store.addEditable('sites', actorOf(club), twin)).rejects.toMatchObject({
        kind: 'conflict',
        field: 'key',
      });
      expect(await store.findEditable('sites', club, idOf(11))).toBeNull();
      await store.addEditable('sites', actorOf(otherClub), twin);
      const other = { id: idOf(12), key: 'a', facts: analyzerFacts };
      await store.addEditable('analyzers', actorOf(club), other);
    });

    it('edits from the present revision alone', async () => {
      const fresh = { id: idOf(10), key: 'a', facts: siteFacts };
      await store.addEditable('sites', actorOf(club), fresh);
      const next = { key: 'b', facts: { ...siteFacts, note: 'fenced' } };
      const edited = await store.editEditable('sites', actorOf(club), idOf(10), 1, next);
      expect(edited).toMatchObject({ revision: 2, key: 'b', facts: { note: 'fenced' } });
      await expect(
        store.editEditable('sites', actorOf(club), idOf(10), 1, next),
      ).rejects.toMatchObject({ kind: 'stale' });
      await expect(
        store.editEditable('sites', actorOf(otherClub), idOf(10), 2, next),
      ).rejects.toMatchObject({ kind: 'stale' });
    });

    it('lets one of two racing edits win', async () => {
      const fresh = { id: idOf(10), key: 'a', facts: siteFacts };
      await store.addEditable('sites', actorOf(club), fresh);
      const edits = ['b', 'c', 'd'].map((key) =>
        store.editEditable('sites', actorOf(club), idOf(10), 1, { key, facts: siteFacts }),
      );
      const outcomes = await Promise.allSettled(edits);
      expect(outcomes.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    });

    it('pages by key without losing or repeating any, and by site', async () => {
      const keys = ['a', 'b', 'c', 'd', 'e'];
      for (const [i, key] of keys.entries()) {
        const facts = antennaFacts(idOf(i % 2));
        await store.addEditable('antennas', actorOf(club), { id: idOf(20 + i), key, facts });
      }
      const seen: string[] = [];
      let after: PageRequest['after'] = null;
      do {
        const page: Page<AntennaRecord> = await store.listEditables('antennas', club, {
          limit: 2,
          after,
        });
        seen.push(...page.items.map(({ key }) => key));
        after = page.next;
      } while (after !== null);
      expect(seen).toEqual(keys);
      const ofSite = await store.listEditables('antennas', club, firstPage, { siteId: idOf(1) });
      expect(ofSite.items.map(({ key }) => key)).toEqual(['b', 'd']);
      expect(ofSite.next).toBeNull();
    });

    it('keeps a sweep whole: record, file, points to the last bit, and answers', async () => {
      const sweep = newSweep(club, idOf(30), idOf(20), '# Hz S RI R 50\n');
      expect(await store.addSweep(sweep)).toEqual({ outcome: 'added', record: sweep.record });
      expect(await store.findSweep(club, idOf(30))).toEqual(sweep.record);
      expect(Buffer.from((await store.readSweepFile(club, idOf(30))) ?? [])).toEqual(
        Buffer.from(sweep.file),
      );
      expect(await store.readSweepPoints(club, idOf(30))).toEqual(sweep.points);
      expect(await store.readSummary(club, idOf(30), '1')).toEqual(sweep.summary);
      expect(await store.readSummary(club, idOf(30), '2')).toBeNull();
    });

    it('tells nothing of a sweep to another club', async () => {
      await store.addSweep(newSweep(club, idOf(30), idOf(20), 'x'));
      const { fileSha256 } = newSweep(club, idOf(30), idOf(20), 'x').record.measured;
      expect(await store.findSweep(otherClub, idOf(30))).toBeNull();
      expect(await store.findSweepByFile(otherClub, fileSha256)).toBeNull();
      expect(await store.readSweepFile(otherClub, idOf(30))).toBeNull();
      expect(await store.readSweepPoints(otherClub, idOf(30))).toBeNull();
      expect(await store.readSummary(otherClub, idOf(30), '1')).toBeNull();
      expect((await store.listSweeps(otherClub, idOf(20), firstPage)).items).toEqual([]);
    });

    it('answers the same bytes with the first record, and says if they are another antenna’s', async () => {
      const first = newSweep(club, idOf(30), idOf(20), 'same');
      await store.addSweep(first);
      const again = await store.addSweep(newSweep(club, idOf(31), idOf(20), 'same'));
      expect(again).toEqual({ outcome: 'same', record: first.record });
      const elsewhere = await store.addSweep(newSweep(club, idOf(32), idOf(21), 'same'));
      expect(elsewhere).toEqual({ outcome: 'elsewhere', record: first.record });
      const theirs = await store.addSweep(newSweep(otherClub, idOf(33), idOf(21), 'same'));
      expect(theirs.outcome).toBe('added');
    });

    it('makes one record of fifty equal uploads at once', async () => {
      const uploads = Array.from({ length: 50 }, (_, i) =>
        store.addSweep(newSweep(club, idOf(100 + i), idOf(20), 'equal')),
      );
      const outcomes = await Promise.all(uploads);
      expect(outcomes.filter(({ outcome }) => outcome === 'added')).toHaveLength(1);
      expect(new Set(outcomes.map(({ record }) => record.id)).size).toBe(1);
      expect((await store.listSweeps(club, idOf(20), firstPage)).items).toHaveLength(1);
    });

    it('lists sweeps newest first by when they were measured, else received', async () => {
      const times = ['2026-05-01T00:00:00.000Z', '2025-05-01T00:00:00.000Z', null];
      for (const [i, measuredAt] of times.entries()) {
        const sweep = newSweep(club, idOf(30 + i), idOf(20), `sweep ${i}`);
        const facts = { ...sweep.record.facts, measuredAt };
        await store.addSweep({ ...sweep, record: { ...sweep.record, facts } });
      }
      const page = await store.listSweeps(club, idOf(20), { limit: 2, after: null });
      expect(page.items.map(({ id }) => id)).toEqual([idOf(32), idOf(30)]);
      const rest = await store.listSweeps(club, idOf(20), { limit: 2, after: page.next });
      expect(rest.items.map(({ id }) => id)).toEqual([idOf(31)]);
      expect(rest.next).toBeNull();
    });

    it('keeps sweeps of known loads, newest first, each file once', async () => {
      const checkOf = (number: number, text: string, measuredAt: string | null) => {
        const { record, file, points } = newSweep(club, idOf(number), idOf(20), text);
        const { id, clubId, receivedAt, uploadedBy, measured } = record;
        const facts = { analyzerId: idOf(7), loadOhm: 50, measuredAt, note: '', invented: true };
        return { record: { id, clubId, receivedAt, uploadedBy, facts, measured }, file, points };
      };
      const old = checkOf(40, 'old', '2025-01-01T00:00:00.000Z');
      const young = checkOf(41, 'young', null);
      expect(await store.addLoadCheck(old)).toEqual({ outcome: 'added', record: old.record });
      await store.addLoadCheck(young);
      const again = await store.addLoadCheck(checkOf(42, 'old', null));
      expect(again).toEqual({ outcome: 'known', record: old.record });
      const page = await store.listLoadChecks(club, idOf(7), firstPage);
      expect(page.items).toEqual([young.record, old.record]);
      expect(await store.readLoadCheckPoints(club, idOf(40))).toEqual(old.points);
      expect((await store.listLoadChecks(otherClub, idOf(7), firstPage)).items).toEqual([]);
      expect(await store.readLoadCheckPoints(otherClub, idOf(40))).toBeNull();
    });

    it('keeps a club’s own cables under keys of their own, ascending', async () => {
      const own = { id: idOf(50), key: 'own', facts: cableFacts };
      const added = await store.addCable(actorOf(club), own);
      expect(added).toEqual({ ...own, clubId: club, createdAt: at, createdBy: idOf(900) });
      expect(await store.findCable(club, 'own')).toEqual(added);
      expect(await store.findCable(club, idOf(50))).toEqual(added);
      expect(await store.findCable(otherClub, 'own')).toBeNull();
      const twin = { ...own, id: idOf(51) };
      await expect(store.addCable(actorOf(club), twin)).rejects.toMatchObject({
        kind: 'conflict',
        field: 'key',
      });
      await store.addCable(actorOf(otherClub), twin);
      await store.addCable(actorOf(club), { ...own, id: idOf(52), key: 'a' });
      const page = await store.listCables(club, { limit: 1, after: null });
      expect(page.items.map(({ key }) => key)).toEqual(['a']);
      const rest = await store.listCables(club, { limit: 1, after: page.next });
      expect(rest).toEqual({ items: [added], next: null });
    });

    it('keeps line checks, newest first, each file once for an antenna and what was told', async () => {
      const old = newLineCheck(club, idOf(60), idOf(20), 'open end');
      const dated = { ...old.record.facts, measuredAt: '2025-01-01T00:00:00.000Z' };
      const first = { ...old, record: { ...old.record, facts: dated } };
      expect(await store.addLineCheck(first)).toEqual({ outcome: 'added', record: first.record });
      const again = await store.addLineCheck(newLineCheck(club, idOf(61), idOf(20), 'open end'));
      expect(again).toEqual({ outcome: 'known', record: first.record });
      const corrected = newLineCheck(club, idOf(62), idOf(20), 'open end');
      const tested = { ...corrected.record.tested, farEnd: 'short' as const };
      const told = { ...corrected, record: { ...corrected.record, tested } };
      expect((await store.addLineCheck(told)).outcome).toBe('added');
      const shared = newLineCheck(club, idOf(63), idOf(21), 'open end');
      expect((await store.addLineCheck(shared)).outcome).toBe('added');

      expect(await store.findLineCheck(club, idOf(62))).toEqual(told.record);
      expect(await store.readLineCheckTrace(club, idOf(62))).toBe(told.traceJson);
      const page = await store.listLineChecks(club, idOf(20), { limit: 1, after: null });
      expect(page.items).toEqual([told.record]);
      const rest = await store.listLineChecks(club, idOf(20), { limit: 9, after: page.next });
      expect(rest).toEqual({ items: [first.record], next: null });
    });

    it('tells nothing of a line check to another club', async () => {
      await store.addLineCheck(newLineCheck(club, idOf(60), idOf(20), 'open end'));
      expect(await store.findLineCheck(otherClub, idOf(60))).toBeNull();
      expect(await store.readLineCheckTrace(otherClub, idOf(60))).toBeNull();
      expect((await store.listLineChecks(otherClub, idOf(20), firstPage)).items).toEqual([]);
    });

    it('is ready while it is open, and unavailable afterwards', async () => {
      await store.ready();
      await store.close();
      await expect(store.ready()).rejects.toMatchObject({ kind: 'unavailable' });
      await expect(
        store.addEditable('sites', actorOf(club), { id: idOf(1), key: 'z', facts: siteFacts }),
      ).rejects.toMatchObject({ kind: 'unavailable' });
    });
  });
}

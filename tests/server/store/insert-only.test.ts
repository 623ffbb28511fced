import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Connection, openWriter } from '../../../server/store/sqlite/connection.ts';
import { club, storeWithClub } from '../../support/open-test-store.ts';
import { actorOf, cableFacts, idOf, newLineCheck } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
let ledger: Connection;

beforeAll(async () => {
  const path = join(newFolder(), 'ledger.sqlite');
  const store = await storeWithClub(path);
  const actor = actorOf(club);
  await store.addCable(actor, { id: idOf(50), key: 'own', facts: cableFacts });
  await store.addLineCheck(newLineCheck(club, idOf(60), idOf(20), 'open end'));
  await store.addWork(actor, {
    id: idOf(70),
    antennaId: idOf(20),
    doneAt: actor.at,
    facts: { kind: 'trimmed', lengthChangeM: -0.1, doneBy: null, note: '', invented: true },
  });
  await store.withdrawWork(actor, idOf(70), 'Another antenna was trimmed.');
  await store.chooseBaseline(actor, idOf(20), { era: '', sweepIds: [idOf(30)] });
  await store.setTestInterval(actor, 90);
  const facts = {
    name: 'Spring round',
    measures: { loadOhm: 50 },
    analyzerIds: [idOf(10)],
    endsAt: actor.at,
    note: '',
  };
  await store.addRound(actor, { id: idOf(80), beginsAt: actor.at, facts });
  await store.close();
  ledger = openWriter(path);
});
afterAll(() => {
  ledger.close();
  removeAll();
});

describe.each([
  'cable',
  'line_check',
  'work_entry',
  'work_withdrawal',
  'baseline',
  'test_interval',
  'round',
])('a row of %s', (table) => {
  it('is there', () => {
    expect(ledger.prepare(`SELECT * FROM ${table}`).all()).toHaveLength(1);
  });

  it.each([
    ['changed', `UPDATE ${table} SET club_id = 'x'`],
    ['deleted', `DELETE FROM ${table}`],
    ['replaced', `REPLACE INTO ${table} SELECT * FROM ${table}`],
  ])('is never %s', (_act, sql) => {
    expect(() => ledger.exec(sql)).toThrow(`${table} is kept as it is`);
  });
});

import { cpSync, mkdirSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, expect, it } from 'vitest';
import { isTold } from '../../../server/store/events.ts';
import { openWriter } from '../../../server/store/sqlite/connection.ts';
import { migrate, readMigrations } from '../../../server/store/sqlite/migrations.ts';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { eventToWire } from '../../../server/wire/event.ts';
import { at, idOf } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
afterAll(removeAll);
const migrations = new URL('../../../migrations/', import.meta.url).pathname;

it('events from before they had details are still told, without an antenna', async () => {
  const folder = newFolder();
  const early = join(folder, 'early');
  mkdirSync(early);
  for (const name of readdirSync(migrations).filter((name) => name < '0006')) {
    cpSync(join(migrations, name), join(early, name));
  }
  const path = join(folder, 'ledger.sqlite');
  const old = openWriter(path);
  migrate(old, readMigrations(early), at, () => {});
  old.exec(`INSERT INTO event (club_id, kind, subject_id, at, member_id) VALUES
    ('${idOf(1)}', 'work_added', '${idOf(2)}', '${at}', '${idOf(900)}')`);
  old.close();

  const store = await openSqliteStore({ path });
  const events = await store.listEvents(idOf(1), 0, 10);
  expect(events.filter(isTold).map((event) => eventToWire(event, 'http://ledger.example'))).toEqual(
    [
      {
        id: '1',
        kind: 'work_added',
        at,
        subject_id: idOf(2),
        antenna_id: null,
        member_id: idOf(900),
        url: 'http://ledger.example/v1/antennas',
      },
    ],
  );
  await store.close();
});

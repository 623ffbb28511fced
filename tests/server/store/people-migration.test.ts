import { cpSync, mkdirSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, expect, it } from 'vitest';
import { openWriter } from '../../../server/store/sqlite/connection.ts';
import { migrate, readMigrations } from '../../../server/store/sqlite/migrations.ts';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { at, idOf } from '../../support/store-records.ts';
import { temporaryFolders } from '../../support/temporary-folders.ts';

const { newFolder, removeAll } = temporaryFolders();
afterAll(removeAll);
const migrations = new URL('../../../migrations/', import.meta.url).pathname;

it('a token from before there were members becomes one of a steward', async () => {
  const folder = newFolder();
  const early = join(folder, 'early');
  mkdirSync(early);
  for (const name of readdirSync(migrations).filter((name) => name < '0004')) {
    cpSync(join(migrations, name), join(early, name));
  }
  const path = join(folder, 'ledger.sqlite');
  const old = openWriter(path);
  migrate(old, readMigrations(early), at, () => {});
  old.exec(`
    INSERT INTO club VALUES ('${idOf(1)}', 'ours', 'Ours', 1, '${at}');
    INSERT INTO token VALUES ('${idOf(2)}', '${idOf(1)}', '${idOf(900)}', 'first', zeroblob(32), '${at}');
  `);
  old.close();

  const store = await openSqliteStore({ path });
  expect(await store.findToken(new Uint8Array(32))).toEqual({
    id: idOf(2),
    clubId: idOf(1),
    memberId: idOf(900),
    role: 'steward',
    scopes: null,
    createdAt: at,
    expiresAt: null,
    lastUsedAt: null,
  });
  await store.close();
});

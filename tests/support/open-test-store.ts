import { openSqliteStore, type SqliteStoreOptions } from '../../server/store/sqlite/open.ts';
import type { SqliteStore } from '../../server/store/sqlite/sqlite-store.ts';
import { at, idOf } from './store-records.ts';

/** The club of `storeWithClub`. */
export const club = idOf(1);

/** A store in the file, with one club in it. */
export async function storeWithClub(
  path: string,
  options: Omit<SqliteStoreOptions, 'path'> = {},
): Promise<SqliteStore> {
  const store = await openSqliteStore({ path, ...options });
  await store.addClub(
    { id: club, key: 'ours', name: 'Ours', invented: true, createdAt: at },
    {
      id: idOf(2),
      clubId: club,
      memberId: idOf(900),
      label: 'first',
      createdAt: at,
      secretSha256: new Uint8Array(32).fill(7),
    },
  );
  return store;
}

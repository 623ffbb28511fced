import { join } from 'node:path';
import type { Store } from '../../../server/store/port.ts';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';
import { restoreLedger } from '../../../server/store/sqlite/restore-ledger.ts';
import { addAntenna } from '../../support/club-records.ts';
import { makeTestApp, type TestApp } from '../../support/test-app.ts';

/** What a test puts in place of methods of the store, to see that it is found out. */
export type Sabotage = (store: () => Store) => Partial<Store>;

/** The service on a store that can be closed and opened again, or restored from a backup. */
export interface LedgerUnderTest {
  readonly app: TestApp;
  restart(): Promise<void>;
  /** Keeps a backup in place of the one before. */
  backup(): Promise<void>;
  restore(): Promise<void>;
  close(): Promise<void>;
}

export const antennas = ['field-20m', 'field-40m'] as const;

export async function openLedger(folder: string, sabotage: Sabotage): Promise<LedgerUnderTest> {
  let store: Store | null = null;
  let copies = 0;
  const nextFile = (name: string) => join(folder, `${name}-${copies++}.sqlite`);
  const app = await makeTestApp({
    around: (first) => {
      const now = () => store ?? first;
      const replaced = sabotage(now);
      return new Proxy(first, {
        get: (_, name) => {
          const method = Reflect.get(name in replaced ? replaced : now(), name);
          return typeof method === 'function' ? method.bind(now()) : method;
        },
      });
    },
  });
  for (const key of antennas) await addAntenna(app, { key });
  // From here on the store is one of this folder.
  let path = nextFile('first');
  await app.service.store.backup(path);
  store = await openSqliteStore({ path });
  let kept = path;
  const reopen = async (next: string) => {
    await store?.close();
    path = next;
    store = await openSqliteStore({ path });
  };
  return {
    app,
    restart: () => reopen(path),
    backup: async () => {
      kept = nextFile('backup');
      await app.service.store.backup(kept);
    },
    restore: async () => {
      const restored = nextFile('restored');
      restoreLedger(kept, restored);
      await reopen(restored);
    },
    close: async () => {
      await store?.close();
      await app.close();
    },
  };
}

import { join } from 'node:path';
import { projectRoot } from '../../project-files.ts';
import { openReader } from './connection.ts';
import { storeErrorOf } from './errors.ts';
import { Reader } from './reader.ts';
import { SqliteStore } from './sqlite-store.ts';
import { Writer } from './writer.ts';

export interface SqliteStoreOptions {
  /** The database file; made if it is not there. Local disk only. */
  readonly path: string;
  readonly migrationsFolder?: string;
  /** The clock, for the record of migrations. */
  readonly now?: () => number;
  /** For tests of a full disk: the most pages that the file may have. */
  readonly maxPages?: number;
  /** For the test that counts flushes to disk: what the service never runs with. */
  readonly synchronous?: 'NORMAL';
  /** Uploads are refused as `full` while the disk has less than this free; 0 if left out. */
  readonly reserveBytes?: number;
}

/** Opens (and if need be makes or migrates) the store of a file. Throws `StoreError`. */
export async function openSqliteStore(options: SqliteStoreOptions): Promise<SqliteStore> {
  const { path, now = Date.now, maxPages, synchronous, reserveBytes = 0 } = options;
  const { migrationsFolder = join(projectRoot(), 'migrations') } = options;
  const writer = await Writer.start({
    path,
    migrationsFolder,
    startedAt: new Date(now()).toISOString(),
    ...(maxPages === undefined ? {} : { maxPages }),
    ...(synchronous === undefined ? {} : { synchronous }),
  });
  try {
    return new SqliteStore(path, new Reader(openReader(path)), writer, reserveBytes);
  } catch (error) {
    await writer.close();
    throw storeErrorOf(error);
  }
}

import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { projectRoot } from '../../project-files.ts';
import { openReader } from './connection.ts';
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
}

/** Opens (and if need be makes or migrates) the store of a file. Throws `StoreError`. */
export async function openSqliteStore(options: SqliteStoreOptions): Promise<SqliteStore> {
  const { path, now = Date.now, maxPages } = options;
  const root = projectRoot();
  const { migrationsFolder = join(root, 'migrations') } = options;
  // Always the compiled file: a thread cannot run the sources, as tests do.
  const entry = pathToFileURL(join(root, 'dist/server/store/sqlite/writer-thread.js'));
  const writer = await Writer.start(entry, {
    path,
    migrationsFolder,
    startedAt: new Date(now()).toISOString(),
    ...(maxPages === undefined ? {} : { maxPages }),
  });
  return new SqliteStore(new Reader(openReader(path)), writer);
}

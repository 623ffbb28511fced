import Database from 'better-sqlite3';
import { StoreError } from '../port.ts';

export type Connection = Database.Database;

/** Marks a file as one of ours. */
export const applicationId = 0x534c4447;
const pageBytes = 8192;
const walLimitBytes = 64 * 1024 * 1024;
/** Before it a WAL reset could corrupt the file; 3.52.0 was withdrawn. */
const oldestSqlite = [3, 51, 3];
const withdrawnSqlite = '3.52.0';

/** Refuses a SQLite that is known to lose or corrupt what it keeps. Throws `unavailable`. */
export function checkSqliteVersion(version: string): void {
  const parts = version.split('.').map(Number);
  const [major, minor, patch] = oldestSqlite;
  const isOld =
    parts[0] < major ||
    (parts[0] === major && (parts[1] < minor || (parts[1] === minor && parts[2] < patch)));
  if (!isOld && version !== withdrawnSqlite) return;
  throw new StoreError('unavailable', `SQLite ${version} is not safe to keep records with.`);
}

/** Opens the file for the one writer, creating it if it is not there. */
export function openWriter(path: string): Connection {
  const connection = new Database(path);
  return guarded(connection, () => {
    checkSqliteVersion(versionOf(connection));
    // Before the journal mode, which is a change to the file itself.
    checkOwner(connection);
    connection.pragma(`page_size = ${pageBytes}`);
    expectPragma(connection, 'journal_mode', 'wal', 'WAL');
    // The bundled build's default under WAL is NORMAL, which may lose acknowledged records.
    expectPragma(connection, 'synchronous', 2, 'FULL');
    expectPragma(connection, 'journal_size_limit', walLimitBytes);
    // Without it, REPLACE removes kept rows past the triggers that refuse it.
    expectPragma(connection, 'recursive_triggers', 1);
    // What is erased is overwritten, not only unlinked.
    expectPragma(connection, 'secure_delete', 1);
    setCommon(connection);
  });
}

/** Opens the file for reading only. */
export function openReader(path: string): Connection {
  const connection = openForCopying(path);
  return guarded(connection, () => {
    expectPragma(connection, 'query_only', 1);
    setCommon(connection);
  });
}

/** Opens the file read-only for VACUUM INTO, which `query_only` would refuse. */
export function openForCopying(path: string): Connection {
  return new Database(path, { readonly: true, fileMustExist: true });
}

function setCommon(connection: Connection): void {
  expectPragma(connection, 'foreign_keys', 1);
  expectPragma(connection, 'trusted_schema', 0);
  expectPragma(connection, 'cell_size_check', 1);
  expectPragma(connection, 'temp_store', 2);
  expectPragma(connection, 'mmap_size', 0);
  connection.pragma('busy_timeout = 5000');
}

/** Sets a pragma and reads it back: a misspelt or refused one is silent otherwise. */
function expectPragma(
  connection: Connection,
  name: string,
  expected: string | number,
  written: string | number = expected,
): void {
  connection.pragma(`${name} = ${written}`);
  const found: unknown = connection.pragma(name, { simple: true });
  // A database without pages yet has no memory map to limit and answers with nothing.
  if (found === expected || (name === 'mmap_size' && found === undefined)) return;
  throw new StoreError('unavailable', `SQLite did not take ${name} = ${expected}: it is ${found}.`);
}

function checkOwner(connection: Connection): void {
  const owner: unknown = connection.pragma('application_id', { simple: true });
  const isEmpty =
    connection.prepare('SELECT count(*) AS tables FROM sqlite_schema').pluck().get() === 0;
  if (owner === applicationId || (owner === 0 && isEmpty)) return;
  throw new StoreError('unavailable', 'The database file belongs to another program.');
}

function versionOf(connection: Connection): string {
  return String(connection.prepare('SELECT sqlite_version()').pluck().get());
}

function guarded(connection: Connection, prepare: () => void): Connection {
  try {
    prepare();
    return connection;
  } catch (error) {
    connection.close();
    throw error;
  }
}

import { createHash } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { StoreError } from '../port.ts';
import { applicationId, type Connection } from './connection.ts';

/** One step of the schema: forward only, never edited once it was released. */
export interface Migration {
  readonly version: number;
  readonly name: string;
  readonly sql: string;
  readonly sha256: string;
}

const fileName = /^(\d{4})_([a-z0-9_]+)\.sql$/;

/** The migrations of a folder, ascending; their numbers must run from 1 without a gap. */
export function readMigrations(folder: string): readonly Migration[] {
  const names = readdirSync(folder)
    .filter((name) => name.endsWith('.sql'))
    .sort();
  return names.map((name, i) => {
    const match = fileName.exec(name);
    if (match === null || Number(match[1]) !== i + 1) {
      throw new StoreError('unavailable', `The migration ${name} is not number ${i + 1}.`);
    }
    const sql = readFileSync(join(folder, name), 'utf8');
    const sha256 = createHash('sha256').update(sql).digest('hex');
    return { version: i + 1, name: match[2], sql, sha256 };
  });
}

/**
 * Brings the schema up to date, each migration in a transaction of its own together with its
 * record. Refuses a schema newer than the migrations and migrations that differ from what was
 * applied. `beforeChange` runs once before the first change to a database that holds anything.
 */
export function migrate(
  connection: Connection,
  migrations: readonly Migration[],
  at: string,
  beforeChange: () => void,
): void {
  const present = schemaVersion(connection);
  if (present > migrations.length) {
    const detail = `The database has schema ${present}, this service knows ${migrations.length}. Start the newer service.`;
    throw new StoreError('unavailable', detail);
  }
  if (present > 0) checkApplied(connection, migrations);
  if (present > 0 && present < migrations.length) beforeChange();
  for (const migration of migrations.slice(present)) apply(connection, migration, at);
}

/** The version of the schema that the file has; 0 if it has none yet. */
export function schemaVersion(connection: Connection): number {
  return Number(connection.pragma('user_version', { simple: true }));
}

function checkApplied(connection: Connection, migrations: readonly Migration[]): void {
  const applied = connection
    .prepare<[], { version: number; sha256: string }>(
      'SELECT version, sha256 FROM schema_migration ORDER BY version',
    )
    .all();
  for (const { version, sha256 } of applied) {
    if (migrations[version - 1]?.sha256 === sha256) continue;
    const detail = `Migration ${version} was changed after it was applied. Restore the file as it was released.`;
    throw new StoreError('unavailable', detail);
  }
}

function apply(connection: Connection, migration: Migration, at: string): void {
  const { version, name, sql, sha256 } = migration;
  const step = connection.transaction(() => {
    if (version === 1) {
      connection.exec(
        'CREATE TABLE schema_migration (version INTEGER NOT NULL PRIMARY KEY, name TEXT NOT NULL, sha256 TEXT NOT NULL, applied_at TEXT NOT NULL) STRICT',
      );
      connection.pragma(`application_id = ${applicationId}`);
    }
    connection.exec(sql);
    const broken = connection
      .prepare('SELECT count(*) FROM pragma_foreign_key_check')
      .pluck()
      .get();
    if (broken !== 0) {
      throw new StoreError(
        'corrupt',
        `Migration ${version} would leave ${broken} rows without their parents.`,
      );
    }
    connection
      .prepare(
        'INSERT INTO schema_migration (version, name, sha256, applied_at) VALUES (?, ?, ?, ?)',
      )
      .run(version, name, sha256, at);
    connection.pragma(`user_version = ${version}`);
  });
  step.immediate();
}

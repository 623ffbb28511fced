import { rmSync } from 'node:fs';
import type { Connection } from './connection.ts';
import { migrate, readMigrations, schemaVersion } from './migrations.ts';
import { makeVerifiedCopy } from './verified-copy.ts';
import type { WriterOptions } from './writer-thread.ts';

/**
 * Migrates the writer's file, with a verified copy beside it before any change: named by schema and
 * time, for the copy of an earlier try may be out of date. It goes again if nothing was changed, so
 * that a service which fails at every start does not fill the disk with copies.
 */
export function prepareFile(connection: Connection, options: WriterOptions): void {
  const { path, migrationsFolder, startedAt, maxPages, synchronous } = options;
  const migrations = readMigrations(migrationsFolder);
  const before = schemaVersion(connection);
  const copy = `${path}.schema-${before}-${startedAt.replaceAll(/[-:.]/g, '')}`;
  try {
    migrate(connection, migrations, startedAt, () => makeVerifiedCopy(connection, copy));
  } catch (error) {
    if (schemaVersion(connection) === before) rmSync(copy, { force: true });
    throw error;
  }
  if (maxPages !== undefined) connection.pragma(`max_page_count = ${maxPages}`);
  if (synchronous !== undefined) connection.pragma(`synchronous = ${synchronous}`);
}

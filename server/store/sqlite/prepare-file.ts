import { existsSync } from 'node:fs';
import type { Connection } from './connection.ts';
import { migrate, readMigrations } from './migrations.ts';
import { makeVerifiedCopy } from './verified-copy.ts';
import type { WriterOptions } from './writer-thread.ts';

/** Migrates the writer's file, with a verified copy beside it before any change. */
export function prepareFile(connection: Connection, options: WriterOptions): void {
  const { path, migrationsFolder, startedAt, maxPages } = options;
  const migrations = readMigrations(migrationsFolder);
  migrate(connection, migrations, startedAt, (fromVersion) => {
    const kept = `${path}.schema-${fromVersion}`;
    if (!existsSync(kept)) makeVerifiedCopy(connection, kept);
  });
  if (maxPages !== undefined) connection.pragma(`max_page_count = ${maxPages}`);
}

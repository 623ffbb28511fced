import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import Database from 'better-sqlite3';
import { openSqliteStore } from '../../../server/store/sqlite/open.ts';

// Opens a store, which migrates it. Told `bare`, it runs the last migration's statements without
// any transaction instead: what the test must find out.
const [path, migrationsFolder, way] = process.argv.slice(2);
if (way === 'bare') {
  const hand = new Database(path);
  const last = readdirSync(migrationsFolder).sort().at(-1) ?? '';
  hand.exec(readFileSync(join(migrationsFolder, last), 'utf8'));
} else {
  await openSqliteStore({ path, migrationsFolder });
}

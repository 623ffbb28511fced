import { randomBytes } from 'node:crypto';
import { mkdirSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { readConfig } from './config.ts';
import { makeIdSource } from './ids.ts';
import { addClub } from './new-club.ts';
import { ledgerPath } from './store/ledger-path.ts';
import { StoreError } from './store/port.ts';
import { openSqliteStore } from './store/sqlite/open.ts';
import { keySchema } from './wire/common.ts';
import { clubNameSchema } from './wire/member.ts';

// `npm run add-club -- --name NAME [--key KEY]`: one more club, whether the service runs or not.
try {
  process.stdout.write(await run());
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
}

async function run(): Promise<string> {
  const { name, key } = readArguments();
  const { dataDir } = readConfig(process.env);
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  const store = await openSqliteStore({ path: ledgerPath(dataDir) });
  try {
    const service = { store, now: Date.now, newId: makeIdSource(Date.now, randomBytes) };
    const { token } = await addClub(service, randomBytes, { key, name, invented: false });
    return `The club \`${key}\` is there. The token of its first steward, shown only this once:\n\n  ${token}\n\n`;
  } catch (error) {
    if (!(error instanceof StoreError) || error.kind !== 'conflict') throw error;
    throw new Error(`There is a club \`${key}\` already; choose another key with --key.`);
  } finally {
    await store.close();
  }
}

function readArguments(): { readonly name: string; readonly key: string } {
  const options = { name: { type: 'string' }, key: { type: 'string' } } as const;
  const { name, key } = parseArgs({ options }).values;
  if (name === undefined) throw new Error('Usage: npm run add-club -- --name NAME [--key KEY]');
  const named = clubNameSchema.safeParse(name);
  if (!named.success) throw new Error('The name has 1 to 100 characters, none of them a control.');
  const keyed = keySchema.safeParse(key ?? keyOf(name));
  if (keyed.success) return { name: named.data, key: keyed.data };
  throw new Error(
    'The key has lower-case letters, digits and hyphens between; give one with --key.',
  );
}

/** A key made of the letters and digits of a name. */
function keyOf(name: string): string {
  const plain = name.normalize('NFKD').toLowerCase();
  const words = plain.replaceAll(/\p{M}/gu, '').match(/[a-z0-9]+/g);
  return (words ?? []).join('-').slice(0, 40).replace(/-+$/, '');
}

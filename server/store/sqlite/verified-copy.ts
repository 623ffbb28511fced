import { createHash } from 'node:crypto';
import { closeSync, fsyncSync, openSync, renameSync, rmSync } from 'node:fs';
import { dirname } from 'node:path';
import Database from 'better-sqlite3';
import { StoreError } from '../port.ts';
import { verifyAudit } from './audit-chain.ts';
import { type Codec, unpackHere } from './compression.ts';
import type { Connection } from './connection.ts';
import { schemaVersion } from './migrations.ts';

/** The schema that brought the audit trail. */
const auditSince = 12;

interface FileRow {
  readonly sha256: Buffer;
  readonly bytes: number;
  readonly codec: Codec;
  readonly body: Buffer;
}

/**
 * Copies the database online into a new file: under another name until it is checked and on disk,
 * so that a file of the asked name is never half a copy. Throws `corrupt`.
 */
export function makeVerifiedCopy(connection: Connection, path: string): void {
  const unfinished = `${path}.part`;
  rmSync(unfinished, { force: true });
  try {
    connection.prepare('VACUUM INTO ?').run(unfinished);
    verifyCopy(unfinished);
    flush(unfinished);
    renameSync(unfinished, path);
  } catch (error) {
    rmSync(unfinished, { force: true });
    throw error;
  }
  flush(dirname(path));
}

/** Waits until the file or folder is on disk. */
export function flush(path: string): void {
  const handle = openSync(path, 'r');
  fsyncSync(handle);
  closeSync(handle);
}

/**
 * Checks a copy of the database as a whole: its structure, that no row lacks its parent, every
 * file against its SHA-256, and the audit trail. Throws `corrupt`.
 */
export function verifyCopy(path: string): void {
  const copy = new Database(path, { readonly: true, fileMustExist: true });
  try {
    const integrity: unknown = copy.pragma('integrity_check', { simple: true });
    if (integrity !== 'ok') throw new StoreError('corrupt', `The copy is damaged: ${integrity}.`);
    const orphans = copy.prepare('SELECT count(*) FROM pragma_foreign_key_check').pluck().get();
    if (orphans !== 0)
      throw new StoreError('corrupt', `The copy has ${orphans} rows without parents.`);
    // The schemas of the first releases had none.
    if (schemaVersion(copy) >= auditSince) verifyAudit(copy);
    const files = copy.prepare<[], FileRow>('SELECT sha256, bytes, codec, body FROM file');
    for (const file of files.iterate()) {
      if (isWhole(file)) continue;
      const name = file.sha256.toString('hex');
      throw new StoreError('corrupt', `The file ${name} in the copy is damaged.`);
    }
  } finally {
    copy.close();
  }
}

function isWhole({ sha256, bytes, codec, body }: FileRow): boolean {
  try {
    const file = unpackHere({ codec, body }, bytes);
    return createHash('sha256').update(file).digest().equals(sha256);
  } catch {
    return false;
  }
}

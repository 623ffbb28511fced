import { constants, copyFileSync, existsSync, linkSync, rmSync } from 'node:fs';
import { dirname } from 'node:path';
import { StoreError } from '../port.ts';
import { applicationId, openForCopying } from './connection.ts';
import { storeErrorOf } from './errors.ts';
import { flush, verifyCopy } from './verified-copy.ts';

/**
 * Makes a backup the ledger at `path`, where there must be none: copies it under another name, checks
 * the copy, and only then gives it the name. Throws `StoreError`.
 */
export function restoreLedger(backup: string, path: string): void {
  // Also a log beside it: that of a ledger which somebody moved would be played into the new one.
  const taken = [path, `${path}-wal`, `${path}-shm`].find((file) => existsSync(file));
  if (taken !== undefined) {
    throw new StoreError('conflict', `${taken} is there already; nothing was written.`);
  }
  if (existsSync(`${backup}-wal`)) {
    throw new StoreError('conflict', `${backup} is a ledger in use: make a backup of it first.`);
  }
  const unfinished = `${path}.restoring`;
  rmSync(unfinished, { force: true });
  try {
    copyFileSync(backup, unfinished, constants.COPYFILE_EXCL);
    checkOwner(unfinished);
    verifyCopy(unfinished);
    flush(unfinished);
    // Unlike a renaming, it fails where the name came into use meanwhile.
    linkSync(unfinished, path);
  } finally {
    rmSync(unfinished, { force: true });
  }
  flush(dirname(path));
}

function checkOwner(path: string): void {
  const connection = openForCopying(path);
  try {
    if (connection.pragma('application_id', { simple: true }) === applicationId) return;
    throw new StoreError('corrupt', 'The file is no backup of a ledger.');
  } catch (error) {
    throw storeErrorOf(error);
  } finally {
    connection.close();
  }
}

import { existsSync } from 'node:fs';
import { StoreError } from '../port.ts';
import { type AuditHead, verifyAudit } from './audit-chain.ts';
import { openForCopying } from './connection.ts';
import { storeErrorOf } from './errors.ts';

/** Verifies the audit trail in a database file, in use or not. Throws `StoreError`. */
export function auditHead(path: string): AuditHead {
  if (!existsSync(path)) throw new StoreError('unavailable', `There is no file ${path}.`);
  try {
    const connection = openForCopying(path);
    try {
      return verifyAudit(connection);
    } finally {
      connection.close();
    }
  } catch (error) {
    throw storeErrorOf(error);
  }
}

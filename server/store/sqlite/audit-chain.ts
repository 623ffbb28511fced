import { createHash } from 'node:crypto';
import { StoreError } from '../port.ts';
import type { Connection } from './connection.ts';

/** What the hash of an entry covers beside the hash of the one before. */
export interface AuditContent {
  readonly seq: number;
  readonly clubId: string;
  readonly at: string;
  readonly memberId: string;
  readonly act: string;
  readonly subjectId: string;
  readonly outcome: string;
  readonly originSha256: Buffer | null;
}

type ChainRow = AuditContent & {
  readonly hash: Buffer;
  readonly salt: Buffer | null;
  readonly address: string | null;
};

/** The end of a chain that holds. */
export interface AuditHead {
  readonly entries: number;
  /** Hexadecimal. */
  readonly hash: string;
}

/** What the first entry follows. */
export const chainStart: Buffer = Buffer.alloc(32);

/** The hash of an entry: SHA-256 over the one before and the content as a JSON array (UTF-8). */
export function chainHash(before: Buffer, content: AuditContent): Buffer {
  const { seq, clubId, at, memberId, act, subjectId, outcome, originSha256 } = content;
  const origin = originSha256?.toString('hex') ?? null;
  const canonical = JSON.stringify([seq, clubId, at, memberId, act, subjectId, outcome, origin]);
  return createHash('sha256').update(before).update(canonical).digest();
}

/** What the chain covers of an address. */
export function originHash(salt: Buffer, address: string): Buffer {
  return createHash('sha256').update(salt).update(address).digest();
}

/**
 * Follows the chain from its start; an erased address breaks nothing. Entries cut off at the end show
 * only against a head that was written down before. Throws `corrupt` at the first entry that is not
 * what was written.
 */
export function verifyAudit(connection: Connection): AuditHead {
  const rows = connection.prepare<[], ChainRow>(
    `SELECT audit.seq, club_id AS clubId, at, member_id AS memberId, act, subject_id AS subjectId,
       outcome, origin_sha256 AS originSha256, hash, salt, address
     FROM audit LEFT JOIN audit_origin ON audit_origin.seq = audit.seq ORDER BY audit.seq`,
  );
  let entries = 0;
  let before = chainStart;
  for (const row of rows.iterate()) {
    entries += 1;
    if (row.seq !== entries) throw broken(entries, 'is missing');
    if (!chainHash(before, row).equals(row.hash)) throw broken(entries, 'is not what was written');
    if (!hasItsOrigin(row)) throw broken(entries, 'has another address than was written');
    before = row.hash;
  }
  return { entries, hash: before.toString('hex') };
}

function hasItsOrigin({ salt, address, originSha256 }: ChainRow): boolean {
  if (salt === null || address === null) return true;
  return originSha256 !== null && originHash(salt, address).equals(originSha256);
}

function broken(entry: number, how: string): StoreError {
  return new StoreError('corrupt', `The audit trail is broken: entry ${entry} ${how}.`);
}

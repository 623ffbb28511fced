import { randomBytes } from 'node:crypto';
import type { AuditEntry } from '../audit.ts';
import { presentOrigin } from '../origin.ts';
import type { PageRequest } from '../port.ts';
import { type AuditContent, chainHash, chainStart, originHash } from './audit-chain.ts';
import type { Connection } from './connection.ts';

export type AuditAct = Omit<AuditContent, 'seq' | 'originSha256'>;

/** Appends to the audit trail, within the act that calls it. */
export function auditLog(connection: Connection): (act: AuditAct) => void {
  const selectHead = connection.prepare<[], { readonly seq: number; readonly hash: Buffer }>(
    'SELECT seq, hash FROM audit ORDER BY seq DESC LIMIT 1',
  );
  const insert = connection.prepare(
    `INSERT INTO audit (seq, club_id, at, member_id, act, subject_id, outcome, origin_sha256, hash)
     VALUES (@seq, @clubId, @at, @memberId, @act, @subjectId, @outcome, @originSha256, @hash)`,
  );
  const insertOrigin = connection.prepare(
    'INSERT INTO audit_origin (seq, salt, address) VALUES (?, ?, ?)',
  );
  return (act) => {
    const head = selectHead.get() ?? { seq: 0, hash: chainStart };
    const seq = head.seq + 1;
    const address = presentOrigin();
    const salt = randomBytes(16);
    const originSha256 = address === null ? null : originHash(salt, address);
    const content = { ...act, seq, originSha256 };
    insert.run({ ...content, hash: chainHash(head.hash, content) });
    if (address !== null) insertOrigin.run(seq, salt, address);
  };
}

type AuditRow = Omit<AuditEntry, 'hash'> & { readonly hash: Buffer };

/** The list of the audit trail; a test holds it against its query plan. */
export const auditListQueries = {
  audit: `SELECT audit.seq, club_id AS clubId, at, member_id AS memberId, act, subject_id AS subjectId,
      outcome, address, hash
    FROM audit LEFT JOIN audit_origin ON audit_origin.seq = audit.seq
    WHERE club_id = @clubId AND audit.seq < @before ORDER BY audit.seq DESC LIMIT @limit`,
} as const;

/** What is asked about the audit trail. */
export class AuditQueries {
  private readonly prepared;

  constructor(connection: Connection) {
    this.prepared = connection.prepare<unknown[], AuditRow>(auditListQueries.audit);
  }

  /** One row more than the page holds, if there is one. */
  list(clubId: string, { limit, after }: PageRequest): AuditEntry[] {
    const before = after === null ? Number.MAX_SAFE_INTEGER : Number(after[0]);
    const rows = this.prepared.all({ clubId, before, limit: limit + 1 });
    return rows.map((row) => ({ ...row, hash: row.hash.toString('hex') }));
  }
}

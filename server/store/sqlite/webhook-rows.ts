import type { WebhookProgress, WebhookRecord } from '../webhooks.ts';

export type WebhookRow = Omit<WebhookRecord, 'facts' | 'progress'> &
  Pick<WebhookProgress, 'sentSeq' | 'failures' | 'nextAttemptAt'> & {
    readonly facts: string;
    readonly active: number;
    readonly lastAttempt: string | null;
  };

/** Columns of a `WebhookRow`, for SELECT and RETURNING. */
export const webhookColumns = `club_id AS clubId, id, revision, created_at AS createdAt,
  updated_at AS updatedAt, facts, active, sent_seq AS sentSeq, failures,
  next_attempt_at AS nextAttemptAt, last_attempt AS lastAttempt`;

/** A row as the record that callers know. */
export function toWebhookRecord(row: WebhookRow): WebhookRecord {
  const { clubId, id, revision, createdAt, updatedAt, sentSeq, failures, nextAttemptAt } = row;
  const lastAttempt = row.lastAttempt === null ? null : JSON.parse(row.lastAttempt);
  const active = row.active === 1;
  return {
    clubId,
    id,
    revision,
    createdAt,
    updatedAt,
    facts: JSON.parse(row.facts),
    progress: { active, sentSeq, failures, nextAttemptAt, lastAttempt },
  };
}

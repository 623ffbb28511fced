import { type Actor, StoreError } from '../port.ts';
import type { WebhookFacts, WebhookProgress } from '../webhooks.ts';
import type { Connection } from './connection.ts';
import type { WriteEvent } from './people-acts.ts';
import { type WebhookRow, webhookColumns } from './webhook-rows.ts';

/** What the writer does about webhooks, each whole or not at all. */
export interface WebhookActs {
  addWebhook(actor: Actor, id: string, facts: WebhookFacts, secret: string): WebhookRow;
  editWebhook(
    actor: Actor,
    id: string,
    revision: number,
    facts: WebhookFacts,
    active: boolean,
  ): WebhookRow;
  removeWebhook(actor: Actor, id: string): null;
  noteWebhookProgress(clubId: string, id: string, progress: WebhookProgress): null;
}

const newestEvent = 'coalesce((SELECT max(seq) FROM event WHERE club_id = @clubId), 0)';

/** Prepares the acts on the writer's connection. */
export function webhookActs(connection: Connection, writeEvent: WriteEvent): WebhookActs {
  const insert = connection.prepare<unknown[], WebhookRow>(
    `INSERT INTO webhook (club_id, id, revision, created_at, updated_at, facts, active, secret, sent_seq)
     VALUES (@clubId, @id, 1, @at, @at, @facts, 1, @secret, ${newestEvent}) RETURNING ${webhookColumns}`,
  );
  const restart = `active = 0 AND @active = 1`;
  const update = connection.prepare<unknown[], WebhookRow>(
    `UPDATE webhook SET revision = revision + 1, updated_at = @at, facts = @facts, active = @active,
       sent_seq = iif(${restart}, ${newestEvent}, sent_seq),
       failures = iif(${restart}, 0, failures),
       next_attempt_at = iif(${restart}, NULL, next_attempt_at)
     WHERE club_id = @clubId AND id = @id AND revision = @revision RETURNING ${webhookColumns}`,
  );
  const remove = connection.prepare('DELETE FROM webhook WHERE club_id = ? AND id = ?');
  const updateProgress = connection.prepare(
    `UPDATE webhook SET active = @active, sent_seq = @sentSeq, failures = @failures,
       next_attempt_at = @nextAttemptAt, last_attempt = @lastAttempt
     WHERE club_id = @clubId AND id = @id AND active = 1`,
  );
  const rowOrThrow = (row: WebhookRow | undefined, error: StoreError): WebhookRow => {
    if (row === undefined) throw error;
    return row;
  };

  return {
    addWebhook(actor, id, facts, secret) {
      const { clubId, at } = actor;
      // Before the event of its own making, which it is not sent.
      writeEvent(actor, 'webhook_added', id);
      const row = insert.get({ clubId, id, at, facts: JSON.stringify(facts), secret });
      return rowOrThrow(row, new StoreError('unavailable', 'The webhook was not kept.'));
    },
    editWebhook(actor, id, revision, facts, active) {
      const { clubId, at } = actor;
      const row = update.get({
        clubId,
        id,
        at,
        revision,
        facts: JSON.stringify(facts),
        active: active ? 1 : 0,
      });
      const stale = new StoreError(
        'stale',
        `Revision ${revision} of ${id} is not the present one.`,
      );
      const edited = rowOrThrow(row, stale);
      writeEvent(actor, 'webhook_edited', id);
      return edited;
    },
    removeWebhook(actor, id) {
      const { changes } = remove.run(actor.clubId, id);
      if (changes > 0) writeEvent(actor, 'webhook_removed', id);
      return null;
    },
    noteWebhookProgress(clubId, id, { active, lastAttempt, ...progress }) {
      updateProgress.run({
        clubId,
        id,
        ...progress,
        active: active ? 1 : 0,
        lastAttempt: lastAttempt === null ? null : JSON.stringify(lastAttempt),
      });
      return null;
    },
  };
}

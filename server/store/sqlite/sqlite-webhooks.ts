import type { Actor, Page, PageRequest } from '../port.ts';
import type { WebhookFacts, WebhookProgress, WebhookRecord, WebhookStore } from '../webhooks.ts';
import type { Connection } from './connection.ts';
import { pageOf } from './page-of.ts';
import { toWebhookRecord, type WebhookRow, webhookColumns } from './webhook-rows.ts';
import type { Writer } from './writer.ts';

/** The list of webhooks; a test holds it against its query plan. */
export const webhookListQueries = {
  webhooks: `SELECT ${webhookColumns} FROM webhook WHERE club_id = @clubId AND id > @id ORDER BY id LIMIT @limit`,
} as const;

/** What is asked about webhooks. */
export class WebhookQueries {
  private readonly prepared;

  constructor(connection: Connection) {
    const prepare = <Row>(sql: string) => connection.prepare<unknown[], Row>(sql);
    this.prepared = {
      list: prepare<WebhookRow>(webhookListQueries.webhooks),
      one: prepare<WebhookRow>(
        `SELECT ${webhookColumns} FROM webhook WHERE club_id = ? AND id = ?`,
      ),
      active: prepare<WebhookRow & { readonly secret: string }>(
        `SELECT ${webhookColumns}, secret FROM webhook WHERE active = 1`,
      ),
    };
  }

  one(clubId: string, id: string): WebhookRow | null {
    return this.prepared.one.get(clubId, id) ?? null;
  }

  /** One row more than the page holds, if there is one. */
  list(clubId: string, { limit, after }: PageRequest): WebhookRow[] {
    const [, id] = after ?? ['', ''];
    return this.prepared.list.all({ clubId, id, limit: limit + 1 });
  }

  active(): (WebhookRow & { readonly secret: string })[] {
    return this.prepared.active.all();
  }
}

type Read = <Row>(ask: (queries: WebhookQueries) => Row) => Row;

/** Webhooks in the SQLite file. */
export class SqliteWebhooks implements WebhookStore {
  private readonly read: Read;
  private readonly writer: Writer;

  constructor(read: Read, writer: Writer) {
    this.read = read;
    this.writer = writer;
  }

  async add(
    actor: Actor,
    {
      id,
      facts,
      secret,
    }: { readonly id: string; readonly facts: WebhookFacts; readonly secret: string },
  ): Promise<WebhookRecord> {
    return toWebhookRecord(await this.writer.run('addWebhook', actor, id, facts, secret));
  }

  async find(clubId: string, id: string): Promise<WebhookRecord | null> {
    const row = this.read((queries) => queries.one(clubId, id));
    return row === null ? null : toWebhookRecord(row);
  }

  async list(clubId: string, page: PageRequest): Promise<Page<WebhookRecord>> {
    const rows = this.read((queries) => queries.list(clubId, page));
    return pageOf(rows, page, toWebhookRecord, ({ createdAt, id }) => [createdAt, id]);
  }

  async edit(
    actor: Actor,
    id: string,
    revision: number,
    { facts, active }: { readonly facts: WebhookFacts; readonly active: boolean },
  ): Promise<WebhookRecord> {
    const row = await this.writer.run('editWebhook', actor, id, revision, facts, active);
    return toWebhookRecord(row);
  }

  async remove(actor: Actor, id: string): Promise<void> {
    await this.writer.run('removeWebhook', actor, id);
  }

  async listActive(): Promise<readonly (WebhookRecord & { readonly secret: string })[]> {
    const rows = this.read((queries) => queries.active());
    return rows.map((row) => ({ ...toWebhookRecord(row), secret: row.secret }));
  }

  async noteProgress(clubId: string, id: string, progress: WebhookProgress): Promise<void> {
    await this.writer.run('noteWebhookProgress', clubId, id, progress);
  }
}

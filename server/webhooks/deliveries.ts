import type { Clock } from '../ids.ts';
import { isTold, type LedgerEvent } from '../store/events.ts';
import type { Store } from '../store/port.ts';
import type { WebhookProgress, WebhookRecord } from '../store/webhooks.ts';
import { messageOf } from './message.ts';
import type { Send } from './send.ts';

const second = 1000;
const minute = 60 * second;
const hour = 60 * minute;

/** How long is waited after each failure (the specification's suggestion, from memory). */
const waitsMs = [
  5 * second,
  5 * minute,
  30 * minute,
  2 * hour,
  5 * hour,
  10 * hour,
  14 * hour,
  20 * hour,
  24 * hour,
] as const;

const batch = 100;
/** Timers hold 32 bits of milliseconds. */
const longestWaitMs = 24 * hour;

interface DeliveryParts {
  readonly store: Store;
  readonly now: Clock;
  readonly publicUrl: string;
  readonly send: Send;
  readonly onFailure: (error: unknown) => void;
}

type Active = WebhookRecord & { readonly secret: string };

/**
 * Sends events to webhooks, to each in their order. How far it has come is kept in the store, so
 * that a restart neither loses an event nor forgets a wait; an event whose receipt was not kept is
 * sent again under the same id.
 */
export class WebhookDeliveries {
  private readonly parts: DeliveryParts;
  private running: Promise<void> | null = null;
  private isStale = false;
  private readonly stopping = new AbortController();
  private endWatch: (() => void) | null = null;
  private timer: NodeJS.Timeout | undefined;

  constructor(parts: DeliveryParts) {
    this.parts = parts;
  }

  /** Sends from now on whatever is written, and what is due by the clock. */
  start(): void {
    this.endWatch = this.parts.store.onWrite(() => this.wake());
    this.wake();
  }

  /** Ends what is under way, which then counts as not tried, and begins no more. */
  async stop(): Promise<void> {
    this.stopping.abort();
    this.endWatch?.();
    clearTimeout(this.timer);
    await this.running;
  }

  private get isStopped(): boolean {
    return this.stopping.signal.aborted;
  }

  /** Sends what is due; returns when something is due next, ms since 1970, or null. */
  async deliverDue(): Promise<number | null> {
    const webhooks = await this.parts.store.webhooks.listActive();
    const next = await Promise.all(webhooks.map((webhook) => this.deliver(webhook)));
    const due = next.flatMap((at) => at ?? []);
    return due.length === 0 ? null : Math.min(...due);
  }

  private wake(): void {
    this.isStale = true;
    if (this.isStopped) return;
    this.running ??= this.deliverWhileStale().finally(() => {
      this.running = null;
    });
  }

  private async deliverWhileStale(): Promise<void> {
    try {
      let nextAt: number | null = null;
      while (this.isStale && !this.isStopped) {
        this.isStale = false;
        nextAt = await this.deliverDue();
      }
      this.wakeAt(nextAt);
    } catch (error) {
      this.parts.onFailure(error);
      this.wakeAt(this.parts.now() + minute);
    }
  }

  private wakeAt(at: number | null): void {
    clearTimeout(this.timer);
    if (at === null || this.isStopped) return;
    const waitMs = Math.min(Math.max(at - this.parts.now(), 0), longestWaitMs);
    this.timer = setTimeout(() => this.wake(), waitMs).unref();
  }

  /** Sends one webhook what it has not had; returns when the next attempt is due, or null. */
  private async deliver(webhook: Active): Promise<number | null> {
    const { store, now } = this.parts;
    const { clubId, id } = webhook;
    let { progress } = webhook;
    while (!this.isStopped) {
      const dueAt = progress.nextAttemptAt === null ? null : Date.parse(progress.nextAttemptAt);
      if (dueAt !== null && dueAt > now()) return dueAt;
      const events = await store.listEvents(clubId, progress.sentSeq, batch);
      if (events.length === 0) return null;
      progress = await this.afterNext(webhook, progress, events);
      if (this.isStopped && progress.failures > 0) return null;
      await store.webhooks.noteProgress(clubId, id, progress);
      if (!progress.active) return null;
    }
    return null;
  }

  /** Passes over what is not wanted, and makes one attempt at the first event that is. */
  private async afterNext(
    webhook: Active,
    progress: WebhookProgress,
    events: readonly LedgerEvent[],
  ): Promise<WebhookProgress> {
    const { kinds } = webhook.facts;
    let { sentSeq } = progress;
    for (const event of events) {
      if (isTold(event) && (kinds === null || kinds.includes(event.kind))) {
        const { now, publicUrl, send } = this.parts;
        const { id, secret, facts } = webhook;
        const nowMs = now();
        const sent = await send(
          messageOf({ id, secret, url: facts.url }, event, nowMs, publicUrl),
          this.stopping.signal,
        );
        const lastAttempt = { at: new Date(nowMs).toISOString(), ...sent };
        if (sent.outcome !== 'delivered') {
          return afterFailure(
            { ...progress, sentSeq, lastAttempt },
            sent.outcome === 'gone',
            nowMs,
          );
        }
        return { active: true, sentSeq: event.seq, failures: 0, nextAttemptAt: null, lastAttempt };
      }
      sentSeq = event.seq;
    }
    return { ...progress, sentSeq };
  }
}

function afterFailure(progress: WebhookProgress, isGone: boolean, nowMs: number): WebhookProgress {
  const waitMs = waitsMs[progress.failures];
  const failures = progress.failures + 1;
  if (isGone || waitMs === undefined) {
    return { ...progress, active: false, failures, nextAttemptAt: null };
  }
  return { ...progress, failures, nextAttemptAt: new Date(nowMs + waitMs).toISOString() };
}

import { isTold, type LedgerEvent } from '../store/events.ts';
import type { Store } from '../store/port.ts';
import { eventToWire } from '../wire/event.ts';
import type { EventBroadcast } from './broadcast.ts';
import type { EventStream } from './event-stream.ts';

/** What was missed beyond this is not replayed: reading the present state is cheaper. */
export const mostReplayed = 1000;

interface ListenerParts {
  readonly store: Store;
  readonly broadcast: EventBroadcast;
  readonly stream: EventStream;
  readonly clubId: string;
  readonly publicUrl: string;
  /** Asked before anything is sent. */
  readonly isAllowed: () => Promise<boolean>;
}

/** Sends a club's events to one stream, each once and in order, for as long as it is allowed to. */
export class EventListener {
  private readonly parts: ListenerParts;
  private sentSeq = 0;
  /** Sends one thing after another. */
  private tail: Promise<void> = Promise.resolve();

  constructor(parts: ListenerParts) {
    this.parts = parts;
  }

  /** Replays what came after `lastEventId`, or begins with what is next; ends with the stream. */
  async start(lastEventId: string | undefined): Promise<void> {
    const { broadcast, clubId, stream } = this.parts;
    const endListening = await broadcast.listen(clubId, (events) => {
      this.inTurn(() => this.send(events));
    });
    stream.once('close', endListening);
    this.inTurn(() => this.replay(lastEventId));
    await this.tail;
  }

  /** Shows that the connection lives, or ends it where it is not allowed any more. */
  heartbeat(): void {
    this.inTurn(async () => {
      if (await this.mayGoOn()) this.parts.stream.comment('here');
    });
  }

  private inTurn(act: () => Promise<void>): void {
    this.tail = this.tail.then(act).catch((error: unknown) => {
      this.parts.stream.destroy(error instanceof Error ? error : new Error(String(error)));
    });
  }

  private async replay(lastEventId: string | undefined): Promise<void> {
    const { store, stream, clubId } = this.parts;
    const newest = await store.newestSeq();
    if (lastEventId === undefined) {
      this.sentSeq = newest;
      stream.place(newest);
      return;
    }
    const after = /^\d{1,15}$/.test(lastEventId) ? Number(lastEventId) : Number.NaN;
    const missed = after <= newest ? await store.listEvents(clubId, after, mostReplayed + 1) : null;
    if (missed === null || missed.length > mostReplayed) {
      this.sentSeq = newest;
      stream.event(newest, 'reset', JSON.stringify({ id: String(newest) }));
      return;
    }
    this.sentSeq = after;
    await this.send(missed);
  }

  private async send(events: readonly LedgerEvent[]): Promise<void> {
    const { stream, publicUrl } = this.parts;
    if (!(await this.mayGoOn())) return;
    for (const event of events) {
      if (event.seq <= this.sentSeq) continue;
      this.sentSeq = event.seq;
      if (!isTold(event)) continue;
      stream.event(event.seq, event.kind, JSON.stringify(eventToWire(event, publicUrl)));
    }
  }

  private async mayGoOn(): Promise<boolean> {
    const allowed = await this.parts.isAllowed();
    if (!allowed) this.parts.stream.end();
    return allowed;
  }
}

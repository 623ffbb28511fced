import type { EventStore, LedgerEvent } from '../store/events.ts';

const batch = 500;

type Listener = (events: readonly LedgerEvent[]) => void;

/** Those who listen to one club, and the last event that they were given. */
interface Audience {
  readonly listeners: Set<Listener>;
  seq: number;
}

/**
 * Passes new events on to everybody who listens in this process. A club's events are read once
 * after a write, however many listen to it, and not at all while nobody does.
 */
export class EventBroadcast {
  private readonly store: EventStore;
  private readonly onFailure: (error: unknown) => void;
  private readonly audiences = new Map<string, Audience>();
  private endWatch: (() => void) | null = null;
  private isReading = false;
  private isStale = false;

  constructor(store: EventStore, onFailure: (error: unknown) => void) {
    this.store = store;
    this.onFailure = onFailure;
  }

  /** Gives the listener the club's events from here on; returns what ends that. */
  async listen(clubId: string, listener: Listener): Promise<() => void> {
    const seq = await this.store.newestSeq();
    const audience = this.audiences.get(clubId) ?? { listeners: new Set(), seq };
    audience.listeners.add(listener);
    this.audiences.set(clubId, audience);
    this.endWatch ??= this.store.onWrite(() => this.noteWrite());
    // What was written while the number was asked for.
    this.noteWrite();
    return () => {
      audience.listeners.delete(listener);
      if (audience.listeners.size === 0) this.audiences.delete(clubId);
      if (this.audiences.size > 0) return;
      this.endWatch?.();
      this.endWatch = null;
    };
  }

  private noteWrite(): void {
    this.isStale = true;
    if (this.isReading) return;
    this.isReading = true;
    this.passOn().catch(this.onFailure);
  }

  private async passOn(): Promise<void> {
    try {
      while (this.isStale) {
        this.isStale = false;
        for (const [clubId, audience] of this.audiences) await this.passOnTo(clubId, audience);
      }
    } finally {
      this.isReading = false;
    }
  }

  private async passOnTo(clubId: string, audience: Audience): Promise<void> {
    const events = await this.store.listEvents(clubId, audience.seq, batch);
    this.isStale ||= events.length === batch;
    const newest = events.at(-1);
    if (newest === undefined) return;
    audience.seq = newest.seq;
    for (const listener of audience.listeners) listener(events);
  }
}

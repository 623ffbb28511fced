import type { ToldEventKind } from './events.ts';
import type { Actor, Page, PageRequest } from './port.ts';

/** What a club says of a webhook. */
export interface WebhookFacts {
  readonly url: string;
  /** Null: all. */
  readonly kinds: readonly ToldEventKind[] | null;
  readonly note: string;
}

/** How an attempt to send ended; `delivered`, or why not. */
export const attemptOutcomes = [
  'delivered',
  'refused_by_receiver',
  'redirected',
  'gone',
  'name_not_found',
  'address_not_allowed',
  'no_connection',
  'no_answer_in_time',
] as const;
export type AttemptOutcome = (typeof attemptOutcomes)[number];

export interface Attempt {
  readonly at: string;
  readonly outcome: AttemptOutcome;
  /** HTTP status, if there was an answer. */
  readonly status: number | null;
}

/** How far the sending to a webhook has come. */
export interface WebhookProgress {
  /** False: by its club, or after too many failures. */
  readonly active: boolean;
  /** The last event that was sent or passed over. */
  readonly sentSeq: number;
  /** Of the event that is being sent, one after another. */
  readonly failures: number;
  /** Null: as soon as there is something to send. */
  readonly nextAttemptAt: string | null;
  readonly lastAttempt: Attempt | null;
}

export interface WebhookRecord {
  readonly id: string;
  readonly clubId: string;
  readonly revision: number;
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly facts: WebhookFacts;
  readonly progress: WebhookProgress;
}

/** The part of the Store port that is about webhooks. */
export interface WebhookStore {
  /** Begins with what happens from here on. */
  add(
    actor: Actor,
    fresh: { readonly id: string; readonly facts: WebhookFacts; readonly secret: string },
  ): Promise<WebhookRecord>;
  find(clubId: string, id: string): Promise<WebhookRecord | null>;
  /** In the order in which they were added. */
  list(clubId: string, page: PageRequest): Promise<Page<WebhookRecord>>;
  /**
   * Throws `stale`. One that is switched on again begins with what happens from here on, and its
   * failures are forgotten.
   */
  edit(
    actor: Actor,
    id: string,
    revision: number,
    next: { readonly facts: WebhookFacts; readonly active: boolean },
  ): Promise<WebhookRecord>;
  remove(actor: Actor, id: string): Promise<void>;

  /** The active ones of all clubs with their secrets, for sending. */
  listActive(): Promise<readonly (WebhookRecord & { readonly secret: string })[]>;
  /** Keeps how far the sending has come, unless the webhook was switched off or removed meanwhile. */
  noteProgress(clubId: string, id: string, progress: WebhookProgress): Promise<void>;
}

import type { Actor, Page, PageRequest } from './port.ts';

/** What the instruments of a round measure. */
export type RoundObject =
  | { readonly antennaId: string }
  /** A known load, ohm; 0 is a short, null an open. */
  | { readonly loadOhm: number | null };

/** A round as it was planned. */
export interface RoundFacts {
  readonly name: string;
  readonly measures: RoundObject;
  readonly analyzerIds: readonly string[];
  /** RFC 3339 UTC; before this one. */
  readonly endsAt: string;
  readonly note: string;
}

/** A planned round, kept for good. */
export interface RoundRecord {
  readonly id: string;
  readonly clubId: string;
  readonly addedAt: string;
  readonly addedBy: string;
  /** RFC 3339 UTC. */
  readonly beginsAt: string;
  readonly facts: RoundFacts;
}

export type FreshRound = Pick<RoundRecord, 'id' | 'beginsAt' | 'facts'>;

/** The part of the store that keeps rounds. */
export interface RoundStore {
  addRound(actor: Actor, fresh: FreshRound): Promise<RoundRecord>;
  findRound(clubId: string, id: string): Promise<RoundRecord | null>;
  /** Newest first by (beginsAt, id). */
  listRounds(clubId: string, page: PageRequest): Promise<Page<RoundRecord>>;
}

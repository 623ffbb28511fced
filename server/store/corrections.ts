import type { Actor, SweepFacts, SweepRecord } from './port.ts';

/** What was told of a sweep at one time, and why it was told anew. */
export interface SweepRevision {
  readonly revision: number;
  readonly at: string;
  readonly memberId: string;
  /** Empty for what was told with the upload. */
  readonly reason: string;
  readonly facts: SweepFacts;
}

/** The part of the store that keeps what was told of sweeps, and every correction of it. */
export interface CorrectionStore {
  /** Adds a revision made from that revision. Throws `stale` if another came between. */
  correct(
    actor: Actor,
    sweepId: string,
    revision: number,
    corrected: { readonly facts: SweepFacts; readonly reason: string },
  ): Promise<SweepRecord>;
  /** All of a sweep, oldest first. */
  list(clubId: string, sweepId: string): Promise<readonly SweepRevision[]>;
  /** The sweep as it was told at that time; null if it was not there yet. */
  findAsOf(clubId: string, sweepId: string, at: string): Promise<SweepRecord | null>;
}

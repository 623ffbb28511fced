import type { Weather } from '../../core/record/conditions.ts';
import type { SweepMeasures } from '../../core/record/measures.ts';
import type { WorkKind } from '../../core/record/work.ts';
import type { Actor, Page, PageRequest, SweepRecord } from './port.ts';

/** What a sweep measured, and on what basis (see `measuresBasis`). */
export interface StoredMeasures {
  readonly basis: string;
  readonly measures: SweepMeasures;
}

/** Which sweeps of an antenna are asked for; what is left out limits nothing. */
export interface HistoryFilter {
  readonly band?: string;
  /** Null: those of which nobody said. */
  readonly analyzerId?: string | null;
  /** Null: those of which nobody said. */
  readonly weather?: Weather | null;
  /** RFC 3339 UTC: not before. */
  readonly from?: string;
  /** RFC 3339 UTC: before. */
  readonly until?: string;
}

export type HistoryOrder = 'newest_first' | 'oldest_first';

/** One sweep of a history; without measures where they are still to be made. */
export interface HistoryEntry {
  readonly record: SweepRecord;
  readonly stored: StoredMeasures | null;
}

/** What is told of work on an antenna. */
export interface WorkFacts {
  readonly kind: WorkKind;
  /** Of the whole element, metres, positive for longer; null: not told, or another kind of work. */
  readonly lengthChangeM: number | null;
  /** Who did it, as the club names them; null if nobody said. */
  readonly doneBy: string | null;
  readonly note: string;
  readonly invented: boolean;
}

/** Work on an antenna, kept for good. */
export interface WorkRecord {
  readonly id: string;
  readonly clubId: string;
  readonly antennaId: string;
  readonly doneAt: string;
  readonly addedAt: string;
  readonly addedBy: string;
  /** When it was taken back as told wrong; null if it holds. */
  readonly withdrawnAt: string | null;
  /** Why it was taken back; null if it holds. */
  readonly withdrawnFor: string | null;
  readonly facts: WorkFacts;
}

export interface FreshWork {
  readonly id: string;
  readonly antennaId: string;
  readonly doneAt: string;
  readonly facts: WorkFacts;
}

/** The newest good sweep of an antenna in one of its design bands; band null: the newest of all. */
export interface Standing {
  readonly antennaId: string;
  readonly band: string | null;
  readonly entry: HistoryEntry;
}

/** Which sweeps a member chose as the baseline of an era. */
export interface ChosenBaseline {
  /** Id of the work that began the era; empty for the first. */
  readonly era: string;
  /** None: automatic again. */
  readonly sweepIds: readonly string[];
}

/** The part of the store that keeps what happened to antennas over time. */
export interface HistoryStore {
  /** By (measuredAt or receivedAt, id). */
  listHistory(
    clubId: string,
    antennaId: string,
    filter: HistoryFilter,
    page: PageRequest,
    order?: HistoryOrder,
  ): Promise<Page<HistoryEntry>>;
  /** How every antenna of a club stands; what has no such sweep is left out. */
  listStandings(clubId: string): Promise<readonly Standing[]>;
  /** Keeps what a sweep measured in place of what was kept before. */
  keepMeasures(clubId: string, sweepId: string, stored: StoredMeasures): Promise<void>;
  /** Sweeps of any club whose measures are still to be made. */
  listUnmeasured(limit: number): Promise<readonly SweepRecord[]>;

  addWork(actor: Actor, fresh: FreshWork): Promise<WorkRecord>;
  findWork(clubId: string, id: string): Promise<WorkRecord | null>;
  /** Takes work back that was told wrong; the first withdrawal holds. */
  withdrawWork(actor: Actor, id: string, reason: string): Promise<WorkRecord>;
  /** Newest first by (doneAt, id), withdrawn work among it. */
  listWork(clubId: string, antennaId: string, page: PageRequest): Promise<Page<WorkRecord>>;
  /** Takes the place of what was chosen for the era before. */
  chooseBaseline(actor: Actor, antennaId: string, chosen: ChosenBaseline): Promise<void>;
  /** What holds for each era for which anything was ever chosen. */
  chosenBaselines(clubId: string, antennaId: string): Promise<readonly ChosenBaseline[]>;

  /** How often the club tests antennas that have no interval of their own; null: not at all. */
  setTestInterval(actor: Actor, days: number | null): Promise<void>;
  /** Undefined if the club never said. */
  testInterval(clubId: string): Promise<number | null | undefined>;

  /** All work on an antenna that holds, oldest first. */
  allWork(clubId: string, antennaId: string): Promise<readonly WorkRecord[]>;
}

import type { EditableKind } from './port.ts';

/** What happens to people, their tokens and webhooks is written down, but told to no listener. */
type InnerEventKind =
  | 'member_added'
  | 'member_edited'
  | 'member_erased'
  | 'token_added'
  | 'token_revoked'
  | 'webhook_added'
  | 'webhook_edited'
  | 'webhook_removed';

/** What listeners are told of. A new kind is a new line here and one in `eventPaths`. */
export const toldEventKinds = [
  'club_added',
  'club_edited',
  'sites_added',
  'sites_edited',
  'antennas_added',
  'antennas_edited',
  'analyzers_added',
  'analyzers_edited',
  'cable_added',
  'load_check_added',
  'line_check_added',
  'sweep_added',
  'sweep_corrected',
  'work_added',
  'work_withdrawn',
  'baseline_chosen',
  'test_interval_set',
  'test_overdue',
  'round_added',
] as const;
export type ToldEventKind = (typeof toldEventKinds)[number];
export type EventKind = ToldEventKind | InnerEventKind;

/** What an event concerns beside its subject. */
export interface EventDetails {
  readonly antennaId?: string;
  readonly analyzerId?: string;
}

/** Something that happened, written in the same act as the change itself. */
export interface LedgerEvent {
  /** Ascending in the order of the writes, over all clubs. */
  readonly seq: number;
  readonly clubId: string;
  readonly kind: EventKind;
  readonly subjectId: string;
  readonly at: string;
  /** Empty: the service itself. */
  readonly memberId: string;
  readonly details: EventDetails;
}

const told: ReadonlySet<string> = new Set(toldEventKinds);

/** Whether listeners are told of the event. */
export function isTold(event: LedgerEvent): event is ToldEvent {
  return told.has(event.kind);
}

export interface ToldEvent extends LedgerEvent {
  readonly kind: ToldEventKind;
}

/** The kind of event that adding or editing a resource is. */
export function editableEvent(kind: EditableKind, act: 'added' | 'edited'): EventKind {
  return `${kind}_${act}`;
}

/** The part of the store that tells what happened, in order. */
export interface EventStore {
  /** The number of the newest event, of one club or of all; 0 if there is none. */
  newestSeq(clubId?: string): Promise<number>;
  /** The club's events after that number, oldest first. */
  listEvents(clubId: string, afterSeq: number, limit: number): Promise<LedgerEvent[]>;
  /** Tells once that the test of an antenna that was due then is overdue. */
  noteOverdue(clubId: string, antennaId: string, dueAt: string, at: string): Promise<void>;
  /** Calls back after each write of this process; returns what ends that. */
  onWrite(listener: () => void): () => void;
}

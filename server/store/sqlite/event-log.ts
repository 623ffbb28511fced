import type { EventDetails, EventKind, LedgerEvent } from '../events.ts';
import { auditLog } from './audit-log.ts';
import type { Connection } from './connection.ts';

/** Writes that something happened, and into the audit trail, within the act that calls it. */
export interface EventLog {
  run(
    clubId: string,
    kind: EventKind,
    subjectId: string,
    at: string,
    memberId: string,
    details?: EventDetails,
  ): void;
}

/** Prepares the log on the writer's connection. */
export function eventLog(connection: Connection): EventLog {
  const insert = connection.prepare(
    'INSERT INTO event (club_id, kind, subject_id, at, member_id, details) VALUES (?, ?, ?, ?, ?, ?)',
  );
  const audit = auditLog(connection);
  return {
    run(clubId, kind, subjectId, at, memberId, details = {}) {
      insert.run(clubId, kind, subjectId, at, memberId, JSON.stringify(details));
      audit({ clubId, at, memberId, act: kind, subjectId, outcome: 'done' });
    },
  };
}

type EventRow = Omit<LedgerEvent, 'details'> & { readonly details: string };

const eventColumns =
  'seq, club_id AS clubId, kind, subject_id AS subjectId, at, member_id AS memberId, details FROM event';

/** The lists of events; a test holds each against its query plan. */
export const eventListQueries = {
  events: `SELECT ${eventColumns} WHERE club_id = @clubId AND seq > @seq ORDER BY seq LIMIT @limit`,
} as const;

/** What is asked about events. */
export class EventQueries {
  private readonly prepared;

  constructor(connection: Connection) {
    this.prepared = {
      newest: connection.prepare<[], number>('SELECT max(seq) FROM event').pluck(),
      newestOfClub: connection
        .prepare<[string], number>('SELECT max(seq) FROM event WHERE club_id = ?')
        .pluck(),
      list: connection.prepare<unknown[], EventRow>(eventListQueries.events),
    };
  }

  newestSeq(clubId?: string): number {
    const { newest, newestOfClub } = this.prepared;
    return (clubId === undefined ? newest.get() : newestOfClub.get(clubId)) ?? 0;
  }

  list(clubId: string, seq: number, limit: number): LedgerEvent[] {
    const rows = this.prepared.list.all({ clubId, seq, limit });
    return rows.map((row) => ({ ...row, details: JSON.parse(row.details) }));
  }
}

import { type Actor, type PageRequest, StoreError } from '../port.ts';
import type { FreshRound, RoundRecord } from '../round-store.ts';
import type { Connection } from './connection.ts';
import { eventLog } from './event-log.ts';

export interface RoundRow extends Omit<RoundRecord, 'facts'> {
  readonly facts: string;
}

const roundColumns = `club_id AS clubId, id, added_at AS addedAt, added_by AS addedBy,
  begins_at AS beginsAt, facts FROM round`;

/** The list; a test holds it against its query plan. */
export const roundListQueries = {
  rounds: `SELECT ${roundColumns} WHERE club_id = @clubId AND (begins_at, id) < (@beginsAt, @id)
    ORDER BY begins_at DESC, id DESC LIMIT @limit`,
} as const;

/** A row as the record that callers know. */
export function toRoundRecord(row: RoundRow): RoundRecord {
  return { ...row, facts: JSON.parse(row.facts) as RoundRecord['facts'] };
}

/** What the writer does for rounds. */
export interface RoundActs {
  addRound(actor: Actor, fresh: FreshRound): RoundRow;
}

/** Prepares the acts on the writer's connection. */
export function roundActs(connection: Connection): RoundActs {
  const insert = connection.prepare(
    'INSERT INTO round (club_id, id, added_at, added_by, begins_at, facts) VALUES (?, ?, ?, ?, ?, ?)',
  );
  const select = connection.prepare<unknown[], RoundRow>(
    `SELECT ${roundColumns} WHERE club_id = ? AND id = ?`,
  );
  const insertEvent = eventLog(connection);
  return {
    addRound({ clubId, memberId, at }, { id, beginsAt, facts }) {
      insert.run(clubId, id, at, memberId, beginsAt, JSON.stringify(facts));
      const { measures } = facts;
      const details = 'antennaId' in measures ? { antennaId: measures.antennaId } : {};
      insertEvent.run(clubId, 'round_added', id, at, memberId, details);
      const row = select.get(clubId, id);
      if (row === undefined) throw new StoreError('unavailable', 'The round was not kept.');
      return row;
    },
  };
}

/** The questions about rounds, prepared once on a connection that only reads. */
export class RoundQueries {
  private readonly prepared;

  constructor(connection: Connection) {
    this.prepared = {
      round: connection.prepare<unknown[], RoundRow>(
        `SELECT ${roundColumns} WHERE club_id = ? AND id = ?`,
      ),
      rounds: connection.prepare<unknown[], RoundRow>(roundListQueries.rounds),
    };
  }

  round(clubId: string, id: string): RoundRow | null {
    return this.prepared.round.get(clubId, id) ?? null;
  }

  /** One row more than the page holds, if there is one. */
  rounds(clubId: string, { limit, after }: PageRequest): RoundRow[] {
    const [beginsAt, id] = after ?? ['~', ''];
    return this.prepared.rounds.all({ clubId, beginsAt, id, limit: limit + 1 });
  }
}

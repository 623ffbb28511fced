import { type Actor, StoreError, type SweepFacts } from '../port.ts';
import type { Connection } from './connection.ts';
import type { EventLog } from './event-log.ts';
import { type SweepRow, sweepColumns } from './rows.ts';

/** What the writer does to correct what was told of a sweep. */
export interface CorrectionActs {
  correctSweep(
    actor: Actor,
    sweepId: string,
    revision: number,
    facts: SweepFacts,
    reason: string,
  ): SweepRow;
}

/** Prepares the act; `place` puts the sweep where its facts, as they are now, have it in histories. */
export function correctionActs(
  connection: Connection,
  insertEvent: EventLog,
  place: (sweep: SweepRow, facts: SweepFacts) => void,
): CorrectionActs {
  const select = connection.prepare<unknown[], SweepRow>(
    `SELECT ${sweepColumns} WHERE sweep.club_id = ? AND sweep.id = ?`,
  );
  const insert = connection.prepare(
    `INSERT INTO sweep_facts (club_id, sweep_id, revision, facts, at, member_id, reason)
     VALUES (@clubId, @sweepId, @next, @facts, @at, @memberId, @reason)`,
  );
  const update = connection.prepare(
    `UPDATE sweep_current SET revision = @next, antenna_id = @antennaId, sort_at = @sortAt
     WHERE club_id = @clubId AND sweep_id = @sweepId AND revision = @revision`,
  );
  return {
    correctSweep(actor, sweepId, revision, facts, reason) {
      const { clubId, at, memberId } = actor;
      const before = select.get(clubId, sweepId);
      if (before?.revision !== revision) {
        throw new StoreError('stale', `Revision ${revision} of ${sweepId} is not the present one.`);
      }
      const { antennaId } = facts;
      const sortAt = facts.measuredAt ?? before.receivedAt;
      const next = revision + 1;
      insert.run({ ...actor, sweepId, next, reason, facts: JSON.stringify(facts) });
      update.run({ clubId, sweepId, revision, next, antennaId, sortAt });
      place({ ...before, sortAt }, facts);
      insertEvent.run(clubId, 'sweep_corrected', sweepId, at, memberId, { antennaId });
      const row = select.get(clubId, sweepId);
      if (row === undefined) throw new StoreError('unavailable', 'The correction was not kept.');
      return row;
    },
  };
}

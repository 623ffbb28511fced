import type { ChosenBaseline, FreshWork, StoredMeasures } from '../history-store.ts';
import { type Actor, StoreError, type SweepFacts, type SweepRecord } from '../port.ts';
import type { Connection } from './connection.ts';
import { eventLog } from './event-log.ts';
import { type SweepRow, type WorkRow, workColumns } from './rows.ts';

/** What the writer does for histories, each within the act that calls it. */
export interface HistoryActs {
  /** Takes a new sweep into its antenna's history. */
  enter(record: SweepRecord, stored: StoredMeasures): void;
  /** Puts a sweep where its corrected facts have it: into one antenna's history, or into none. */
  place(sweep: SweepRow, facts: SweepFacts): void;
  keepMeasures(clubId: string, sweepId: string, stored: StoredMeasures): null;
  addWork(actor: Actor, fresh: FreshWork): WorkRow;
  withdrawWork(actor: Actor, id: string, reason: string): WorkRow;
  chooseBaseline(actor: Actor, antennaId: string, chosen: ChosenBaseline): null;
  setTestInterval(actor: Actor, days: number | null): null;
}

interface Place {
  readonly antennaId: string;
  readonly sortAt: string;
  readonly analyzerId: string;
  readonly weather: string;
}

/** Prepares the acts on the writer's connection. */
export function historyActs(connection: Connection): HistoryActs {
  const insertMeasures = connection.prepare(
    `INSERT INTO sweep_measures (club_id, sweep_id, basis, measures) VALUES (?, ?, ?, ?)
     ON CONFLICT DO UPDATE SET basis = excluded.basis, measures = excluded.measures`,
  );
  const insertRow = connection.prepare(
    `INSERT INTO history (club_id, sweep_id, band, antenna_id, sort_at, analyzer_id, weather)
     VALUES (@clubId, @sweepId, @band, @antennaId, @sortAt, @analyzerId, @weather)`,
  );
  const selectPlace = connection.prepare<unknown[], Place>(
    `SELECT antenna_id AS antennaId, sort_at AS sortAt, analyzer_id AS analyzerId, weather
     FROM history WHERE club_id = ? AND sweep_id = ? AND band = ''`,
  );
  const deleteBands = connection.prepare(
    `DELETE FROM history WHERE club_id = ? AND sweep_id = ? AND band <> ''`,
  );
  const deleteRows = connection.prepare('DELETE FROM history WHERE club_id = ? AND sweep_id = ?');
  const selectBands = connection
    .prepare<unknown[], string>(
      `SELECT part.value ->> '$.band' FROM sweep_measures, json_each(measures, '$.bands') AS part
       WHERE club_id = ? AND sweep_id = ?`,
    )
    .pluck();
  const deleteUnmeasured = connection.prepare(
    'DELETE FROM unmeasured WHERE club_id = ? AND sweep_id = ?',
  );
  const insertWork = connection.prepare<unknown[], WorkRow>(
    'INSERT INTO work_entry (club_id, id, antenna_id, done_at, added_at, added_by, facts) VALUES (?, ?, ?, ?, ?, ?, ?)',
  );
  const selectWork = connection.prepare<unknown[], WorkRow>(
    `SELECT ${workColumns} WHERE work_entry.club_id = ? AND id = ?`,
  );
  const insertWithdrawal = connection.prepare(
    `INSERT INTO work_withdrawal (club_id, work_id, reason, at, member_id) VALUES (?, ?, ?, ?, ?)
     ON CONFLICT DO NOTHING`,
  );
  const insertBaseline = connection.prepare(
    'INSERT INTO baseline (club_id, antenna_id, era, sweeps, at, member_id) VALUES (?, ?, ?, ?, ?, ?)',
  );
  const insertInterval = connection.prepare(
    'INSERT INTO test_interval (club_id, days, at, member_id) VALUES (?, ?, ?, ?)',
  );
  const insertEvent = eventLog(connection);

  const insertRows = (
    clubId: string,
    sweepId: string,
    place: Place,
    bands: readonly string[],
  ): void => {
    for (const band of bands) insertRow.run({ clubId, sweepId, band, ...place });
  };

  return {
    enter(record, { basis, measures }) {
      const { clubId, id } = record;
      const bands = measures.bands.map(({ band }) => band);
      insertMeasures.run(clubId, id, basis, JSON.stringify(measures));
      insertRows(clubId, id, placeOf(record), ['', ...bands]);
    },
    place({ clubId, id, sortAt }, facts) {
      deleteRows.run(clubId, id);
      const isRejected = (facts.rejectedBecause ?? null) !== null;
      if (isRejected) return;
      insertRows(clubId, id, placeAt(facts, sortAt), ['', ...selectBands.all(clubId, id)]);
    },
    keepMeasures(clubId, sweepId, { basis, measures }) {
      const place = selectPlace.get(clubId, sweepId);
      // It was rejected meanwhile: the measures are kept, for it may come back.
      if (place === undefined) {
        insertMeasures.run(clubId, sweepId, basis, JSON.stringify(measures));
        deleteUnmeasured.run(clubId, sweepId);
        return null;
      }
      const bands = measures.bands.map(({ band }) => band);
      insertMeasures.run(clubId, sweepId, basis, JSON.stringify(measures));
      deleteBands.run(clubId, sweepId);
      insertRows(clubId, sweepId, place, bands);
      deleteUnmeasured.run(clubId, sweepId);
      return null;
    },
    withdrawWork({ clubId, memberId, at }, id, reason) {
      const { changes } = insertWithdrawal.run(clubId, id, reason, at, memberId);
      const row = selectWork.get(clubId, id);
      if (row === undefined) throw new StoreError('unavailable', `There is no work ${id}.`);
      const { antennaId } = row;
      if (changes > 0) insertEvent.run(clubId, 'work_withdrawn', id, at, memberId, { antennaId });
      return row;
    },
    chooseBaseline({ clubId, memberId, at }, antennaId, { era, sweepIds }) {
      insertBaseline.run(clubId, antennaId, era, JSON.stringify(sweepIds), at, memberId);
      insertEvent.run(clubId, 'baseline_chosen', antennaId, at, memberId, { antennaId });
      return null;
    },
    setTestInterval({ clubId, memberId, at }, days) {
      insertInterval.run(clubId, days, at, memberId);
      insertEvent.run(clubId, 'test_interval_set', clubId, at, memberId);
      return null;
    },
    addWork({ clubId, memberId, at }, { id, antennaId, doneAt, facts }) {
      insertWork.run(clubId, id, antennaId, doneAt, at, memberId, JSON.stringify(facts));
      insertEvent.run(clubId, 'work_added', id, at, memberId, { antennaId });
      const row = selectWork.get(clubId, id);
      if (row === undefined) throw new StoreError('unavailable', 'The work was not kept.');
      return row;
    },
  };
}

function placeOf({ facts, receivedAt }: SweepRecord): Place {
  return placeAt(facts, facts.measuredAt ?? receivedAt);
}

function placeAt(facts: SweepFacts, sortAt: string): Place {
  return {
    antennaId: facts.antennaId,
    sortAt,
    analyzerId: facts.analyzerId ?? '',
    weather: facts.weather ?? '',
  };
}

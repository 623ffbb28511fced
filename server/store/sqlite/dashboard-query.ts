import type { Connection } from './connection.ts';
import type { HistoryEntryRow } from './history-queries.ts';
import { sweepFields, sweepTables } from './rows.ts';

export interface StandingRow extends HistoryEntryRow {
  readonly antennaId: string;
  /** Empty: of the antenna as a whole. */
  readonly band: string;
}

/** So many sweeps are looked at for a good one; where none of them is, the band has none. */
const lookedBack = 8;

/** Flags of quality with which a sweep does not tell how the antenna is. */
const spoiling = ['passivity_broken', 'looks_open_or_short', 'values_clipped'];

const newest = `SELECT sweep_id, sort_at FROM history
  WHERE club_id = antenna.club_id AND antenna_id = antenna.id AND band = wanted.value
  ORDER BY sort_at DESC, sweep_id DESC`;

const isGood = `EXISTS (
  SELECT 1 FROM json_each(judged.measures, '$.bands') AS part
  WHERE part.value ->> '$.band' = wanted.value AND part.value ->> '$.sweptFraction' > 0
    AND NOT EXISTS (SELECT 1 FROM json_each(part.value, '$.flags') AS flag
      WHERE flag.value IN (${spoiling.map((code) => `'${code}'`).join(', ')})))`;

/**
 * How every antenna of a club stands: for each design band the newest good sweep, and without a band
 * the newest of all. Each is found from the index by a walk of bounded length, so that the time does
 * not grow with the sweeps; a test holds that against the query plan.
 */
export const standingsQuery = `SELECT antenna.id AS antennaId, wanted.value AS band, ${sweepFields},
    kept.basis AS basis, kept.measures AS measures
  FROM resource AS antenna
  CROSS JOIN json_each(json_insert(antenna.facts -> '$.designBands', '$[#]', '')) AS wanted
  CROSS JOIN sweep_current ON sweep_current.club_id = antenna.club_id
    AND sweep_current.sweep_id = CASE wanted.value
      WHEN '' THEN (SELECT sweep_id FROM (${newest} LIMIT 1))
      ELSE (SELECT recent.sweep_id FROM (${newest} LIMIT ${lookedBack}) AS recent
        CROSS JOIN sweep_measures AS judged ON judged.club_id = antenna.club_id
          AND judged.sweep_id = recent.sweep_id
        WHERE ${isGood} LIMIT 1) END
  ${sweepTables}
  LEFT JOIN sweep_measures AS kept ON kept.club_id = sweep_current.club_id
    AND kept.sweep_id = sweep_current.sweep_id
  WHERE antenna.club_id = @clubId AND antenna.kind = 'antennas'`;

/** Prepares the question how every antenna of a club stands. */
export function prepareStandings(connection: Connection): (clubId: string) => StandingRow[] {
  const statement = connection.prepare<unknown[], StandingRow>(standingsQuery);
  return (clubId) => statement.all({ clubId });
}

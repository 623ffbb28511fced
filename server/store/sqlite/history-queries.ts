import type { HistoryFilter, HistoryOrder } from '../history-store.ts';
import type { PageRequest } from '../port.ts';
import type { Connection } from './connection.ts';
import { prepareStandings, type StandingRow } from './dashboard-query.ts';
import { type SweepRow, sweepFields, sweepTables, type WorkRow, workColumns } from './rows.ts';

export interface HistoryEntryRow extends SweepRow {
  readonly basis: string | null;
  readonly measures: string | null;
}

export interface BaselineRow {
  readonly era: string;
  readonly sweeps: string;
}

/** The history table leads, so that a page costs the same however long the history is. */
const historyEntries = `SELECT ${sweepFields}, basis, measures FROM history
  CROSS JOIN sweep_current ON sweep_current.club_id = history.club_id
    AND sweep_current.sweep_id = history.sweep_id
  ${sweepTables}
  LEFT JOIN sweep_measures ON sweep_measures.club_id = history.club_id
    AND sweep_measures.sweep_id = history.sweep_id
  WHERE history.club_id = @clubId AND history.antenna_id = @antennaId AND history.band = @band`;
const ofAnalyzer = 'AND history.analyzer_id = @analyzerId';
const ofWeather = 'AND history.weather = @weather';
const newestFirst = `AND history.sort_at >= @from AND (history.sort_at, history.sweep_id) < (@sortAt, @id)
  ORDER BY history.sort_at DESC, history.sweep_id DESC LIMIT @limit`;
const oldestFirst = `AND history.sort_at < @until AND (history.sort_at, history.sweep_id) > (@sortAt, @id)
  ORDER BY history.sort_at, history.sweep_id LIMIT @limit`;

/** The lists; a test holds each against its query plan. */
export const historyListQueries = {
  historyNewest: `${historyEntries} ${newestFirst}`,
  historyNewestOfAnalyzer: `${historyEntries} ${ofAnalyzer} ${newestFirst}`,
  historyNewestOfWeather: `${historyEntries} ${ofWeather} ${newestFirst}`,
  historyNewestOfBoth: `${historyEntries} ${ofAnalyzer} ${ofWeather} ${newestFirst}`,
  historyOldest: `${historyEntries} ${oldestFirst}`,
  historyOldestOfAnalyzer: `${historyEntries} ${ofAnalyzer} ${oldestFirst}`,
  historyOldestOfWeather: `${historyEntries} ${ofWeather} ${oldestFirst}`,
  historyOldestOfBoth: `${historyEntries} ${ofAnalyzer} ${ofWeather} ${oldestFirst}`,
  work: `SELECT ${workColumns} WHERE work_entry.club_id = @clubId AND antenna_id = @antennaId
    AND (done_at, id) < (@doneAt, @id) ORDER BY done_at DESC, id DESC LIMIT @limit`,
  allWork: `SELECT ${workColumns} WHERE work_entry.club_id = @clubId AND antenna_id = @antennaId
    AND withdrawal.at IS NULL ORDER BY done_at, id`,
  baselines: `SELECT era, sweeps FROM baseline
    WHERE club_id = @clubId AND antenna_id = @antennaId ORDER BY seq`,
  testInterval: `SELECT days FROM test_interval WHERE club_id = @clubId ORDER BY seq DESC LIMIT 1`,
} as const;

/** Before any time and after any. */
const earliest = '';
const latest = '~';

/** The questions about histories, prepared once on a connection that only reads. */
export class HistoryQueries {
  /** How every antenna of a club stands. */
  readonly standings: (clubId: string) => StandingRow[];
  private readonly prepared;

  constructor(connection: Connection) {
    this.standings = prepareStandings(connection);
    this.prepared = prepareAll(connection);
  }

  /** One row more than the page holds, if there is one. */
  entries(
    clubId: string,
    antennaId: string,
    filter: HistoryFilter,
    { limit, after }: PageRequest,
    order: HistoryOrder,
  ): HistoryEntryRow[] {
    const { band = '', analyzerId, weather, from = earliest, until = latest } = filter;
    const isNewest = order === 'newest_first';
    const [sortAt, id] = after ?? [isNewest ? until : from, ''];
    const statements = isNewest ? this.prepared.newest : this.prepared.oldest;
    const statement =
      statements[(analyzerId === undefined ? 0 : 1) + (weather === undefined ? 0 : 2)];
    return statement.all({
      clubId,
      antennaId,
      band,
      sortAt,
      id,
      limit: limit + 1,
      ...(isNewest ? { from } : { until }),
      ...(analyzerId === undefined ? {} : { analyzerId: analyzerId ?? '' }),
      ...(weather === undefined ? {} : { weather: weather ?? '' }),
    });
  }

  unmeasured(limit: number): SweepRow[] {
    return this.prepared.unmeasured.all(limit);
  }

  workById(clubId: string, id: string): WorkRow | null {
    return this.prepared.workById.get(clubId, id) ?? null;
  }

  /** One row more than the page holds, if there is one. */
  work(clubId: string, antennaId: string, { limit, after }: PageRequest): WorkRow[] {
    const [doneAt, id] = after ?? [latest, ''];
    return this.prepared.work.all({ clubId, antennaId, doneAt, id, limit: limit + 1 });
  }

  /** Everything that was ever chosen, oldest first. */
  baselines(clubId: string, antennaId: string): BaselineRow[] {
    return this.prepared.baselines.all({ clubId, antennaId });
  }

  testInterval(clubId: string): { readonly days: number | null } | undefined {
    return this.prepared.testInterval.get({ clubId });
  }

  allWork(clubId: string, antennaId: string): WorkRow[] {
    return this.prepared.allWork.all({ clubId, antennaId });
  }
}

function prepareAll(connection: Connection) {
  const prepare = <Row>(sql: string) => connection.prepare<unknown[], Row>(sql);
  const lists = historyListQueries;
  return {
    newest: [
      prepare<HistoryEntryRow>(lists.historyNewest),
      prepare<HistoryEntryRow>(lists.historyNewestOfAnalyzer),
      prepare<HistoryEntryRow>(lists.historyNewestOfWeather),
      prepare<HistoryEntryRow>(lists.historyNewestOfBoth),
    ],
    oldest: [
      prepare<HistoryEntryRow>(lists.historyOldest),
      prepare<HistoryEntryRow>(lists.historyOldestOfAnalyzer),
      prepare<HistoryEntryRow>(lists.historyOldestOfWeather),
      prepare<HistoryEntryRow>(lists.historyOldestOfBoth),
    ],
    unmeasured: prepare<SweepRow>(
      `SELECT ${sweepFields} FROM unmeasured
       CROSS JOIN sweep_current ON sweep_current.club_id = unmeasured.club_id
         AND sweep_current.sweep_id = unmeasured.sweep_id
       ${sweepTables} LIMIT ?`,
    ),
    workById: prepare<WorkRow>(`SELECT ${workColumns} WHERE work_entry.club_id = ? AND id = ?`),
    work: prepare<WorkRow>(lists.work),
    allWork: prepare<WorkRow>(lists.allWork),
    baselines: prepare<BaselineRow>(lists.baselines),
    testInterval: prepare<{ readonly days: number | null }>(lists.testInterval),
  };
}

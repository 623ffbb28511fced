import type { ChosenBaseline, HistoryEntry, WorkRecord } from '../history-store.ts';
import {
  type CableRecord,
  type Editable,
  type EditableKind,
  type EditableKinds,
  type LineCheckRecord,
  type LoadCheckRecord,
  StoreError,
  type SweepFacts,
  type SweepRecord,
} from '../port.ts';

export interface ResourceRow {
  readonly clubId: string;
  readonly id: string;
  readonly key: string;
  readonly revision: number;
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly facts: string;
}

/** Columns of a `ResourceRow`, for SELECT and RETURNING. */
export const resourceColumns =
  'club_id AS clubId, id, key, revision, created_at AS createdAt, updated_at AS updatedAt, facts';

export interface SweepRow {
  readonly clubId: string;
  readonly id: string;
  readonly receivedAt: string;
  readonly uploadedBy: string;
  readonly measured: string;
  readonly facts: string;
  readonly revision: number;
  readonly sortAt: string;
}

/** Columns of a `SweepRow` with the facts that hold. */
export const sweepFields = `sweep.club_id AS clubId, sweep.id AS id, received_at AS receivedAt,
  uploaded_by AS uploadedBy, measured, sweep_facts.facts AS facts,
  sweep_facts.revision AS revision, sweep_current.sort_at AS sortAt`;

/** The tables of these columns beside `sweep_current`. */
export const sweepTables = `JOIN sweep ON sweep.club_id = sweep_current.club_id AND sweep.id = sweep_current.sweep_id
  JOIN sweep_facts ON sweep_facts.club_id = sweep_current.club_id
    AND sweep_facts.sweep_id = sweep_current.sweep_id AND sweep_facts.revision = sweep_current.revision`;

/** Columns and tables of a `SweepRow`, for SELECT. */
export const sweepColumns = `${sweepFields} FROM sweep_current ${sweepTables}`;

export interface WorkRow {
  readonly clubId: string;
  readonly id: string;
  readonly antennaId: string;
  readonly doneAt: string;
  readonly addedAt: string;
  readonly addedBy: string;
  readonly withdrawnAt: string | null;
  readonly withdrawnFor: string | null;
  readonly facts: string;
}

/** Columns and table of a `WorkRow`, for SELECT. */
export const workColumns = `work_entry.club_id AS clubId, id, antenna_id AS antennaId, done_at AS doneAt,
  added_at AS addedAt, added_by AS addedBy, facts, withdrawal.at AS withdrawnAt,
  withdrawal.reason AS withdrawnFor FROM work_entry
  LEFT JOIN work_withdrawal AS withdrawal ON withdrawal.club_id = work_entry.club_id
    AND withdrawal.work_id = work_entry.id`;

/** A row as the record that callers know. */
export function toWorkRecord(row: WorkRow): WorkRecord {
  return { ...row, facts: parsed(row.facts) };
}

/** What holds by now of all that was chosen, given oldest first. */
export function toChosenBaselines(
  rows: readonly { readonly era: string; readonly sweeps: string }[],
): readonly ChosenBaseline[] {
  const newest = new Map(rows.map(({ era, sweeps }) => [era, sweeps]));
  return [...newest].map(([era, sweeps]) => ({ era, sweepIds: parsed(sweeps) }));
}

/** A row with what it has of measures. */
export function toHistoryEntry({
  basis,
  measures,
  ...row
}: SweepRow & { readonly basis: string | null; readonly measures: string | null }): HistoryEntry {
  const record = toSweepRecord(row);
  if (basis === null || measures === null) return { record, stored: null };
  return { record, stored: { basis, measures: parsed(measures) } };
}

/** A row as the record that callers know. */
export function toEditable<K extends EditableKind>(row: ResourceRow): Editable<EditableKinds[K]> {
  const { clubId, id, key, revision, createdAt, updatedAt } = row;
  const facts: EditableKinds[K] = parsed(row.facts);
  return { id, clubId, key, revision, createdAt, updatedAt, facts };
}

export interface LoadCheckRow {
  readonly clubId: string;
  readonly id: string;
  readonly receivedAt: string;
  readonly sortAt: string;
  readonly uploadedBy: string;
  readonly facts: string;
  readonly measured: string;
}

/** Columns and table of a `LoadCheckRow`, for SELECT. */
export const loadCheckColumns = `club_id AS clubId, id, received_at AS receivedAt, sort_at AS sortAt,
  uploaded_by AS uploadedBy, facts, measured FROM load_check`;

/** A row as the record that callers know. */
export function toLoadCheckRecord(row: LoadCheckRow): LoadCheckRecord {
  const { id, clubId, receivedAt, uploadedBy } = row;
  const facts: LoadCheckRecord['facts'] = parsed(row.facts);
  return { id, clubId, receivedAt, uploadedBy, facts, measured: parsed(row.measured) };
}

export interface CableRow {
  readonly clubId: string;
  readonly id: string;
  readonly key: string;
  readonly createdAt: string;
  readonly createdBy: string;
  readonly facts: string;
}

/** Columns and table of a `CableRow`, for SELECT. */
export const cableColumns =
  'club_id AS clubId, id, key, created_at AS createdAt, created_by AS createdBy, facts FROM cable';

/** A row as the record that callers know. */
export function toCableRecord(row: CableRow): CableRecord {
  return { ...row, facts: parsed(row.facts) };
}

export interface LineCheckRow {
  readonly clubId: string;
  readonly id: string;
  readonly receivedAt: string;
  readonly sortAt: string;
  readonly uploadedBy: string;
  readonly tested: string;
  readonly facts: string;
  readonly measured: string;
  readonly report: string;
}

/** Columns and table of a `LineCheckRow`, for SELECT. */
export const lineCheckColumns = `club_id AS clubId, id, received_at AS receivedAt, sort_at AS sortAt,
  uploaded_by AS uploadedBy, tested, facts, measured, report FROM line_check`;

/** A row as the record that callers know. */
export function toLineCheckRecord(row: LineCheckRow): LineCheckRecord {
  const { id, clubId, receivedAt, uploadedBy } = row;
  const facts: LineCheckRecord['facts'] = parsed(row.facts);
  const tested: LineCheckRecord['tested'] = parsed(row.tested);
  const measured: LineCheckRecord['measured'] = parsed(row.measured);
  const reportJson = row.report;
  return { id, clubId, receivedAt, uploadedBy, tested, facts, measured, reportJson };
}

/** A row as the record that callers know. */
export function toSweepRecord(row: SweepRow): SweepRecord {
  const { id, clubId, receivedAt, uploadedBy, revision } = row;
  return {
    id,
    clubId,
    receivedAt,
    uploadedBy,
    revision,
    facts: toSweepFacts(row.facts),
    measured: parsed(row.measured),
  };
}

/** What was told of a sweep. Throws `corrupt`. */
export function toSweepFacts(text: string): SweepFacts {
  return parsed(text);
}

function parsed<Kept>(text: string): Kept {
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new StoreError('corrupt', 'A stored record does not read as JSON.', undefined, error);
  }
}

import { editableEvent } from '../events.ts';
import type { ChosenBaseline, FreshWork, StoredMeasures } from '../history-store.ts';
import {
  type Actor,
  type CableFacts,
  type ClubRecord,
  type EditableKind,
  type LineCheckRecord,
  type LoadCheckRecord,
  StoreError,
  type SweepRecord,
  type TokenRecord,
} from '../port.ts';
import type { Packed } from './compression.ts';
import type { Connection } from './connection.ts';
import { type CorrectionActs, correctionActs } from './correction-acts.ts';
import { eventLog } from './event-log.ts';
import { historyActs } from './history-acts.ts';
import { type PeopleActs, peopleActs, type WriteEvent } from './people-acts.ts';
import { type RoundActs, roundActs } from './rounds.ts';
import {
  type CableRow,
  cableColumns,
  type LineCheckRow,
  type LoadCheckRow,
  lineCheckColumns,
  loadCheckColumns,
  type ResourceRow,
  resourceColumns,
  type SweepRow,
  sweepColumns,
  type WorkRow,
} from './rows.ts';
import { type WebhookActs, webhookActs } from './webhook-acts.ts';

/** A sweep packed for the writer. */
export interface PackedSweep {
  readonly record: SweepRecord;
  readonly file: Packed;
  readonly points: Uint8Array;
  readonly analysisVersion: string;
  /** Deflated texts. */
  readonly summary: Uint8Array;
  readonly usable: Uint8Array;
  readonly measures: StoredMeasures;
}

/** A sweep of a known load packed for the writer. */
export interface PackedLoadCheck {
  readonly record: LoadCheckRecord;
  readonly file: Packed;
  readonly points: Uint8Array;
}

/** A line check packed for the writer. */
export interface PackedLineCheck {
  readonly record: LineCheckRecord;
  readonly file: Packed;
  /** Deflated text. */
  readonly trace: Uint8Array;
}

export interface FreshCable {
  readonly actor: Actor;
  readonly id: string;
  readonly key: string;
  readonly facts: CableFacts;
}

export interface FreshResource {
  readonly kind: EditableKind;
  readonly actor: Actor;
  readonly id: string;
  readonly key: string;
  readonly siteId: string | null;
  readonly facts: string;
}

export interface EditedResource extends FreshResource {
  /** The revision that the edit was made from. */
  readonly revision: number;
}

/** What the writer does, each whole or not at all. Arguments and results pass between threads. */
export interface WriteActs extends PeopleActs, WebhookActs, RoundActs, CorrectionActs {
  addClub(club: ClubRecord, token: TokenRecord, secretSha256: Uint8Array): null;
  addResource(fresh: FreshResource): ResourceRow;
  editResource(edited: EditedResource): ResourceRow;
  addSweep(sweep: PackedSweep): { readonly outcome: 'added' | 'known'; readonly row: SweepRow };
  addLoadCheck(check: PackedLoadCheck): {
    readonly outcome: 'added' | 'known';
    readonly row: LoadCheckRow;
  };
  addCable(fresh: FreshCable): CableRow;
  addLineCheck(check: PackedLineCheck): {
    readonly outcome: 'added' | 'known';
    readonly row: LineCheckRow;
  };
  keepMeasures(clubId: string, sweepId: string, stored: StoredMeasures): null;
  addWork(actor: Actor, fresh: FreshWork): WorkRow;
  withdrawWork(actor: Actor, id: string, reason: string): WorkRow;
  chooseBaseline(actor: Actor, antennaId: string, chosen: ChosenBaseline): null;
  setTestInterval(actor: Actor, days: number | null): null;
  noteOverdue(clubId: string, antennaId: string, dueAt: string, at: string): null;
  /** Takes the lock that every write needs and gives it back: tells whether a write could begin. */
  takeLock(): null;
}

/** Prepares the acts on the writer's connection. */
export function writeActs(connection: Connection): WriteActs {
  const insertClub = connection.prepare(
    'INSERT INTO club (id, key, name, invented, created_at, updated_at) VALUES (?, ?, ?, ?, ?, ?)',
  );
  const insertFirstMember = connection.prepare(
    `INSERT INTO member (club_id, id, revision, role, active, pseudonym, shown_as, created_at, updated_at)
     VALUES (@clubId, @memberId, 1, 'steward', 1, 'Member 1', 'pseudonym', @createdAt, @createdAt)`,
  );
  const insertToken = connection.prepare(
    'INSERT INTO token (id, club_id, member_id, label, secret_sha256, created_at) VALUES (?, ?, ?, ?, ?, ?)',
  );
  const insertResource = connection.prepare<unknown[], ResourceRow>(
    `INSERT INTO resource (club_id, kind, id, key, site_id, revision, created_at, updated_at, facts)
     VALUES (@clubId, @kind, @id, @key, @siteId, 1, @at, @at, @facts) RETURNING ${resourceColumns}`,
  );
  const updateResource = connection.prepare<unknown[], ResourceRow>(
    `UPDATE resource SET key = @key, site_id = @siteId, revision = revision + 1, updated_at = @at, facts = @facts
     WHERE club_id = @clubId AND kind = @kind AND id = @id AND revision = @revision RETURNING ${resourceColumns}`,
  );
  const insertResourceRevision = connection.prepare(
    `INSERT INTO resource_revision (club_id, kind, id, revision, key, facts, at, member_id)
     VALUES (@clubId, @kind, @id, @revision, @key, @facts, @at, @memberId)`,
  );
  const insertFile = connection.prepare(
    'INSERT INTO file (club_id, sha256, bytes, codec, body) VALUES (?, ?, ?, ?, ?) ON CONFLICT DO NOTHING',
  );
  const insertSweep = connection.prepare(
    'INSERT INTO sweep (club_id, id, received_at, uploaded_by, file_sha256, measured, points) VALUES (?, ?, ?, ?, ?, ?, ?)',
  );
  const insertFacts = connection.prepare(
    'INSERT INTO sweep_facts (club_id, sweep_id, revision, facts, at, member_id) VALUES (?, ?, 1, ?, ?, ?)',
  );
  const insertCurrent = connection.prepare(
    'INSERT INTO sweep_current (club_id, sweep_id, revision, antenna_id, sort_at) VALUES (?, ?, 1, ?, ?)',
  );
  const insertSummary = connection.prepare(
    'INSERT INTO summary (club_id, sweep_id, analysis_version, summary, usable) VALUES (?, ?, ?, ?, ?)',
  );
  const insertEvent = eventLog(connection);
  const selectByFile = connection.prepare<unknown[], SweepRow>(
    `SELECT ${sweepColumns} WHERE sweep.club_id = ? AND sweep.file_sha256 = ?`,
  );

  const insertLoadCheck = connection.prepare(
    `INSERT INTO load_check (club_id, id, analyzer_id, received_at, sort_at, uploaded_by, file_sha256, facts, measured, points)
     VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`,
  );
  const selectLoadCheckByFile = connection.prepare<unknown[], LoadCheckRow>(
    `SELECT ${loadCheckColumns} WHERE club_id = ? AND file_sha256 = ?`,
  );

  const insertCable = connection.prepare(
    'INSERT INTO cable (club_id, id, key, created_at, created_by, facts) VALUES (?, ?, ?, ?, ?, ?)',
  );
  const selectCable = connection.prepare<unknown[], CableRow>(
    `SELECT ${cableColumns} WHERE club_id = ? AND id = ?`,
  );
  const insertLineCheck = connection.prepare(
    `INSERT INTO line_check (club_id, id, antenna_id, received_at, sort_at, uploaded_by, file_sha256, tested, facts, measured, report, trace)
     VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`,
  );
  const selectLineCheckByFile = connection.prepare<unknown[], LineCheckRow>(
    `SELECT ${lineCheckColumns}
     WHERE club_id = ? AND antenna_id = ? AND file_sha256 = ? AND tested = ?`,
  );

  const upsertOverdue = connection.prepare(
    `INSERT INTO overdue_told (club_id, antenna_id, due_at) VALUES (?, ?, ?)
     ON CONFLICT DO UPDATE SET due_at = excluded.due_at WHERE due_at <> excluded.due_at`,
  );

  const writeEvent: WriteEvent = ({ clubId, at, memberId }, kind, id) =>
    insertEvent.run(clubId, kind, id, at, memberId);
  const history = historyActs(connection);
  const rounds = roundActs(connection);
  const keepRevision = (kind: EditableKind, actor: Actor, row: ResourceRow) => {
    const { at, memberId } = actor;
    const { clubId, id, revision, key, facts } = row;
    insertResourceRevision.run({ clubId, kind, id, revision, key, facts, at, memberId });
  };

  return {
    ...peopleActs(connection, writeEvent),
    ...webhookActs(connection, writeEvent),
    ...correctionActs(connection, insertEvent, history.place),
    addClub(club, token, secretSha256) {
      const { id, key, name, invented, createdAt } = club;
      insertClub.run(id, key, name, invented ? 1 : 0, createdAt, createdAt);
      insertFirstMember.run({ clubId: id, memberId: token.memberId, createdAt });
      insertToken.run(token.id, id, token.memberId, token.label, secretSha256, token.createdAt);
      insertEvent.run(id, 'club_added', id, createdAt, token.memberId);
      return null;
    },
    addResource({ kind, actor, id, key, siteId, facts }) {
      const { clubId, at, memberId } = actor;
      const row = insertResource.get({ clubId, kind, id, key, siteId, at, facts });
      if (row === undefined) throw new StoreError('unavailable', 'The insert gave no row.');
      keepRevision(kind, actor, row);
      insertEvent.run(clubId, editableEvent(kind, 'added'), id, at, memberId);
      return row;
    },
    editResource({ kind, actor, id, key, siteId, facts, revision }) {
      const { clubId, at, memberId } = actor;
      const row = updateResource.get({ clubId, kind, id, key, siteId, at, facts, revision });
      if (row === undefined) {
        throw new StoreError('stale', `Revision ${revision} of ${id} is not the present one.`);
      }
      keepRevision(kind, actor, row);
      insertEvent.run(clubId, editableEvent(kind, 'edited'), id, at, memberId);
      return row;
    },
    addSweep({ record, file, points, analysisVersion, summary, usable, measures }) {
      const { id, clubId, receivedAt, uploadedBy, facts, measured } = record;
      const sha256 = Buffer.from(measured.fileSha256, 'hex');
      const known = selectByFile.get(clubId, sha256);
      if (known !== undefined) return { outcome: 'known', row: known };
      insertFile.run(clubId, sha256, measured.fileBytes, file.codec, file.body);
      insertSweep.run(clubId, id, receivedAt, uploadedBy, sha256, JSON.stringify(measured), points);
      insertFacts.run(clubId, id, JSON.stringify(facts), receivedAt, uploadedBy);
      insertCurrent.run(clubId, id, facts.antennaId, facts.measuredAt ?? receivedAt);
      insertSummary.run(clubId, id, analysisVersion, summary, usable);
      history.enter(record, measures);
      const { antennaId } = facts;
      insertEvent.run(clubId, 'sweep_added', id, receivedAt, uploadedBy, { antennaId });
      const row = selectByFile.get(clubId, sha256);
      if (row === undefined) throw new StoreError('unavailable', 'The sweep was not kept.');
      return { outcome: 'added', row };
    },
    addLoadCheck({ record, file, points }) {
      const { id, clubId, receivedAt, uploadedBy, facts, measured } = record;
      const sha256 = Buffer.from(measured.fileSha256, 'hex');
      const known = selectLoadCheckByFile.get(clubId, sha256);
      if (known !== undefined) return { outcome: 'known', row: known };
      insertFile.run(clubId, sha256, measured.fileBytes, file.codec, file.body);
      insertLoadCheck.run(
        clubId,
        id,
        facts.analyzerId,
        receivedAt,
        facts.measuredAt ?? receivedAt,
        uploadedBy,
        sha256,
        JSON.stringify(facts),
        JSON.stringify(measured),
        points,
      );
      const { analyzerId } = facts;
      insertEvent.run(clubId, 'load_check_added', id, receivedAt, uploadedBy, { analyzerId });
      const row = selectLoadCheckByFile.get(clubId, sha256);
      if (row === undefined) throw new StoreError('unavailable', 'The check was not kept.');
      return { outcome: 'added', row };
    },
    addCable({ actor, id, key, facts }) {
      const { clubId, at, memberId } = actor;
      insertCable.run(clubId, id, key, at, memberId, JSON.stringify(facts));
      insertEvent.run(clubId, 'cable_added', id, at, memberId);
      const row = selectCable.get(clubId, id);
      if (row === undefined) throw new StoreError('unavailable', 'The cable was not kept.');
      return row;
    },
    addLineCheck({ record, file, trace }) {
      const { id, clubId, receivedAt, uploadedBy, tested, facts, measured, reportJson } = record;
      const sha256 = Buffer.from(measured.fileSha256, 'hex');
      const line = JSON.stringify(tested);
      const known = selectLineCheckByFile.get(clubId, facts.antennaId, sha256, line);
      if (known !== undefined) return { outcome: 'known', row: known };
      insertFile.run(clubId, sha256, measured.fileBytes, file.codec, file.body);
      insertLineCheck.run(
        clubId,
        id,
        facts.antennaId,
        receivedAt,
        facts.measuredAt ?? receivedAt,
        uploadedBy,
        sha256,
        line,
        JSON.stringify(facts),
        JSON.stringify(measured),
        reportJson,
        trace,
      );
      const { antennaId } = facts;
      insertEvent.run(clubId, 'line_check_added', id, receivedAt, uploadedBy, { antennaId });
      const row = selectLineCheckByFile.get(clubId, facts.antennaId, sha256, line);
      if (row === undefined) throw new StoreError('unavailable', 'The check was not kept.');
      return { outcome: 'added', row };
    },
    keepMeasures: history.keepMeasures,
    addWork: history.addWork,
    withdrawWork: history.withdrawWork,
    chooseBaseline: history.chooseBaseline,
    setTestInterval: history.setTestInterval,
    addRound: rounds.addRound,
    noteOverdue(clubId, antennaId, dueAt, at) {
      const { changes } = upsertOverdue.run(clubId, antennaId, dueAt);
      if (changes > 0) insertEvent.run(clubId, 'test_overdue', antennaId, at, '', { antennaId });
      return null;
    },
    takeLock() {
      connection.exec('BEGIN IMMEDIATE; ROLLBACK');
      return null;
    },
  };
}

import type { ClubRecord, EditableKind, PageRequest } from '../port.ts';
import { AuditQueries, auditListQueries } from './audit-log.ts';
import type { Codec } from './compression.ts';
import type { Connection } from './connection.ts';
import { EventQueries, eventListQueries } from './event-log.ts';
import { HistoryQueries, historyListQueries } from './history-queries.ts';
import { PeopleReader } from './people-reader.ts';
import { RoundQueries, roundListQueries } from './rounds.ts';
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
} from './rows.ts';
import { CorrectionQueries } from './sqlite-corrections.ts';
import { WebhookQueries, webhookListQueries } from './sqlite-webhooks.ts';

export interface FileRow {
  readonly sha256: Buffer;
  readonly bytes: number;
  readonly codec: Codec;
  readonly body: Buffer;
}

export interface SummaryRow {
  readonly summary: Buffer;
  readonly usable: Buffer;
}

/** The clauses of the lists; a test holds each against its query plan. */
export const listQueries = {
  resources: `SELECT ${resourceColumns} FROM resource
    WHERE club_id = @clubId AND kind = @kind AND (key, id) > (@key, @id) ORDER BY key, id LIMIT @limit`,
  resourcesOfSite: `SELECT ${resourceColumns} FROM resource
    WHERE club_id = @clubId AND kind = @kind AND site_id = @siteId AND (key, id) > (@key, @id)
    ORDER BY key, id LIMIT @limit`,
  sweeps: `SELECT ${sweepColumns}
    WHERE sweep_current.club_id = @clubId AND antenna_id = @antennaId
      AND (sort_at, sweep_current.sweep_id) < (@sortAt, @id)
    ORDER BY sort_at DESC, sweep_current.sweep_id DESC LIMIT @limit`,
  loadChecks: `SELECT ${loadCheckColumns}
    WHERE club_id = @clubId AND analyzer_id = @analyzerId AND (sort_at, id) < (@sortAt, @id)
    ORDER BY sort_at DESC, id DESC LIMIT @limit`,
  cables: `SELECT ${cableColumns}
    WHERE club_id = @clubId AND key > @key ORDER BY key LIMIT @limit`,
  lineChecks: `SELECT ${lineCheckColumns}
    WHERE club_id = @clubId AND antenna_id = @antennaId AND (sort_at, id) < (@sortAt, @id)
    ORDER BY sort_at DESC, id DESC LIMIT @limit`,
  ...historyListQueries,
  ...auditListQueries,
  ...eventListQueries,
  ...webhookListQueries,
  ...roundListQueries,
} as const;

/** Later than any time, so that a first page begins at the newest. */
const afterAllTimes = '~';

/** Every question that is asked of the file, prepared once on a connection that only reads. */
export class Reader {
  readonly people: PeopleReader;
  readonly history: HistoryQueries;
  readonly events: EventQueries;
  readonly webhooks: WebhookQueries;
  readonly rounds: RoundQueries;
  readonly audit: AuditQueries;
  readonly corrections: CorrectionQueries;
  private readonly connection: Connection;
  private readonly prepared;

  constructor(connection: Connection) {
    this.connection = connection;
    this.people = new PeopleReader(connection);
    this.prepared = prepareAll(connection);
    this.history = new HistoryQueries(connection);
    this.events = new EventQueries(connection);
    this.corrections = new CorrectionQueries(connection);
    this.audit = new AuditQueries(connection);
    this.webhooks = new WebhookQueries(connection);
    this.rounds = new RoundQueries(connection);
  }

  clubs(): ClubRecord[] {
    return this.prepared.clubs.all().map((row) => ({ ...row, invented: row.invented === 1 }));
  }

  resource(kind: EditableKind, clubId: string, idOrKey: string): ResourceRow | null {
    const { resourceById, resourceByKey } = this.prepared;
    const found = resourceById.get(clubId, kind, idOrKey);
    return found ?? resourceByKey.get(clubId, kind, idOrKey) ?? null;
  }

  /** One row more than the page holds, if there is one. */
  resources(
    kind: EditableKind,
    clubId: string,
    { limit, after }: PageRequest,
    siteId: string | undefined,
  ): ResourceRow[] {
    const [key, id] = after ?? ['', ''];
    const asked = { clubId, kind, key, id, limit: limit + 1 };
    if (siteId === undefined) return this.prepared.resources.all(asked);
    return this.prepared.resourcesOfSite.all({ ...asked, siteId });
  }

  whoAdded(kind: EditableKind, clubId: string, id: string): string | null {
    return this.prepared.whoAdded.get(clubId, kind, id)?.memberId ?? null;
  }

  sweep(clubId: string, id: string): SweepRow | null {
    return this.prepared.sweep.get(clubId, id) ?? null;
  }

  sweepByFile(clubId: string, sha256: Uint8Array): SweepRow | null {
    return this.prepared.sweepByFile.get(clubId, sha256) ?? null;
  }

  /** One row more than the page holds, if there is one. */
  sweeps(clubId: string, antennaId: string, { limit, after }: PageRequest): SweepRow[] {
    const [sortAt, id] = after ?? [afterAllTimes, ''];
    return this.prepared.sweeps.all({ clubId, antennaId, sortAt, id, limit: limit + 1 });
  }

  file(clubId: string, sweepId: string): FileRow | null {
    return this.prepared.file.get(clubId, sweepId) ?? null;
  }

  points(clubId: string, sweepId: string): Buffer | null {
    return this.prepared.points.get(clubId, sweepId)?.points ?? null;
  }

  /** One row more than the page holds, if there is one. */
  loadChecks(clubId: string, analyzerId: string, { limit, after }: PageRequest): LoadCheckRow[] {
    const [sortAt, id] = after ?? [afterAllTimes, ''];
    return this.prepared.loadChecks.all({ clubId, analyzerId, sortAt, id, limit: limit + 1 });
  }

  loadCheckPoints(clubId: string, id: string): Buffer | null {
    return this.prepared.loadCheckPoints.get(clubId, id)?.points ?? null;
  }

  cable(clubId: string, idOrKey: string): CableRow | null {
    const { cableById, cableByKey } = this.prepared;
    return cableById.get(clubId, idOrKey) ?? cableByKey.get(clubId, idOrKey) ?? null;
  }

  /** One row more than the page holds, if there is one. */
  cables(clubId: string, { limit, after }: PageRequest): CableRow[] {
    const [key] = after ?? ['', ''];
    return this.prepared.cables.all({ clubId, key, limit: limit + 1 });
  }

  lineCheck(clubId: string, id: string): LineCheckRow | null {
    return this.prepared.lineCheck.get(clubId, id) ?? null;
  }

  /** One row more than the page holds, if there is one. */
  lineChecks(clubId: string, antennaId: string, { limit, after }: PageRequest): LineCheckRow[] {
    const [sortAt, id] = after ?? [afterAllTimes, ''];
    return this.prepared.lineChecks.all({ clubId, antennaId, sortAt, id, limit: limit + 1 });
  }

  lineCheckTrace(clubId: string, id: string): Buffer | null {
    return this.prepared.lineCheckTrace.get(clubId, id)?.trace ?? null;
  }

  summary(clubId: string, sweepId: string, analysisVersion: string): SummaryRow | null {
    return this.prepared.summary.get(clubId, sweepId, analysisVersion) ?? null;
  }

  /** Of the file as this connection sees it: another number after each commit of the writer. */
  version(): number {
    return this.prepared.version.get() ?? 0;
  }

  close(): void {
    this.connection.close();
  }
}

type ClubRow = Omit<ClubRecord, 'invented'> & { readonly invented: number };

function prepareAll(connection: Connection) {
  const prepare = <Row>(sql: string) => connection.prepare<unknown[], Row>(sql);
  return {
    version: connection.prepare<[], number>('PRAGMA data_version').pluck(),
    clubs: prepare<ClubRow>(
      'SELECT id, key, name, invented, created_at AS createdAt FROM club ORDER BY key',
    ),
    resourceById: prepare<ResourceRow>(
      `SELECT ${resourceColumns} FROM resource WHERE club_id = ? AND kind = ? AND id = ?`,
    ),
    resourceByKey: prepare<ResourceRow>(
      `SELECT ${resourceColumns} FROM resource WHERE club_id = ? AND kind = ? AND key = ?`,
    ),
    whoAdded: prepare<{ readonly memberId: string }>(
      `SELECT member_id AS memberId FROM resource_revision
       WHERE club_id = ? AND kind = ? AND id = ? AND revision = 1`,
    ),
    resources: prepare<ResourceRow>(listQueries.resources),
    resourcesOfSite: prepare<ResourceRow>(listQueries.resourcesOfSite),
    sweep: prepare<SweepRow>(`SELECT ${sweepColumns} WHERE sweep.club_id = ? AND sweep.id = ?`),
    sweepByFile: prepare<SweepRow>(
      `SELECT ${sweepColumns} WHERE sweep.club_id = ? AND sweep.file_sha256 = ?`,
    ),
    sweeps: prepare<SweepRow>(listQueries.sweeps),
    file: prepare<FileRow>(
      `SELECT sha256, bytes, codec, body FROM sweep
       JOIN file ON file.club_id = sweep.club_id AND file.sha256 = sweep.file_sha256
       WHERE sweep.club_id = ? AND sweep.id = ?`,
    ),
    points: prepare<{ readonly points: Buffer }>(
      'SELECT points FROM sweep WHERE club_id = ? AND id = ?',
    ),
    loadChecks: prepare<LoadCheckRow>(listQueries.loadChecks),
    loadCheckPoints: prepare<{ readonly points: Buffer }>(
      'SELECT points FROM load_check WHERE club_id = ? AND id = ?',
    ),
    cableById: prepare<CableRow>(`SELECT ${cableColumns} WHERE club_id = ? AND id = ?`),
    cableByKey: prepare<CableRow>(`SELECT ${cableColumns} WHERE club_id = ? AND key = ?`),
    cables: prepare<CableRow>(listQueries.cables),
    lineCheck: prepare<LineCheckRow>(`SELECT ${lineCheckColumns} WHERE club_id = ? AND id = ?`),
    lineChecks: prepare<LineCheckRow>(listQueries.lineChecks),
    lineCheckTrace: prepare<{ readonly trace: Buffer }>(
      'SELECT trace FROM line_check WHERE club_id = ? AND id = ?',
    ),
    summary: prepare<SummaryRow>(
      'SELECT summary, usable FROM summary WHERE club_id = ? AND sweep_id = ? AND analysis_version = ?',
    ),
  };
}

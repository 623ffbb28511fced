import type { CorrectionStore, SweepRevision } from '../corrections.ts';
import type { Actor, SweepFacts, SweepRecord } from '../port.ts';
import type { Connection } from './connection.ts';
import { type SweepRow, toSweepFacts, toSweepRecord } from './rows.ts';
import type { Writer } from './writer.ts';

type RevisionRow = Omit<SweepRevision, 'facts'> & { readonly facts: string };

/** What is asked about corrections. */
export class CorrectionQueries {
  private readonly listed;
  private readonly asOf;

  constructor(connection: Connection) {
    this.listed = connection.prepare<[string, string], RevisionRow>(
      `SELECT revision, at, member_id AS memberId, reason, facts FROM sweep_facts
       WHERE club_id = ? AND sweep_id = ? ORDER BY revision`,
    );
    this.asOf = connection.prepare<unknown[], SweepRow>(
      `SELECT sweep.club_id AS clubId, sweep.id AS id, received_at AS receivedAt,
         uploaded_by AS uploadedBy, measured, sweep_facts.facts AS facts, sweep_facts.revision AS revision,
         received_at AS sortAt
       FROM sweep JOIN sweep_facts ON sweep_facts.club_id = sweep.club_id AND sweep_facts.sweep_id = sweep.id
       WHERE sweep.club_id = ? AND sweep.id = ? AND sweep_facts.at <= ?
       ORDER BY sweep_facts.revision DESC LIMIT 1`,
    );
  }

  list(clubId: string, sweepId: string): RevisionRow[] {
    return this.listed.all(clubId, sweepId);
  }

  findAsOf(clubId: string, sweepId: string, at: string): SweepRow | null {
    return this.asOf.get(clubId, sweepId, at) ?? null;
  }
}

type Read = <Row>(ask: (queries: CorrectionQueries) => Row) => Row;

/** Corrections in the SQLite file. */
export class SqliteCorrections implements CorrectionStore {
  private readonly read: Read;
  private readonly writer: Writer;

  constructor(read: Read, writer: Writer) {
    this.read = read;
    this.writer = writer;
  }

  async correct(
    actor: Actor,
    sweepId: string,
    revision: number,
    { facts, reason }: { readonly facts: SweepFacts; readonly reason: string },
  ): Promise<SweepRecord> {
    const row = await this.writer.run('correctSweep', actor, sweepId, revision, facts, reason);
    return toSweepRecord(row);
  }

  async list(clubId: string, sweepId: string): Promise<readonly SweepRevision[]> {
    const rows = this.read((queries) => queries.list(clubId, sweepId));
    return rows.map(({ facts, ...row }) => ({ ...row, facts: toSweepFacts(facts) }));
  }

  async findAsOf(clubId: string, sweepId: string, at: string): Promise<SweepRecord | null> {
    const row = this.read((queries) => queries.findAsOf(clubId, sweepId, at));
    return row === null ? null : toSweepRecord(row);
  }
}

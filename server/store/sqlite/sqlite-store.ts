import { createHash } from 'node:crypto';
import type { AuditStore } from '../audit.ts';
import type { LedgerEvent } from '../events.ts';
import type {
  ChosenBaseline,
  FreshWork,
  HistoryEntry,
  HistoryFilter,
  HistoryOrder,
  Standing,
  StoredMeasures,
  WorkRecord,
} from '../history-store.ts';
import type { KnownToken } from '../people.ts';
import {
  type Actor,
  type AddLineCheckOutcome,
  type AddLoadCheckOutcome,
  type AddSweepOutcome,
  type CableFacts,
  type CableRecord,
  type ClubRecord,
  type Editable,
  type EditableKind,
  type EditableKinds,
  type LineCheckRecord,
  type LoadCheckRecord,
  type NewLineCheck,
  type NewLoadCheck,
  type NewSweep,
  type Page,
  type PageRequest,
  type Store,
  type StoredPoints,
  type StoredSummary,
  StoreError,
  type SweepRecord,
  type TokenRecord,
} from '../port.ts';
import type { FreshRound, RoundRecord } from '../round-store.ts';
import { pack, packText, unpack, unpackText } from './compression.ts';
import { copyInThread } from './copy-in-thread.ts';
import { refuseBelowReserve } from './disk-reserve.ts';
import { storeErrorOf } from './errors.ts';
import { pageOf } from './page-of.ts';
import { toKnownToken } from './people-rows.ts';
import { packPoints, unpackPoints } from './points-codec.ts';
import type { Reader } from './reader.ts';
import { toRoundRecord } from './rounds.ts';
import {
  toCableRecord,
  toChosenBaselines,
  toEditable,
  toHistoryEntry,
  toLineCheckRecord,
  toLoadCheckRecord,
  toSweepRecord,
  toWorkRecord,
} from './rows.ts';
import { SqliteCorrections } from './sqlite-corrections.ts';
import { SqlitePeople } from './sqlite-people.ts';
import { SqliteWebhooks } from './sqlite-webhooks.ts';
import type { Writer } from './writer.ts';

/** The Store port over one SQLite file: one writer in its thread, one reader here. */
export class SqliteStore implements Store {
  readonly people: SqlitePeople;
  readonly webhooks: SqliteWebhooks;
  readonly audit: AuditStore;
  readonly corrections: SqliteCorrections;
  private readonly path: string;
  private readonly reader: Reader;
  private readonly writer: Writer;
  private readonly reserveBytes: number;
  /** Those under way. */
  private readonly copies = new Set<Promise<void>>();

  constructor(path: string, reader: Reader, writer: Writer, reserveBytes: number) {
    this.path = path;
    this.reader = reader;
    this.writer = writer;
    this.reserveBytes = reserveBytes;
    this.webhooks = new SqliteWebhooks((ask) => this.read((all) => ask(all.webhooks)), writer);
    this.corrections = new SqliteCorrections(
      (ask) => this.read((all) => ask(all.corrections)),
      writer,
    );
    this.audit = {
      list: async (clubId, page) => {
        const rows = this.read((all) => all.audit.list(clubId, page));
        return pageOf(
          rows,
          page,
          (row) => row,
          ({ seq }) => [String(seq), ''],
        );
      },
    };
    this.people = new SqlitePeople((ask) => this.read((all) => ask(all.people)), writer);
  }

  async addClub(
    club: ClubRecord,
    token: TokenRecord & { readonly secretSha256: Uint8Array },
  ): Promise<void> {
    const { secretSha256, ...record } = token;
    await this.writer.run('addClub', club, record, secretSha256);
  }

  async listClubs(): Promise<readonly ClubRecord[]> {
    return this.read((reader) => reader.clubs());
  }

  async findToken(secretSha256: Uint8Array): Promise<KnownToken | null> {
    const row = this.read((reader) => reader.people.knownToken(secretSha256));
    return row === null ? null : toKnownToken(row);
  }

  async addEditable<K extends EditableKind>(
    kind: K,
    actor: Actor,
    fresh: { readonly id: string; readonly key: string; readonly facts: EditableKinds[K] },
  ): Promise<Editable<EditableKinds[K]>> {
    const { id, key, facts } = fresh;
    const siteId = siteOf(facts);
    const packed = { kind, actor, id, key, siteId, facts: JSON.stringify(facts) };
    return toEditable<K>(await this.writer.run('addResource', packed));
  }

  async findEditable<K extends EditableKind>(
    kind: K,
    clubId: string,
    idOrKey: string,
  ): Promise<Editable<EditableKinds[K]> | null> {
    const row = this.read((reader) => reader.resource(kind, clubId, idOrKey));
    return row === null ? null : toEditable<K>(row);
  }

  async whoAdded(kind: EditableKind, clubId: string, id: string): Promise<string | null> {
    return this.read((reader) => reader.whoAdded(kind, clubId, id));
  }

  async listEditables<K extends EditableKind>(
    kind: K,
    clubId: string,
    page: PageRequest,
    filter: { readonly siteId?: string } = {},
  ): Promise<Page<Editable<EditableKinds[K]>>> {
    const rows = this.read((reader) => reader.resources(kind, clubId, page, filter.siteId));
    return pageOf(rows, page, toEditable<K>, ({ key, id }) => [key, id]);
  }

  async editEditable<K extends EditableKind>(
    kind: K,
    actor: Actor,
    id: string,
    revision: number,
    next: { readonly key: string; readonly facts: EditableKinds[K] },
  ): Promise<Editable<EditableKinds[K]>> {
    const { key, facts } = next;
    const siteId = siteOf(facts);
    const packed = { kind, actor, id, revision, key, siteId, facts: JSON.stringify(facts) };
    return toEditable<K>(await this.writer.run('editResource', packed));
  }

  async addSweep({ record, file, points, summary, measures }: NewSweep): Promise<AddSweepOutcome> {
    await refuseBelowReserve(this.path, this.reserveBytes);
    const [packedFile, packedSummary, packedUsable] = await Promise.all([
      pack(file),
      packText(summary.summaryJson),
      packText(summary.usableJson),
    ]);
    const { outcome, row } = await this.writer.run('addSweep', {
      record,
      file: packedFile,
      points: packPoints(points),
      analysisVersion: summary.analysisVersion,
      summary: packedSummary,
      usable: packedUsable,
      measures,
    });
    const kept = toSweepRecord(row);
    if (outcome === 'added') return { outcome, record: kept };
    const isSame = kept.facts.antennaId === record.facts.antennaId;
    return { outcome: isSame ? 'same' : 'elsewhere', record: kept };
  }

  async findSweepByFile(clubId: string, fileSha256: string): Promise<SweepRecord | null> {
    const sha256 = Buffer.from(fileSha256, 'hex');
    const row = this.read((reader) => reader.sweepByFile(clubId, sha256));
    return row === null ? null : toSweepRecord(row);
  }

  async findSweep(clubId: string, id: string): Promise<SweepRecord | null> {
    const row = this.read((reader) => reader.sweep(clubId, id));
    return row === null ? null : toSweepRecord(row);
  }

  async listSweeps(
    clubId: string,
    antennaId: string,
    page: PageRequest,
  ): Promise<Page<SweepRecord>> {
    const rows = this.read((reader) => reader.sweeps(clubId, antennaId, page));
    return pageOf(rows, page, toSweepRecord, ({ sortAt, id }) => [sortAt, id]);
  }

  async readSweepFile(clubId: string, id: string): Promise<Uint8Array | null> {
    const row = this.read((reader) => reader.file(clubId, id));
    if (row === null) return null;
    const bytes = await unpack(row, row.bytes);
    if (createHash('sha256').update(bytes).digest().equals(row.sha256)) return bytes;
    throw new StoreError('corrupt', `The file of sweep ${id} is not what was sent.`);
  }

  async readSweepPoints(clubId: string, id: string): Promise<StoredPoints | null> {
    const packed = this.read((reader) => reader.points(clubId, id));
    return packed === null ? null : unpackPoints(packed);
  }

  async readSummary(
    clubId: string,
    id: string,
    analysisVersion: string,
  ): Promise<StoredSummary | null> {
    const row = this.read((reader) => reader.summary(clubId, id, analysisVersion));
    if (row === null) return null;
    const [summaryJson, usableJson] = await Promise.all([
      unpackText(row.summary),
      unpackText(row.usable),
    ]);
    return { analysisVersion, summaryJson, usableJson };
  }

  async listHistory(
    clubId: string,
    antennaId: string,
    filter: HistoryFilter,
    page: PageRequest,
    order: HistoryOrder = 'newest_first',
  ): Promise<Page<HistoryEntry>> {
    const rows = this.read(({ history }) =>
      history.entries(clubId, antennaId, filter, page, order),
    );
    return pageOf(rows, page, toHistoryEntry, ({ sortAt, id }) => [sortAt, id]);
  }

  async listStandings(clubId: string): Promise<readonly Standing[]> {
    const rows = this.read(({ history }) => history.standings(clubId));
    return rows.map(({ antennaId, band, ...entry }) => ({
      antennaId,
      band: band === '' ? null : band,
      entry: toHistoryEntry(entry),
    }));
  }

  async keepMeasures(clubId: string, sweepId: string, stored: StoredMeasures): Promise<void> {
    await this.writer.run('keepMeasures', clubId, sweepId, stored);
  }

  async listUnmeasured(limit: number): Promise<readonly SweepRecord[]> {
    return this.read(({ history }) => history.unmeasured(limit)).map(toSweepRecord);
  }

  async addWork(actor: Actor, fresh: FreshWork): Promise<WorkRecord> {
    return toWorkRecord(await this.writer.run('addWork', actor, fresh));
  }

  async withdrawWork(actor: Actor, id: string, reason: string): Promise<WorkRecord> {
    return toWorkRecord(await this.writer.run('withdrawWork', actor, id, reason));
  }

  async findWork(clubId: string, id: string): Promise<WorkRecord | null> {
    const row = this.read(({ history }) => history.workById(clubId, id));
    return row === null ? null : toWorkRecord(row);
  }

  async listWork(clubId: string, antennaId: string, page: PageRequest): Promise<Page<WorkRecord>> {
    const rows = this.read(({ history }) => history.work(clubId, antennaId, page));
    return pageOf(rows, page, toWorkRecord, ({ doneAt, id }) => [doneAt, id]);
  }

  async chooseBaseline(actor: Actor, antennaId: string, chosen: ChosenBaseline): Promise<void> {
    await this.writer.run('chooseBaseline', actor, antennaId, chosen);
  }

  async chosenBaselines(clubId: string, antennaId: string): Promise<readonly ChosenBaseline[]> {
    const rows = this.read(({ history }) => history.baselines(clubId, antennaId));
    return toChosenBaselines(rows);
  }

  async setTestInterval(actor: Actor, days: number | null): Promise<void> {
    await this.writer.run('setTestInterval', actor, days);
  }

  async testInterval(clubId: string): Promise<number | null | undefined> {
    return this.read(({ history }) => history.testInterval(clubId))?.days;
  }

  async addRound(actor: Actor, fresh: FreshRound): Promise<RoundRecord> {
    return toRoundRecord(await this.writer.run('addRound', actor, fresh));
  }

  async findRound(clubId: string, id: string): Promise<RoundRecord | null> {
    const row = this.read(({ rounds }) => rounds.round(clubId, id));
    return row === null ? null : toRoundRecord(row);
  }

  async listRounds(clubId: string, page: PageRequest): Promise<Page<RoundRecord>> {
    const rows = this.read(({ rounds }) => rounds.rounds(clubId, page));
    return pageOf(rows, page, toRoundRecord, ({ beginsAt, id }) => [beginsAt, id]);
  }

  async allWork(clubId: string, antennaId: string): Promise<readonly WorkRecord[]> {
    return this.read(({ history }) => history.allWork(clubId, antennaId)).map(toWorkRecord);
  }

  async newestSeq(clubId?: string): Promise<number> {
    return this.read(({ events }) => events.newestSeq(clubId));
  }

  async listEvents(clubId: string, afterSeq: number, limit: number): Promise<LedgerEvent[]> {
    return this.read(({ events }) => events.list(clubId, afterSeq, limit));
  }

  async noteOverdue(clubId: string, antennaId: string, dueAt: string, at: string): Promise<void> {
    await this.writer.run('noteOverdue', clubId, antennaId, dueAt, at);
  }

  onWrite(listener: () => void): () => void {
    return this.writer.onWrite(listener);
  }

  async addLoadCheck({ record, file, points }: NewLoadCheck): Promise<AddLoadCheckOutcome> {
    await refuseBelowReserve(this.path, this.reserveBytes);
    const { outcome, row } = await this.writer.run('addLoadCheck', {
      record,
      file: await pack(file),
      points: packPoints(points),
    });
    return { outcome, record: toLoadCheckRecord(row) };
  }

  async listLoadChecks(
    clubId: string,
    analyzerId: string,
    page: PageRequest,
  ): Promise<Page<LoadCheckRecord>> {
    const rows = this.read((reader) => reader.loadChecks(clubId, analyzerId, page));
    return pageOf(rows, page, toLoadCheckRecord, ({ sortAt, id }) => [sortAt, id]);
  }

  async readLoadCheckPoints(clubId: string, id: string): Promise<StoredPoints | null> {
    const packed = this.read((reader) => reader.loadCheckPoints(clubId, id));
    return packed === null ? null : unpackPoints(packed);
  }

  async addCable(
    actor: Actor,
    fresh: { readonly id: string; readonly key: string; readonly facts: CableFacts },
  ): Promise<CableRecord> {
    return toCableRecord(await this.writer.run('addCable', { actor, ...fresh }));
  }

  async findCable(clubId: string, idOrKey: string): Promise<CableRecord | null> {
    const row = this.read((reader) => reader.cable(clubId, idOrKey));
    return row === null ? null : toCableRecord(row);
  }

  async listCables(clubId: string, page: PageRequest): Promise<Page<CableRecord>> {
    const rows = this.read((reader) => reader.cables(clubId, page));
    return pageOf(rows, page, toCableRecord, ({ key, id }) => [key, id]);
  }

  async addLineCheck({ record, file, traceJson }: NewLineCheck): Promise<AddLineCheckOutcome> {
    await refuseBelowReserve(this.path, this.reserveBytes);
    const { outcome, row } = await this.writer.run('addLineCheck', {
      record,
      file: await pack(file),
      trace: await packText(traceJson),
    });
    return { outcome, record: toLineCheckRecord(row) };
  }

  async findLineCheck(clubId: string, id: string): Promise<LineCheckRecord | null> {
    const row = this.read((reader) => reader.lineCheck(clubId, id));
    return row === null ? null : toLineCheckRecord(row);
  }

  async listLineChecks(
    clubId: string,
    antennaId: string,
    page: PageRequest,
  ): Promise<Page<LineCheckRecord>> {
    const rows = this.read((reader) => reader.lineChecks(clubId, antennaId, page));
    return pageOf(rows, page, toLineCheckRecord, ({ sortAt, id }) => [sortAt, id]);
  }

  async readLineCheckTrace(clubId: string, id: string): Promise<string | null> {
    const packed = this.read((reader) => reader.lineCheckTrace(clubId, id));
    return packed === null ? null : unpackText(packed);
  }

  async backup(path: string): Promise<void> {
    const copying = copyInThread({ from: this.path, to: path });
    this.copies.add(copying);
    try {
      await copying;
    } finally {
      this.copies.delete(copying);
    }
  }

  version(): number {
    return this.read((reader) => reader.version());
  }

  async ready(): Promise<void> {
    this.read((reader) => reader.clubs());
    await this.writer.run('takeLock');
  }

  async close(): Promise<void> {
    this.reader.close();
    await Promise.allSettled(this.copies);
    await this.writer.close();
  }

  private read<Row>(ask: (reader: Reader) => Row): Row {
    try {
      return ask(this.reader);
    } catch (error) {
      throw storeErrorOf(error);
    }
  }
}

function siteOf(facts: EditableKinds[EditableKind]): string | null {
  return 'siteId' in facts ? facts.siteId : null;
}

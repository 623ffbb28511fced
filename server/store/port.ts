/**
 * The Store port: what the service asks of its storage, as whole acts of the domain. Every method
 * is asynchronous and keyed by club, so that another engine can stand in for the embedded one.
 * Ids (UUIDv7) and times (RFC 3339 UTC, milliseconds, `Z`) are made by the caller.
 */

import type { AntennaKind } from '../../core/advice/antenna-kind.ts';
import type { StatedInstrumentError } from '../../core/analysis/instrument-error.ts';
import type { AttenuationPoint } from '../../core/line/attenuation.ts';
import type { FarEnd } from '../../core/line/check/checked-line.ts';
import type { WindowId } from '../../core/line/check/windows.ts';
import type { FeedLineSection } from '../../core/line/feed-line.ts';
import type { Conditions } from '../../core/record/conditions.ts';
import type { AuditStore } from './audit.ts';
import type { CorrectionStore } from './corrections.ts';
import type { EventStore } from './events.ts';
import type { HistoryStore, StoredMeasures } from './history-store.ts';
import type { KnownToken, PeopleStore } from './people.ts';
import type { RoundStore } from './round-store.ts';
import type { WebhookStore } from './webhooks.ts';

/** Where and by whom a change was made: written with it. */
export interface Actor {
  readonly clubId: string;
  readonly memberId: string;
  readonly at: string;
}

/** The kinds of failure that a caller can act on. */
export type StoreErrorKind = 'conflict' | 'stale' | 'full' | 'corrupt' | 'unavailable';

/** Thrown by every adapter; `kind` is a closed list. */
export class StoreError extends Error {
  override readonly name = 'StoreError';
  readonly kind: StoreErrorKind;
  /** For `conflict`: the field that must be unique. */
  readonly field: string | undefined;

  constructor(kind: StoreErrorKind, message: string, field?: string, cause?: unknown) {
    super(message, { cause });
    this.kind = kind;
    this.field = field;
  }
}

export interface ClubRecord {
  readonly id: string;
  readonly key: string;
  readonly name: string;
  readonly invented: boolean;
  readonly createdAt: string;
}

/** What every editable resource has. `revision` starts at 1 and grows by 1 with each edit. */
export interface Editable<Facts> {
  readonly id: string;
  readonly clubId: string;
  /** Unique in the club: lower-case letters, digits and hyphens. */
  readonly key: string;
  readonly revision: number;
  readonly createdAt: string;
  readonly updatedAt: string;
  readonly facts: Facts;
}

export interface SiteFacts {
  readonly name: string;
  readonly latitudeDeg: number | null;
  readonly longitudeDeg: number | null;
  readonly elevationM: number | null;
  readonly note: string;
  readonly invented: boolean;
}

export interface AntennaFacts {
  readonly siteId: string;
  readonly name: string;
  readonly kind: AntennaKind;
  /** Band names of the plan, for instance `20m`. */
  readonly designBands: readonly string[];
  /** Id of the band plan it is judged by. */
  readonly plan: string;
  /** Operator class of a licence plan, null for all rows. */
  readonly licence: string | null;
  readonly maxSwr: number;
  readonly referenceOhm: number;
  /** Days from one test to the next; null or left out: as the club has it. */
  readonly testIntervalDays?: number | null;
  /** Null: not known. Empty: the analyzer is connected at the feed point. */
  readonly feedLine: readonly FeedLineSection[] | null;
  readonly note: string;
  readonly invented: boolean;
}

export interface AnalyzerFacts {
  readonly name: string;
  /** What is left of its errors after calibration, stated or measured; null: none is known. */
  readonly residualErrors: StatedInstrumentError | null;
  readonly note: string;
  readonly invented: boolean;
}

export type SiteRecord = Editable<SiteFacts>;
export type AntennaRecord = Editable<AntennaFacts>;
export type AnalyzerRecord = Editable<AnalyzerFacts>;

/** The kinds of editable resource, by the name of their collection. */
export interface EditableKinds {
  readonly sites: SiteFacts;
  readonly antennas: AntennaFacts;
  readonly analyzers: AnalyzerFacts;
}
export type EditableKind = keyof EditableKinds;

/**
 * What is told about a sweep beside its file; none of it is measured. What nobody said of weather,
 * wind, temperature and ground is null or left out.
 */
export interface SweepFacts extends Partial<Conditions> {
  readonly antennaId: string;
  readonly analyzerId: string | null;
  /** When it was measured; null if nobody said. */
  readonly measuredAt: string | null;
  /** In the member's own words. */
  readonly conditions: string | null;
  readonly note: string;
  readonly plane: 'measured' | 'feed_point';
  readonly invented: boolean;
  /** Why it tells nothing of the antenna, so that no history has it; null or left out: it does. */
  readonly rejectedBecause?: string | null;
}

/** What was read from the file, fixed for good. */
export interface SweepMeasured {
  readonly fileSha256: string;
  readonly fileBytes: number;
  readonly fileName: string | null;
  readonly format: string;
  /** The column mapping that was used, for delimited text. */
  readonly columns: string | null;
  readonly port: 1 | 2 | null;
  readonly phase: 'signed' | 'unsigned' | 'none';
  readonly referenceOhm: number;
  readonly points: number;
  readonly lowHz: number;
  readonly highHz: number;
  /** The reader's assumptions as JSON text. */
  readonly assumptionsJson: string;
}

export interface SweepRecord {
  readonly id: string;
  readonly clubId: string;
  readonly receivedAt: string;
  readonly uploadedBy: string;
  /** Of the facts: 1 as uploaded, one more with each correction. */
  readonly revision: number;
  readonly facts: SweepFacts;
  readonly measured: SweepMeasured;
}

/** The points of a sweep as typed arrays; `none` has the magnitude in place of both parts. */
export interface StoredPoints {
  readonly frequencyHz: Float64Array;
  readonly reflectionRe: Float64Array | null;
  readonly reflectionIm: Float64Array | null;
  readonly reflectionMagnitude: Float64Array | null;
}

/** A derived answer as the bytes that are sent, for one analysis version. */
export interface StoredSummary {
  readonly analysisVersion: string;
  /** Wire JSON (snake_case) of the summary. */
  readonly summaryJson: string;
  /** Wire JSON of the usable-band report at the antenna's own limit and plan. */
  readonly usableJson: string;
}

export interface NewSweep {
  readonly record: SweepRecord;
  readonly file: Uint8Array;
  readonly points: StoredPoints;
  readonly summary: StoredSummary;
  readonly measures: StoredMeasures;
}

/** What is told about a sweep of a known load. */
export interface LoadCheckFacts {
  readonly analyzerId: string;
  /** The resistance of the load, ohm; 0 is a short, null an open. */
  readonly loadOhm: number | null;
  readonly measuredAt: string | null;
  readonly note: string;
  readonly invented: boolean;
}

/** A sweep of a known load by an analyzer, kept for good. */
export interface LoadCheckRecord {
  readonly id: string;
  readonly clubId: string;
  readonly receivedAt: string;
  readonly uploadedBy: string;
  readonly facts: LoadCheckFacts;
  readonly measured: SweepMeasured;
}

export interface NewLoadCheck {
  readonly record: LoadCheckRecord;
  readonly file: Uint8Array;
  readonly points: StoredPoints;
}

/** `known`: the club has a check of these bytes, the one that is answered. */
export interface AddLoadCheckOutcome {
  readonly outcome: 'added' | 'known';
  readonly record: LoadCheckRecord;
}

/** A cable as the club states it; what it states no half-width of is assumed. */
export interface CableFacts {
  readonly name: string;
  readonly characteristicOhm: number;
  readonly characteristicU95Ohm: number | null;
  readonly velocityFactor: number;
  readonly velocityFactorU95: number | null;
  readonly points: readonly AttenuationPoint[];
  readonly lossU95Fraction: number | null;
  /** Where the figures are from. */
  readonly source: string;
  readonly note: string;
  readonly invented: boolean;
}

/** A club's own cable, never edited: what was computed with it stays true. */
export interface CableRecord {
  readonly id: string;
  readonly clubId: string;
  readonly key: string;
  readonly createdAt: string;
  readonly createdBy: string;
  readonly facts: CableFacts;
}

/** What a line is taken for in a check; with other values the same file is another check. */
export interface TestedLine {
  readonly farEnd: FarEnd;
  /** What a loaded end was loaded with, ohm; null if nobody said, and for other ends. */
  readonly loadOhm: number | null;
  readonly cable: string | null;
  readonly lengthM: number | null;
  readonly lengthU95M: number | null;
  readonly velocityFactor: number | null;
  readonly velocityFactorU95: number | null;
  readonly window: WindowId;
  readonly compensateLoss: boolean;
}

/** What is told about a sweep into a feed line. */
export interface LineCheckFacts {
  readonly antennaId: string;
  readonly analyzerId: string | null;
  readonly measuredAt: string | null;
  readonly note: string;
  readonly invented: boolean;
}

/** A sweep into a feed line and what it told, kept for good. */
export interface LineCheckRecord {
  readonly id: string;
  readonly clubId: string;
  readonly receivedAt: string;
  readonly uploadedBy: string;
  readonly tested: TestedLine;
  readonly facts: LineCheckFacts;
  readonly measured: SweepMeasured;
  /** Wire JSON of what the check found, without its trace. */
  readonly reportJson: string;
}

export interface NewLineCheck {
  readonly record: LineCheckRecord;
  readonly file: Uint8Array;
  /** Wire JSON of the trace. */
  readonly traceJson: string;
}

/** `known`: this antenna has a check of these bytes under these facts, the one that is answered. */
export interface AddLineCheckOutcome {
  readonly outcome: 'added' | 'known';
  readonly record: LineCheckRecord;
}

/** `same`: these bytes are this antenna's already. `elsewhere`: they are another antenna's. */
export type AddSweepOutcome =
  | { readonly outcome: 'added'; readonly record: SweepRecord }
  | { readonly outcome: 'same'; readonly record: SweepRecord }
  | { readonly outcome: 'elsewhere'; readonly record: SweepRecord };

/** A page by key: rows strictly after `after` in the list's order. */
export interface PageRequest {
  readonly limit: number;
  readonly after: readonly [sortKey: string, id: string] | null;
}
export interface Page<Row> {
  readonly items: readonly Row[];
  readonly next: readonly [sortKey: string, id: string] | null;
}

export interface TokenRecord {
  readonly id: string;
  readonly clubId: string;
  readonly memberId: string;
  readonly label: string;
  readonly createdAt: string;
}

export interface Store extends HistoryStore, EventStore, RoundStore {
  /** Members, their tokens, and the club itself. */
  readonly people: PeopleStore;

  /** What was told of sweeps, and its corrections. */
  readonly corrections: CorrectionStore;
  /** Who did what. */
  readonly audit: AuditStore;
  /** Where events are sent. */
  readonly webhooks: WebhookStore;

  /** Adds the club with its first member, a steward, and that member's token, in one act. */
  addClub(
    club: ClubRecord,
    token: TokenRecord & { readonly secretSha256: Uint8Array },
  ): Promise<void>;
  listClubs(): Promise<readonly ClubRecord[]>;
  /** The token whose secret has this SHA-256, if it is not revoked and its member is active. */
  findToken(secretSha256: Uint8Array): Promise<KnownToken | null>;

  /** Adds a site, antenna or analyzer at revision 1. Throws `conflict` on a key in use. */
  addEditable<K extends EditableKind>(
    kind: K,
    actor: Actor,
    fresh: { readonly id: string; readonly key: string; readonly facts: EditableKinds[K] },
  ): Promise<Editable<EditableKinds[K]>>;
  /** By id or key; null if the club has none such. */
  findEditable<K extends EditableKind>(
    kind: K,
    clubId: string,
    idOrKey: string,
  ): Promise<Editable<EditableKinds[K]> | null>;
  /** The member who added the record, by id; null if the club has none such. */
  whoAdded(kind: EditableKind, clubId: string, id: string): Promise<string | null>;
  /** Ascending by key; antennas may be limited to one site. */
  listEditables<K extends EditableKind>(
    kind: K,
    clubId: string,
    page: PageRequest,
    filter?: { readonly siteId?: string },
  ): Promise<Page<Editable<EditableKinds[K]>>>;
  /**
   * Replaces key and facts if the stored revision is `revision`, else throws `stale`. The check and
   * the write are one act; the revision before is kept.
   */
  editEditable<K extends EditableKind>(
    kind: K,
    actor: Actor,
    id: string,
    revision: number,
    next: { readonly key: string; readonly facts: EditableKinds[K] },
  ): Promise<Editable<EditableKinds[K]>>;

  /** Keeps file, points, record and summary in one act; the same bytes never make a twin. */
  addSweep(sweep: NewSweep): Promise<AddSweepOutcome>;
  /** The club's record of these bytes, if it has them. */
  findSweepByFile(clubId: string, fileSha256: string): Promise<SweepRecord | null>;
  findSweep(clubId: string, id: string): Promise<SweepRecord | null>;
  /** Newest first by (measuredAt or receivedAt, id). */
  listSweeps(clubId: string, antennaId: string, page: PageRequest): Promise<Page<SweepRecord>>;
  /** The file byte for byte, checked against its SHA-256; throws `corrupt` if it does not match. */
  readSweepFile(clubId: string, id: string): Promise<Uint8Array | null>;
  readSweepPoints(clubId: string, id: string): Promise<StoredPoints | null>;
  readSummary(clubId: string, id: string, analysisVersion: string): Promise<StoredSummary | null>;

  /** Keeps a sweep of a known load in one act; the same bytes never make a twin. */
  addLoadCheck(check: NewLoadCheck): Promise<AddLoadCheckOutcome>;
  /** Newest first by (measuredAt or receivedAt, id). */
  listLoadChecks(
    clubId: string,
    analyzerId: string,
    page: PageRequest,
  ): Promise<Page<LoadCheckRecord>>;
  readLoadCheckPoints(clubId: string, id: string): Promise<StoredPoints | null>;

  /** Keeps a club's own cable. Throws `conflict` on a key in use. */
  addCable(
    actor: Actor,
    fresh: { readonly id: string; readonly key: string; readonly facts: CableFacts },
  ): Promise<CableRecord>;
  /** By id or key; null if the club has none such. */
  findCable(clubId: string, idOrKey: string): Promise<CableRecord | null>;
  /** Ascending by key. */
  listCables(clubId: string, page: PageRequest): Promise<Page<CableRecord>>;

  /** Keeps a line check in one act; the same bytes under the same facts never make a twin. */
  addLineCheck(check: NewLineCheck): Promise<AddLineCheckOutcome>;
  findLineCheck(clubId: string, id: string): Promise<LineCheckRecord | null>;
  /** Newest first by (measuredAt or receivedAt, id). */
  listLineChecks(
    clubId: string,
    antennaId: string,
    page: PageRequest,
  ): Promise<Page<LineCheckRecord>>;
  readLineCheckTrace(clubId: string, id: string): Promise<string | null>;

  /** Makes a verified copy of everything in a new file; never half of one. */
  backup(path: string): Promise<void>;

  /**
   * A number that is another one after anything was written, by whomever: what was read is still so
   * while it stays. Cheap; an engine that cannot tell gives another number each time.
   */
  version(): number;
  /** Resolves if reader and writer both answer. */
  ready(): Promise<void>;
  /** Waits for accepted writes, then closes. */
  close(): Promise<void>;
}

import { readSweep } from '../core/formats/read-sweep.ts';
import type { ReadError, ReadLimits, ReadSweep } from '../core/formats/read-types.ts';
import type { LineCheckError } from '../core/line/check/grid.ts';
import { fail, ok, type Result } from '../core/result.ts';
import { storedMeasures } from './history/measures.ts';
import { checkForRecord, type LineToCheck } from './lines/line-check.ts';
import { basisOf } from './report-basis.ts';
import { summaryOf, usableOf } from './reports.ts';
import type {
  AnalyzerRecord,
  AntennaRecord,
  CableRecord,
  LineCheckFacts,
  LoadCheckFacts,
  NewLineCheck,
  NewLoadCheck,
  NewSweep,
  SweepFacts,
  SweepMeasured,
  SweepRecord,
} from './store/port.ts';
import { toStoredPoints } from './stored-points.ts';
import { viewOf } from './sweep-view.ts';
import { lineReportJson, traceJson } from './wire/line-check.ts';

/** A file on its way in, and what was told about it. */
export interface Incoming extends IncomingFile {
  readonly antenna: AntennaRecord;
  readonly analyzer: AnalyzerRecord | null;
  /** The club's own cables that the antenna's feed line names. */
  readonly ownCables: readonly CableRecord[];
  readonly facts: SweepFacts;
}

/** What every file comes in with, whatever it is a measurement of. */
export interface IncomingFile {
  readonly id: string;
  readonly clubId: string;
  readonly receivedAt: string;
  readonly uploadedBy: string;
  readonly bytes: Uint8Array;
  /** Lower-case hex of `bytes`. */
  readonly fileSha256: string;
  readonly fileName: string | null;
  readonly columns: string | null;
  readonly port: 1 | 2 | null;
  readonly limits: ReadLimits;
}

/**
 * Reads a file and derives all that is stored with it: points, summary and usable-band report.
 * Values in, values out (no clock, no store, no HTTP), so that it can move to another thread.
 */
export function ingest(incoming: Incoming): Result<NewSweep, ReadError> {
  const read = readIncoming(incoming);
  if (!read.ok) return fail(read.error);
  const record = recordOf(incoming, read.value);
  return ok({
    record,
    file: incoming.bytes,
    points: toStoredPoints(read.value.sweep),
    ...derivedFrom(incoming, record, read.value),
  });
}

/** Reads a sweep of a known load as it is stored. */
export function ingestLoadCheck(
  incoming: IncomingFile,
  facts: LoadCheckFacts,
): Result<NewLoadCheck, ReadError> {
  const read = readIncoming(incoming);
  if (!read.ok) return fail(read.error);
  const { id, clubId, receivedAt, uploadedBy, bytes } = incoming;
  const measured = measuredOf(incoming, read.value);
  return ok({
    record: { id, clubId, receivedAt, uploadedBy, facts, measured },
    file: bytes,
    points: toStoredPoints(read.value.sweep),
  });
}

/** Why a line check was not kept: its file, or what is in it. */
export type LineCheckRefusal =
  | { readonly unreadable: ReadError }
  | { readonly impossible: LineCheckError };

/** Reads a sweep into a line and checks the line, as both are stored. */
export function ingestLineCheck(
  incoming: IncomingFile,
  line: LineToCheck,
  facts: LineCheckFacts,
): Result<NewLineCheck, LineCheckRefusal> {
  const read = readIncoming(incoming);
  if (!read.ok) return fail({ unreadable: read.error });
  const checked = checkForRecord(read.value.sweep, line);
  if (!checked.ok) return fail({ impossible: checked.error });
  const { id, clubId, receivedAt, uploadedBy, bytes } = incoming;
  const measured = measuredOf(incoming, read.value);
  const { tested } = line;
  const reportJson = lineReportJson(checked.value);
  return ok({
    record: { id, clubId, receivedAt, uploadedBy, tested, facts, measured, reportJson },
    file: bytes,
    traceJson: traceJson(checked.value.trace),
  });
}

function readIncoming(incoming: IncomingFile): Result<ReadSweep, ReadError> {
  const { bytes, columns, port, fileName, limits } = incoming;
  return readSweep(bytes, {
    limits,
    ...(columns === null ? {} : { columns }),
    ...(port === null ? {} : { port }),
    ...(fileName === null ? {} : { fileName }),
  });
}

function derivedFrom(
  { antenna, analyzer, ownCables }: Incoming,
  record: SweepRecord,
  { sweep, assumptions }: ReadSweep,
): Pick<NewSweep, 'summary' | 'measures'> {
  const residualErrors = analyzer?.facts.residualErrors ?? null;
  const basis = basisOf(antenna.facts, residualErrors, ownCables, record);
  const view = viewOf(basis, sweep, assumptions);
  return {
    summary: {
      analysisVersion: basis.analysisVersion,
      summaryJson: JSON.stringify(summaryOf(record, view, basis)),
      usableJson: JSON.stringify(usableOf(record, view, basis)),
    },
    measures: storedMeasures(view, basis),
  };
}

function recordOf(incoming: Incoming, read: ReadSweep): SweepRecord {
  const { id, clubId, receivedAt, uploadedBy, facts } = incoming;
  const measured = measuredOf(incoming, read);
  return { id, clubId, receivedAt, uploadedBy, revision: 1, facts, measured };
}

function measuredOf(incoming: IncomingFile, read: ReadSweep): SweepMeasured {
  const { sweep, format, assumptions, columns = null, port = null } = read;
  const { frequencyHz, phase, referenceOhm } = sweep;
  return {
    fileSha256: incoming.fileSha256,
    fileBytes: incoming.bytes.length,
    fileName: incoming.fileName,
    format,
    columns,
    port,
    phase,
    referenceOhm,
    points: frequencyHz.length,
    lowHz: frequencyHz[0],
    highHz: frequencyHz[frequencyHz.length - 1],
    assumptionsJson: JSON.stringify(assumptions),
  };
}

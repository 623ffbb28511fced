import type { StatedInstrumentError } from '../core/analysis/instrument-error.ts';
import { analysisVersion } from '../core/analysis/summarise.ts';
import { clubCablesOf } from './lines/club-cables.ts';
import { type LineBasis, lineBasisOf } from './lines/line-basis.ts';
import type { Service } from './service.ts';
import type {
  AntennaFacts,
  AntennaRecord,
  CableRecord,
  SweepFacts,
  SweepMeasured,
  SweepRecord,
} from './store/port.ts';
import { toSnakeCase } from './wire/case.ts';

/** All that a summary or a report follows from, beside the sweep itself. */
export interface ReportBasis {
  readonly analysisVersion: string;
  readonly plane: SweepFacts['plane'];
  readonly referenceOhm: number;
  readonly maxSwr: number;
  readonly plan: string;
  readonly licence: string | null;
  readonly designBands: readonly string[];
  /** What is known of the analyzer's own error; null: nothing. */
  readonly residualErrors: StatedInstrumentError | null;
  /** What lies between analyzer and antenna; null for a sweep that was taken at the feed point. */
  readonly line: LineBasis | null;
}

/** What of a record bears on how its sweep can be judged. */
export interface JudgedRecord {
  readonly facts: Pick<SweepFacts, 'plane'>;
  readonly measured: Pick<SweepMeasured, 'phase' | 'referenceOhm'>;
}

/**
 * The basis by which an antenna wants a sweep judged; `own` are the club's own cables that its feed
 * line names. A sweep without phase keeps the reference of its file: it cannot be moved to another.
 */
export function basisOf(
  antenna: AntennaFacts,
  residualErrors: StatedInstrumentError | null,
  own: readonly CableRecord[],
  { facts, measured }: JudgedRecord,
): ReportBasis {
  const { maxSwr, plan, licence, designBands } = antenna;
  const { plane } = facts;
  const referenceOhm = measured.phase === 'none' ? measured.referenceOhm : antenna.referenceOhm;
  return {
    analysisVersion,
    plane,
    referenceOhm,
    maxSwr,
    plan,
    licence,
    designBands,
    residualErrors,
    line: plane === 'feed_point' ? null : lineBasisOf(antenna.feedLine, own),
  };
}

/** The basis by which the sweep's antenna wants it judged at present. */
export async function reportBasisOf(service: Service, record: SweepRecord): Promise<ReportBasis> {
  return (await judgedBy(service, record)).basis;
}

/** The sweep's antenna as it is at present, and the basis by which it wants the sweep judged. */
export async function judgedBy(
  service: Service,
  record: SweepRecord,
): Promise<{ readonly antenna: AntennaRecord; readonly basis: ReportBasis }> {
  const { antennaId } = record.facts;
  const antenna = await service.store.findEditable('antennas', record.clubId, antennaId);
  if (antenna === null) throw new Error(`The antenna ${antennaId} of sweep ${record.id} is gone.`);
  const own = await clubCablesOf(service, record.clubId, antenna.facts.feedLine);
  const residualErrors = await residualErrorsOf(service, record);
  return { antenna, basis: basisOf(antenna.facts, residualErrors, own, record) };
}

/** What is known of the error of the analyzer that took a sweep. */
async function residualErrorsOf(
  service: Service,
  { clubId, facts }: SweepRecord,
): Promise<StatedInstrumentError | null> {
  if (facts.analyzerId === null) return null;
  const analyzer = await service.store.findEditable('analyzers', clubId, facts.analyzerId);
  return analyzer?.facts.residualErrors ?? null;
}

/** The fields by which a stored summary tells what it follows from. */
export function summaryMark({ plane, referenceOhm, residualErrors, line, maxSwr }: ReportBasis) {
  return toSnakeCase({
    plane,
    referenceOhm,
    residualErrors,
    line: line === null ? null : { feedLine: line.feedLine, cables: line.cables, maxSwr },
  });
}

/** What the measures of a sweep follow from beside the sweep itself, as a text to compare. */
export function measuresBasis({ line: _, ...basis }: ReportBasis): string {
  return JSON.stringify(basis);
}

/** The same of a usable-band report; only at the feed point does it follow from the line. */
export function usableMark({ line, ...basis }: ReportBasis) {
  return toSnakeCase(basis);
}

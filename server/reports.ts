import { standingCautions } from '../core/advice/cautions.ts';
import { type Analysis, analyse } from '../core/analysis/analysis.ts';
import {
  instrumentErrorOf,
  type StatedInstrumentError,
} from '../core/analysis/instrument-error.ts';
import { curveOf } from '../core/analysis/refined-swr.ts';
import { analysisVersion, summariseAnalysis } from '../core/analysis/summarise.ts';
import { findPlan } from '../core/bands/plans.ts';
import { usableBands } from '../core/bands/usable.ts';
import type { Assumption } from '../core/formats/read-types.ts';
import { renormaliseSweep } from '../core/network/renormalise.ts';
import type { Sweep } from '../core/sweep.ts';
import { Problem } from './problems.ts';
import type { Service } from './service.ts';
import type { AntennaFacts, SweepFacts, SweepMeasured, SweepRecord } from './store/port.ts';
import { toSweep } from './stored-points.ts';
import { toSnakeCase } from './wire/case.ts';
import { type SweepIdentity, summaryToWire } from './wire/summary.ts';
import { usableToWire } from './wire/usable.ts';

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
}

/** What of a record bears on how its sweep can be judged. */
export interface JudgedRecord {
  readonly facts: Pick<SweepFacts, 'plane'>;
  readonly measured: Pick<SweepMeasured, 'phase' | 'referenceOhm'>;
}

/**
 * The basis by which an antenna wants a sweep judged. A sweep without phase keeps the reference of
 * its file: it cannot be moved to another.
 */
export function basisOf(
  antenna: AntennaFacts,
  residualErrors: StatedInstrumentError | null,
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
  };
}

/** The basis by which the sweep's antenna wants it judged at present. */
export async function reportBasisOf(service: Service, record: SweepRecord): Promise<ReportBasis> {
  const { antennaId } = record.facts;
  const antenna = await service.store.findEditable('antennas', record.clubId, antennaId);
  if (antenna === null) throw new Error(`The antenna ${antennaId} of sweep ${record.id} is gone.`);
  return basisOf(antenna.facts, await residualErrorsOf(service, record), record);
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

/** The analysis from which both the summary and the report on this basis are read. */
export function analyseOn({ referenceOhm, residualErrors }: ReportBasis, sweep: Sweep): Analysis {
  const instrument = residualErrors === null ? null : instrumentErrorOf(residualErrors);
  return analyse(renormaliseSweep(sweep, referenceOhm), instrument);
}

/** The summary of a sweep as it is sent; `analysis` is that on this basis. */
export function summaryOf(
  record: SweepRecord,
  analysis: Analysis,
  assumptions: readonly Assumption[],
  { plane, residualErrors }: ReportBasis,
) {
  const summary = summariseAnalysis(analysis, { plane, assumptions });
  const cautions = [...summary.cautions, ...standingCautions];
  return summaryToWire(identityOf(record), { ...summary, cautions }, residualErrors);
}

/** The usable-band report of a sweep as it is sent; `analysis` is that on this basis. */
export function usableOf(record: SweepRecord, analysis: Analysis, basis: ReportBasis) {
  const { maxSwr, licence, designBands } = basis;
  const plan = findPlan(basis.plan);
  if (plan === null) throw new Error(`The plan ${basis.plan} is gone.`);
  const report = usableBands(curveOf(analysis), plan, { maxSwr, licence, designBands });
  return usableToWire(identityOf(record), basis, report);
}

/** The summary as JSON: the stored text if it was made on this basis, else computed. */
export async function summaryText(
  service: Service,
  record: SweepRecord,
  basis: ReportBasis,
): Promise<string> {
  const stored = await service.store.readSummary(record.clubId, record.id, basis.analysisVersion);
  if (stored !== null && holds(stored.summaryJson, summaryMark(basis))) return stored.summaryJson;
  const analysis = analyseOn(basis, await readSweepOf(service, record));
  const assumptions: Assumption[] = JSON.parse(record.measured.assumptionsJson);
  return JSON.stringify(summaryOf(record, analysis, assumptions, basis));
}

/** The report as JSON: the stored text if it was made on this basis, else computed. */
export async function usableText(
  service: Service,
  record: SweepRecord,
  basis: ReportBasis,
): Promise<string> {
  const stored = await service.store.readSummary(record.clubId, record.id, basis.analysisVersion);
  if (stored !== null && holds(stored.usableJson, toSnakeCase(basis))) return stored.usableJson;
  const analysis = analyseOn(basis, await readSweepOf(service, record));
  return JSON.stringify(usableOf(record, analysis, basis));
}

/** The points of a record as a sweep. */
export async function readSweepOf(service: Service, record: SweepRecord): Promise<Sweep> {
  const points = await service.store.readSweepPoints(record.clubId, record.id);
  if (points === null) throw new Problem('record-corrupt');
  return toSweep(record.measured, points);
}

function identityOf({ id, facts }: SweepRecord): SweepIdentity {
  return { sweepId: id, antennaId: facts.antennaId };
}

/** The fields by which a stored summary tells what it follows from. */
export function summaryMark({ plane, referenceOhm, residualErrors }: ReportBasis) {
  return toSnakeCase({ plane, referenceOhm, residualErrors });
}

/** Whether a stored answer has these fields, so that it is the answer that is asked for. */
function holds(json: string, mark: object): boolean {
  const stored = new Map<string, unknown>(Object.entries(JSON.parse(json)));
  return Object.entries(mark).every(
    ([name, value]) => JSON.stringify(stored.get(name)) === JSON.stringify(value),
  );
}

import { standingCautions } from '../core/advice/cautions.ts';
import { findPlan } from '../core/bands/plans.ts';
import { usableBands } from '../core/bands/usable.ts';
import type { UsableReport } from '../core/bands/usable-report.ts';
import type { Assumption } from '../core/formats/read-types.ts';
import type { Sweep } from '../core/sweep.ts';
import { Problem } from './problems.ts';
import { type ReportBasis, summaryMark, usableMark } from './report-basis.ts';
import type { Service } from './service.ts';
import type { SweepRecord } from './store/port.ts';
import { toSweep } from './stored-points.ts';
import { lineToRemove, type SweepView, viewOf } from './sweep-view.ts';
import { lineToWire } from './wire/line.ts';
import { type SweepIdentity, summaryToWire } from './wire/summary.ts';
import { usableToWire } from './wire/usable.ts';

/** The summary of a sweep as it is sent; `view` is that on this basis. */
export function summaryOf(record: SweepRecord, { summary, line }: SweepView, basis: ReportBasis) {
  const cautions = [...summary.cautions, ...standingCautions];
  return summaryToWire(
    identityOf(record),
    { ...summary, cautions },
    basis.residualErrors,
    line === null || basis.line === null ? null : lineToWire(basis.line, basis.maxSwr, line),
  );
}

/** The usable-band report of a view on this basis. */
export function usableReport({ curve }: SweepView, basis: ReportBasis): UsableReport {
  const { maxSwr, licence, designBands } = basis;
  const plan = findPlan(basis.plan);
  if (plan === null) throw new Error(`The plan ${basis.plan} is gone.`);
  return usableBands(curve, plan, { maxSwr, licence, designBands });
}

/** The usable-band report of a sweep as it is sent; `view` is that on this basis. */
export function usableOf(record: SweepRecord, view: SweepView, basis: ReportBasis) {
  const report = usableReport(view, basis);
  const reasons = view.line?.conditioning?.reasons ?? [];
  const cautions = [...reasons, ...report.cautions];
  return usableToWire(identityOf(record), basis, { ...report, cautions });
}

/** The summary as JSON: the stored text if it was made on this basis, else computed. */
export async function summaryText(
  service: Service,
  record: SweepRecord,
  basis: ReportBasis,
): Promise<string> {
  const stored = await service.store.readSummary(record.clubId, record.id, basis.analysisVersion);
  const mark = { ...summaryMark(basis), antenna_id: record.facts.antennaId };
  if (stored !== null && holds(JSON.parse(stored.summaryJson), mark)) {
    return stored.summaryJson;
  }
  const view = viewOf(basis, await readSweepOf(service, record), assumptionsOf(record));
  return JSON.stringify(summaryOf(record, view, basis));
}

/** The report as JSON: the stored text if it was made on this basis, else computed. */
export async function usableText(
  service: Service,
  record: SweepRecord,
  basis: ReportBasis,
): Promise<string> {
  const stored = await service.store.readSummary(record.clubId, record.id, basis.analysisVersion);
  // What is stored holds at the plane of the sweep.
  const isStored = stored !== null && lineToRemove(basis) === null;
  const mark = { ...usableMark(basis), antenna_id: record.facts.antennaId };
  if (isStored && holds(JSON.parse(stored.usableJson), mark)) return stored.usableJson;
  const sweep = await readSweepOf(service, record);
  const view = viewOf(basis, sweep, assumptionsOf(record), [basis.maxSwr]);
  return JSON.stringify(usableOf(record, view, basis));
}

/** The points of a record as a sweep. */
export async function readSweepOf(
  { store }: Pick<Service, 'store'>,
  record: SweepRecord,
): Promise<Sweep> {
  const points = await store.readSweepPoints(record.clubId, record.id);
  if (points === null) throw new Problem('record-corrupt');
  return toSweep(record.measured, points);
}

/** What was assumed in reading the file of a record. */
export function assumptionsOf({ measured }: SweepRecord): readonly Assumption[] {
  return JSON.parse(measured.assumptionsJson);
}

function identityOf({ id, facts }: SweepRecord): SweepIdentity {
  return { sweepId: id, antennaId: facts.antennaId };
}

/** Whether a stored answer has these fields, so that it is the answer that is asked for. */
function holds(stored: unknown, mark: unknown): boolean {
  if (typeof mark !== 'object' || mark === null || Array.isArray(mark)) {
    return JSON.stringify(stored) === JSON.stringify(mark);
  }
  if (typeof stored !== 'object' || stored === null) return false;
  const fields = new Map<string, unknown>(Object.entries(stored));
  return Object.entries(mark).every(([name, value]) => holds(fields.get(name), value));
}

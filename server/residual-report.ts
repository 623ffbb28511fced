import { type LoadCheck, residualError } from '../core/analysis/check-load.ts';
import {
  type StatedInstrumentError,
  statedInstrumentError,
} from '../core/analysis/instrument-error.ts';
import type { Service } from './service.ts';
import type { AnalyzerRecord, LoadCheckRecord } from './store/port.ts';
import { toSweep } from './stored-points.ts';

/** Checks older than this many are not looked at: a set of loads is a handful. */
const latestChecks = 50;

export interface ResidualReport {
  readonly errors: StatedInstrumentError | null;
  readonly fromChecks: readonly string[];
  readonly detail: string;
}

/** What an analyzer's latest sweeps of known loads tell of its own error. */
export async function residualReportOf(
  service: Service,
  { clubId, id }: AnalyzerRecord,
): Promise<ResidualReport> {
  const page = { limit: latestChecks, after: null };
  const { items } = await service.store.listLoadChecks(clubId, id, page);
  const chosen = latestOfEachLoad(items);
  const checks = await Promise.all(chosen.map((record) => loadCheckOf(service, record)));
  const found = residualError(checks);
  const fromChecks = chosen.map((record) => record.id);
  if (!found.ok) return { errors: null, fromChecks: [], detail: found.error.detail };
  const detail =
    'To have it counted in half-widths, put it into the `residual_errors` of the analyzer. The loads are taken as exact; three different loads (near 50 ohm, open, short) tell all three errors.';
  return { errors: statedInstrumentError(found.value), fromChecks, detail };
}

/** Of each load the newest check, as far as it has the frequencies of the newest of all. */
function latestOfEachLoad(newestFirst: readonly LoadCheckRecord[]): readonly LoadCheckRecord[] {
  const chosen = new Map<number | null, LoadCheckRecord>();
  for (const check of newestFirst) {
    const { loadOhm } = check.facts;
    if (chosen.has(loadOhm) || !haveSameGrid(check, newestFirst[0])) continue;
    chosen.set(loadOhm, check);
  }
  return [...chosen.values()];
}

function haveSameGrid({ measured: a }: LoadCheckRecord, { measured: b }: LoadCheckRecord): boolean {
  return a.points === b.points && a.lowHz === b.lowHz && a.highHz === b.highHz;
}

async function loadCheckOf(service: Service, record: LoadCheckRecord): Promise<LoadCheck> {
  const points = await service.store.readLoadCheckPoints(record.clubId, record.id);
  if (points === null) throw new Error(`The points of check ${record.id} are gone.`);
  const nominalOhm = record.facts.loadOhm ?? Number.POSITIVE_INFINITY;
  return { nominalOhm, sweep: toSweep(record.measured, points) };
}

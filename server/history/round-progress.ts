import { type Agreement, agreementOf } from '../../core/record/agreement/agreement.ts';
import {
  type DriftSweep,
  driftMeasures,
  driftSeries,
} from '../../core/record/drift/drift-series.ts';
import type { HistoryRow } from '../../core/record/measures.ts';
import type { Service } from '../service.ts';
import type { RoundRecord } from '../store/round-store.ts';
import { loadChecksOf, loadSeries } from './load-series.ts';
import { measuredRows } from './measured-rows.ts';

/** What an instrument did in a round so far. */
export interface InstrumentProgress {
  readonly analyzerId: string;
  /** Ids of sweeps, or of load checks. */
  readonly measurements: readonly string[];
}

export interface RoundProgress {
  readonly state: 'planned' | 'under_way' | 'complete' | 'over';
  readonly instruments: readonly InstrumentProgress[];
  /** Empty until two instruments measured often enough. */
  readonly agreements: readonly Agreement[];
}

/** Of the period, so many sweeps or load checks are looked at. */
const mostLookedAt = 400;

/** How far a round has come: who measured, and how well they agree. */
export async function roundProgress(service: Service, round: RoundRecord): Promise<RoundProgress> {
  const { analyzerIds } = round.facts;
  const { measured, series } = await measuredIn(service, round);
  const instruments = analyzerIds.map((analyzerId) => ({
    analyzerId,
    measurements: measured.filter((one) => one.analyzerId === analyzerId).map(({ id }) => id),
  }));
  const isComplete = instruments.every(({ measurements }) => measurements.length > 0);
  // The whole round is one occasion, however many days it takes.
  const occasionMs = Date.parse(round.facts.endsAt) - Date.parse(round.beginsAt);
  return {
    state: isComplete ? 'complete' : stateAt(round, service.now()),
    instruments,
    agreements: driftMeasures.flatMap((name) => agreementOf(series, name, occasionMs) ?? []),
  };
}

interface Measured {
  readonly measured: readonly { readonly analyzerId: string | null; readonly id: string }[];
  readonly series: readonly (readonly DriftSweep[])[];
}

async function measuredIn(service: Service, round: RoundRecord): Promise<Measured> {
  const { clubId, beginsAt, facts } = round;
  const { measures, analyzerIds, endsAt } = facts;
  if ('antennaId' in measures) {
    const rows = await rowsOf(service, round, measures.antennaId);
    const measured = rows.map(({ analyzerId, sweepId }) => ({ analyzerId, id: sweepId }));
    return { measured, series: seriesOf(rows) };
  }
  const checks = await loadChecksOf(service, clubId, analyzerIds, (check) => {
    const at = check.facts.measuredAt ?? check.receivedAt;
    return check.facts.loadOhm === measures.loadOhm && at >= beginsAt && at < endsAt;
  });
  const measured = checks.map(({ id, facts: { analyzerId } }) => ({ analyzerId, id }));
  return { measured, series: await loadSeries(service, checks) };
}

function stateAt({ beginsAt, facts }: RoundRecord, nowMs: number): RoundProgress['state'] {
  if (nowMs < Date.parse(beginsAt)) return 'planned';
  return nowMs < Date.parse(facts.endsAt) ? 'under_way' : 'over';
}

/** What the round's instruments measured of the antenna, oldest first. */
async function rowsOf(
  service: Service,
  { clubId, beginsAt, facts }: RoundRecord,
  antennaId: string,
): Promise<readonly HistoryRow[]> {
  const antenna = await service.store.findEditable('antennas', clubId, antennaId);
  if (antenna === null) throw new Error(`The antenna ${antennaId} of a round is gone.`);
  const period = { from: beginsAt, until: facts.endsAt };
  const measured = await measuredRows(service, antenna, period, mostLookedAt, 'oldest_first');
  return measured
    .map(({ row }) => row)
    .filter(({ analyzerId }) => facts.analyzerIds.some((id) => id === analyzerId));
}

function seriesOf(rows: readonly HistoryRow[]): Measured['series'] {
  const bands = [...new Set(rows.flatMap(({ measures }) => measures.bands.map((b) => b.band)))];
  const planes = [...new Set(rows.map(({ measures }) => measures.plane))];
  return planes.flatMap((plane) => {
    const own = rows.filter(({ measures }) => measures.plane === plane);
    return bands.map((band) => driftSeries(own, band));
  });
}

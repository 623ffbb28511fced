import { type Agreement, agreementOf } from '../../core/record/agreement/agreement.ts';
import { driftMeasures, driftSeries } from '../../core/record/drift/drift-series.ts';
import type { HistoryRow } from '../../core/record/measures.ts';
import type { Service } from '../service.ts';
import type { LoadCheckRecord } from '../store/port.ts';
import type { RoundRecord } from '../store/round-store.ts';
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
  /** Of an antenna's round; empty until two instruments measured it often enough. */
  readonly agreements: readonly Agreement[];
}

/** Of the period, so many sweeps or load checks are looked at. */
const mostLookedAt = 400;

/** How far a round has come: who measured, and how well they agree. */
export async function roundProgress(service: Service, round: RoundRecord): Promise<RoundProgress> {
  const { measures, analyzerIds } = round.facts;
  const rows = 'antennaId' in measures ? await rowsOf(service, round, measures.antennaId) : [];
  const measured =
    'antennaId' in measures
      ? rows.map(({ analyzerId, sweepId }) => ({ analyzerId, id: sweepId }))
      : await loadChecksOf(service, round, measures.loadOhm);
  const instruments = analyzerIds.map((analyzerId) => ({
    analyzerId,
    measurements: measured.filter((one) => one.analyzerId === analyzerId).map(({ id }) => id),
  }));
  const isComplete = instruments.every(({ measurements }) => measurements.length > 0);
  const state = isComplete ? 'complete' : stateAt(round, service.now());
  return { state, instruments, agreements: agreementsOf(rows, round) };
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

async function loadChecksOf(
  { store }: Service,
  { clubId, beginsAt, facts }: RoundRecord,
  loadOhm: number | null,
): Promise<readonly { readonly analyzerId: string; readonly id: string }[]> {
  const page = { limit: mostLookedAt, after: null };
  const isOfRound = (check: LoadCheckRecord) => {
    const at = check.facts.measuredAt ?? check.receivedAt;
    return check.facts.loadOhm === loadOhm && at >= beginsAt && at < facts.endsAt;
  };
  const lists = await Promise.all(
    facts.analyzerIds.map((id) => store.listLoadChecks(clubId, id, page)),
  );
  return lists
    .flatMap(({ items }) => items.filter(isOfRound))
    .map(({ id, facts: { analyzerId } }) => ({ id, analyzerId }));
}

/** The whole round is one occasion, however many days it takes. */
function agreementsOf(
  rows: readonly HistoryRow[],
  { beginsAt, facts }: RoundRecord,
): readonly Agreement[] {
  const occasionMs = Date.parse(facts.endsAt) - Date.parse(beginsAt);
  const bands = [...new Set(rows.flatMap(({ measures }) => measures.bands.map((b) => b.band)))];
  const planes = [...new Set(rows.map(({ measures }) => measures.plane))];
  const series = planes.flatMap((plane) => {
    const own = rows.filter(({ measures }) => measures.plane === plane);
    return bands.map((band) => driftSeries(own, band));
  });
  return driftMeasures.flatMap((measure) => agreementOf(series, measure, occasionMs) ?? []);
}

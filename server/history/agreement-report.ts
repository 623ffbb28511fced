import { type Agreement, agreementOf } from '../../core/record/agreement/agreement.ts';
import {
  type BiasOverAntennas,
  biasesOverAntennas,
} from '../../core/record/agreement/over-antennas.ts';
import {
  type DriftSweep,
  driftMeasures,
  driftSeries,
} from '../../core/record/drift/drift-series.ts';
import type { Service } from '../service.ts';
import { allAntennas } from './due-tests.ts';
import { loadChecksOf, loadSeries } from './load-series.ts';
import { measuredRows } from './measured-rows.ts';

/** Of each antenna so many of the newest sweeps are looked at. */
export const mostAgreementSweeps = 400;

/** A club has no more that it would compare. */
const mostAnalyzers = 200;

export interface ClubAgreement {
  /** From occasions on which instruments met. */
  readonly agreements: readonly Agreement[];
  /** Likewise, from checks of one load. */
  readonly onLoads: Agreement | null;
  /** From every antenna's own series. */
  readonly biases: readonly BiasOverAntennas[];
}

/** How well a club's instruments agree, from all its antennas. */
export async function clubAgreement(service: Service, clubId: string): Promise<ClubAgreement> {
  const series: (readonly DriftSweep[])[] = [];
  for (const antenna of await allAntennas(service, clubId)) {
    const newest = await measuredRows(service, antenna, {}, mostAgreementSweeps);
    const rows = newest.map(({ row }) => row).toReversed();
    for (const plane of ['measured', 'feed_point'] as const) {
      const own = rows.filter(({ measures }) => measures.plane === plane);
      const bands = new Set(own.flatMap(({ measures }) => measures.bands.map(({ band }) => band)));
      series.push(...[...bands].map((band) => driftSeries(own, band)));
    }
  }
  const checks = await loadChecksOf(
    service,
    clubId,
    await analyzerIds(service, clubId),
    () => true,
  );
  return {
    onLoads: agreementOf(await loadSeries(service, checks), 'resistance_ohm'),
    agreements: driftMeasures.flatMap((measure) => agreementOf(series, measure) ?? []),
    biases: driftMeasures.flatMap((measure) => biasesOverAntennas(series, measure)),
  };
}

async function analyzerIds({ store }: Service, clubId: string): Promise<readonly string[]> {
  const page = { limit: mostAnalyzers, after: null };
  const { items } = await store.listEditables('analyzers', clubId, page);
  return items.map(({ id }) => id);
}

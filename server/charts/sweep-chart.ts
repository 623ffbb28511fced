import type { ChartStyle } from '../../core/chart/chart-style.ts';
import { impedanceChart } from '../../core/chart/impedance-chart.ts';
import { smithChart } from '../../core/chart/smith-chart.ts';
import type { SweepChart } from '../../core/chart/sweep-chart.ts';
import { swrChart } from '../../core/chart/swr-chart.ts';
import { Problem } from '../problems.ts';
import type { ReportBasis } from '../report-basis.ts';
import { assumptionsOf, readSweepOf, usableReport } from '../reports.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord, SweepRecord } from '../store/port.ts';
import { viewOf } from '../sweep-view.ts';

export const sweepChartKinds = ['swr', 'impedance', 'smith'] as const;
export type SweepChartKind = (typeof sweepChartKinds)[number];

/** Refuses a chart that needs more of the phase than the sweep has. Throws `phase-unknown`. */
export function refuseWithoutPhase(kind: SweepChartKind, { measured }: SweepRecord): void {
  if (kind === 'swr' || measured.phase === 'signed') return;
  if (kind === 'impedance' && measured.phase === 'unsigned') return;
  const detail =
    measured.phase === 'none'
      ? 'Without phase a sweep has no resistance and reactance; `kind=swr` can be drawn.'
      : 'Without the sign of its reactance a sweep has no place on the chart; `kind=swr` and `kind=impedance` can be drawn.';
  throw new Problem('phase-unknown', {
    detail,
    errors: [{ detail: 'Not known of this sweep.', parameter: 'kind' }],
  });
}

export interface AskedSweepChart {
  readonly kind: SweepChartKind;
  readonly record: SweepRecord;
  readonly antenna: AntennaRecord;
  readonly basis: ReportBasis;
  readonly tableUrl: string;
  readonly style: ChartStyle;
}

/** Draws a sweep on a basis. Throws `plane-unavailable` where the line cannot be removed. */
export async function sweepChartSvg(service: Service, asked: AskedSweepChart): Promise<string> {
  const { kind, record, antenna, basis, tableUrl, style } = asked;
  const measured = await readSweepOf(service, record);
  const view = viewOf(basis, measured, assumptionsOf(record), [basis.maxSwr]);
  const { sweep, summary } = view;
  const chart: SweepChart = {
    heading: { title: antenna.facts.name, subtitle: subtitleOf(record, basis), tableUrl },
    sweep,
    summary,
    report: usableReport(view, basis),
  };
  if (kind === 'impedance' && sweep.phase !== 'none') {
    return impedanceChart({ ...chart, sweep }, style);
  }
  if (kind === 'smith' && sweep.phase !== 'none') return smithChart({ ...chart, sweep }, style);
  return swrChart(chart, style);
}

/** When it was measured, and where what is drawn holds. */
function subtitleOf({ facts, receivedAt }: SweepRecord, { plane }: ReportBasis): string {
  const time = (facts.measuredAt ?? receivedAt).slice(0, 16).replace('T', ' ');
  const calculated = plane === facts.plane ? '' : 'calculated for ';
  const where = plane === 'feed_point' ? 'the feed point' : 'the analyzer';
  return [
    `${facts.measuredAt === null ? 'received ' : ''}${time} UTC`,
    `${calculated === '' ? 'at ' : calculated}${where}`,
    ...(facts.invented ? ['invented'] : []),
  ].join(', ');
}

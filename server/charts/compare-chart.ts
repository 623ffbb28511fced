import type { ChartStyle } from '../../core/chart/chart-style.ts';
import { compareChart } from '../../core/chart/compare-chart.ts';
import { renormaliseSweep } from '../../core/network/renormalise.ts';
import { comparison } from '../history/comparison.ts';
import type { ReportBasis } from '../report-basis.ts';
import { readSweepOf } from '../reports.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord, SweepRecord } from '../store/port.ts';

/** One side of a comparison with the basis that its sweep is judged on. */
export interface JudgedSweep {
  readonly record: SweepRecord;
  readonly antenna: AntennaRecord;
  readonly basis: ReportBasis;
}

export interface AskedCompareChart {
  readonly first: JudgedSweep;
  readonly second: JudgedSweep;
  readonly tableUrl: string;
  readonly style: ChartStyle;
}

/** Draws two sweeps, each at the plane at which it was taken. */
export async function compareChartSvg(
  service: Service,
  { first, second, tableUrl, style }: AskedCompareChart,
): Promise<string> {
  const found = await comparison(service, first.record, second.record);
  const where = first.basis.plane === 'feed_point' ? 'the feed point' : 'the analyzer';
  return compareChart(
    {
      heading: {
        title: first.antenna.facts.name,
        subtitle: `two sweeps, at ${where}${first.record.facts.invented ? ', invented' : ''}`,
        tableUrl,
      },
      first: await named(service, first),
      second: await named(service, second),
      referenceOhm: first.basis.referenceOhm,
      comparison: found,
    },
    style,
  );
}

async function named(service: Service, { record, basis }: JudgedSweep) {
  const time = record.facts.measuredAt ?? record.receivedAt;
  const sweep = renormaliseSweep(await readSweepOf(service, record), basis.referenceOhm);
  return { name: time.slice(0, 16).replace('T', ' '), sweep };
}

import type { ChartStyle } from '../../core/chart/chart-style.ts';
import { reflectionDistanceChart } from '../../core/chart/reflection-distance-chart.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { AntennaRecord, LineCheckRecord } from '../store/port.ts';
import type { LineCheckReportWire, TraceWire } from '../wire/line-check.ts';

export interface AskedLineCheckChart {
  readonly antenna: AntennaRecord;
  readonly record: LineCheckRecord;
  readonly tableUrl: string;
  readonly style: ChartStyle;
}

/** Draws what a line check found, from what is stored of it. */
export async function lineCheckChartSvg(
  service: Service,
  { antenna, record, tableUrl, style }: AskedLineCheckChart,
): Promise<string> {
  const stored = await service.store.readLineCheckTrace(record.clubId, record.id);
  if (stored === null) throw new Problem('record-corrupt');
  const trace: TraceWire = JSON.parse(stored);
  const report: LineCheckReportWire = JSON.parse(record.reportJson);
  const time = (record.facts.measuredAt ?? record.receivedAt).slice(0, 16).replace('T', ' ');
  const farEnd = record.tested.farEnd === 'short' ? 'shorted' : record.tested.farEnd;
  const compensated = trace.loss_compensated ? ', raised by the loss on the way' : '';
  const subtitle = `${time} UTC, far end ${farEnd}${compensated}`;
  return reflectionDistanceChart(
    {
      heading: { title: `${antenna.facts.name}: feed line`, subtitle, tableUrl },
      stepM: trace.step_m,
      magnitude: trace.magnitude,
      velocityFactor: report.velocity_factor,
      reflectionFloor: report.reflection_floor,
      places: report.discontinuities.map((place) => ({
        distanceM: place.distance_m,
        distanceU95M: place.distance_u95_m,
        magnitude: trace.loss_compensated
          ? (place.magnitude_there ?? place.magnitude)
          : place.magnitude,
        kind: place.kind,
      })),
    },
    style,
  );
}

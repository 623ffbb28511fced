import { frequencyUnit } from '../../core/chart/frequency-scale.ts';
import type { HistoryChart, HistoryPoint, HistorySeries } from '../../core/chart/history-chart.ts';
import type { BandMeasures, HistoryRow } from '../../core/record/measures.ts';
import { followResonances } from '../../core/record/tracks.ts';
import { startsEra } from '../../core/record/work.ts';
import { measuredPage } from '../history/measured-rows.ts';
import type { Service } from '../service.ts';
import type { HistoryFilter } from '../store/history-store.ts';
import type { AntennaRecord } from '../store/port.ts';

export const historyMeasures = ['resonance', 'minimum', 'swr', 'width'] as const;
export type HistoryMeasure = (typeof historyMeasures)[number];

/** Older sweeps than this many are left out, and the chart says so. */
const mostSweeps = 500;

export interface AskedHistoryChart {
  readonly antenna: AntennaRecord;
  readonly band: string;
  readonly measure: HistoryMeasure;
  readonly filter: HistoryFilter;
  readonly tableUrl: string;
}

/** What a chart of a measure of an antenna shows. */
export async function historyChartOf(
  service: Service,
  { antenna, band, measure, filter, tableUrl }: AskedHistoryChart,
): Promise<HistoryChart> {
  const page = await measuredPage(service, antenna, filter, { limit: mostSweeps, after: null });
  const rows = page.items.map(({ row }) => row).toReversed();
  const series = measure === 'resonance' ? tracks(rows, band) : [oneSeries(rows, band, measure)];
  const work = await service.store.allWork(antenna.clubId, antenna.id);
  const highest = Math.max(0, ...series.flatMap(({ points }) => points.map(({ value }) => value)));
  const unit = frequencyUnit(highest);
  return {
    heading: {
      title: antenna.facts.name,
      subtitle: `${band}, each sweep at the plane at which it was taken`,
      tableUrl,
    },
    series,
    ...axisOf(measure, unit),
    eras: work
      .filter(({ facts }) => startsEra(facts.kind))
      .map(({ doneAt, facts }) => ({
        atMs: Date.parse(doneAt),
        name: facts.kind.replaceAll('_', ' '),
      })),
    note: page.next === null ? null : `Only the newest ${mostSweeps} sweeps are drawn.`,
  };
}

function axisOf(measure: HistoryMeasure, { name, hertz }: ReturnType<typeof frequencyUnit>) {
  switch (measure) {
    case 'resonance':
      return { measure: `Resonance (${name})`, unit: hertz };
    case 'minimum':
      return { measure: `Frequency of least SWR (${name})`, unit: hertz };
    case 'swr':
      return { measure: 'Least SWR', unit: 1 };
    case 'width':
      return { measure: 'Width within the SWR limit (kHz)', unit: 1e3 };
  }
}

/** Each resonance of the band as it is followed from sweep to sweep. */
function tracks(rows: readonly HistoryRow[], band: string): readonly HistorySeries[] {
  return followResonances(rows, band).map(({ kind, points }) => ({
    name: `${kind} resonance`,
    points: points.map(({ row, resonance }) =>
      pointOf(row, resonance.frequencyHz, resonance.frequencyU95Hz),
    ),
  }));
}

function oneSeries(
  rows: readonly HistoryRow[],
  band: string,
  measure: Exclude<HistoryMeasure, 'resonance'>,
): HistorySeries {
  const points = rows.flatMap((row) => {
    const measures = row.measures.bands.find((one) => one.band === band);
    const found = measures === undefined ? null : measured(measures, measure);
    return found === null ? [] : [pointOf(row, ...found)];
  });
  return { name: band, points };
}

/** The value and its half-width; null where it was not measured, or only bounded by the sweep's end. */
function measured(
  { minimum, span }: BandMeasures,
  measure: Exclude<HistoryMeasure, 'resonance'>,
): readonly [number, number | null] | null {
  if (measure === 'width') {
    if (span === null || span.lowOpen || span.highOpen) return null;
    return [span.widthHz, span.widthU95Hz];
  }
  if (minimum === null || minimum.atEdge) return null;
  return measure === 'swr'
    ? [minimum.swr, minimum.swrU95]
    : [minimum.frequencyHz, minimum.frequencyU95Hz];
}

function pointOf(row: HistoryRow, value: number, u95: number | null): HistoryPoint {
  const { measuredAtMs, condition, eraIndex } = row;
  return { atMs: measuredAtMs, value, u95, weather: condition ?? 'unknown', eraIndex };
}

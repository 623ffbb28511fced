import { studentQuantile } from '../statistics/distributions.ts';
import { mannKendall } from '../statistics/mann-kendall.ts';
import { median, robustScale } from '../statistics/robust.ts';
import { theilSen } from '../statistics/theil-sen.ts';
import type { DriftMeasure } from './drift-series.ts';
import type { SeriesModel } from './series-model.ts';

/** An estimate with the limits of its 95 % interval, null where there is too little for one. */
export interface Interval {
  readonly value: number;
  readonly low: number | null;
  readonly high: number | null;
}

/** A measure through one era. All changes are relative (0.01 is 1 %), of dry sweeps where known. */
export interface EraTrend {
  readonly measure: DriftMeasure;
  readonly eraIndex: number;
  readonly sweeps: number;
  /** Milliseconds since 1970, UTC. */
  readonly fromMs: number;
  readonly untilMs: number;
  /** Median as instruments agree on it, in the measure's unit. */
  readonly typical: number;
  /** Theil–Sen, by year; null below three sweeps or within one day. */
  readonly trendPerYear: Interval | null;
  /** Mann–Kendall: how likely so steady an order is without a trend; null below three sweeps. */
  readonly trendProbability: number | null;
  /** Standard deviation about the trend; null below three sweeps. */
  readonly scatter: number | null;
  /** Wet less dry; null unless there are two of each. */
  readonly wetMinusDry: Interval | null;
}

const yearMs = 365.25 * 24 * 3600 * 1000;
const dayYears = 1 / 365.25;

/** The eras of a measure, oldest first. */
export function eraTrends(model: SeriesModel): readonly EraTrend[] {
  const eras = [...new Set(model.sweeps.map(({ eraIndex }) => eraIndex))];
  return eras.map((era) => eraTrend(model, era));
}

function eraTrend({ measure, sweeps, corrected }: SeriesModel, era: number): EraTrend {
  const places = sweeps.flatMap(({ eraIndex }, i) => (eraIndex === era ? [i] : []));
  const notWet = places.filter((i) => sweeps[i].wetness !== 'wet');
  const judged = notWet.length >= 3 ? notWet : places;
  const years = judged.map(
    (i) => (sweeps[i].measuredAtMs - sweeps[places[0]].measuredAtMs) / yearMs,
  );
  const values = judged.map((i) => corrected[i]);
  const isEnough = judged.length >= 3 && years[years.length - 1] - years[0] >= dayYears;
  const trend = isEnough ? theilSen(years, values) : null;
  const slope = trend?.slope ?? 0;
  const rest = (i: number) =>
    corrected[i] - (slope * (sweeps[i].measuredAtMs - sweeps[places[0]].measuredAtMs)) / yearMs;
  return {
    measure,
    eraIndex: era,
    sweeps: places.length,
    fromMs: sweeps[places[0]].measuredAtMs,
    untilMs: sweeps[places[places.length - 1]].measuredAtMs,
    typical: Math.exp(median(values)),
    trendPerYear:
      trend === null ? null : { value: slope, low: trend.slopeLow, high: trend.slopeHigh },
    trendProbability: isEnough ? mannKendall(values).probability : null,
    scatter: judged.length < 3 ? null : robustScale(judged.map(rest)),
    wetMinusDry: difference(
      places.filter((i) => sweeps[i].wetness === 'wet').map(rest),
      places.filter((i) => sweeps[i].wetness === 'dry').map(rest),
    ),
  };
}

/** Difference of medians; the interval from both robust scales, as Student's for their means. */
function difference(wet: readonly number[], dry: readonly number[]): Interval | null {
  if (wet.length < 2 || dry.length < 2) return null;
  const value = median(wet) - median(dry);
  const degrees = wet.length + dry.length - 2;
  const variance =
    ((wet.length - 1) * robustScale(wet) ** 2 + (dry.length - 1) * robustScale(dry) ** 2) / degrees;
  // A median scatters by sqrt(pi/2) more than a mean.
  const spread = Math.sqrt((Math.PI / 2) * variance * (1 / wet.length + 1 / dry.length));
  const reach = studentQuantile(0.975, degrees) * spread;
  return { value, low: value - reach, high: value + reach };
}

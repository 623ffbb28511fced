import type { BandMeasures, HistoryRow, MeasuredResonance } from './measures.ts';
import { studentQuantile } from './statistics/distributions.ts';
import { median, robustScale } from './statistics/robust.ts';
import { followResonances } from './tracks.ts';

/** A value that later sweeps are held against. */
export interface BaselineValue {
  readonly value: number;
  /** Half-width of a 95 % interval; null if unknown. */
  readonly u95: number | null;
}

export interface BaselineResonance {
  readonly kind: MeasuredResonance['kind'];
  readonly frequencyHz: BaselineValue;
  readonly resistanceOhm: BaselineValue | null;
  readonly swr: BaselineValue | null;
  readonly q: BaselineValue | null;
}

/** What one band of an antenna was like at the beginning of an era. */
export interface BandBaseline {
  readonly band: string;
  /** `chosen`: by a member. `dry`: the first good sweeps in dry weather. `any`: there is no such one. */
  readonly source: 'chosen' | 'dry' | 'any';
  readonly sweepIds: readonly string[];
  /** Those that at least half of the sweeps have. */
  readonly resonances: readonly BaselineResonance[];
  readonly minimumHz: BaselineValue | null;
  readonly minimumSwr: BaselineValue | null;
  readonly spanWidthHz: BaselineValue | null;
  readonly usableFraction: BaselineValue;
}

/** An automatic baseline is made of so many sweeps at most (our choice). */
const mostSweeps = 3;
/** Flags of sweeps that no baseline should rest on. */
const spoiling = new Set([
  'passivity_broken',
  'noisy',
  'looks_open_or_short',
  'values_clipped',
  'sweep_too_narrow',
]);

/** Whether a sweep of a band is good enough to stand for the antenna. */
export function isGoodBand({ flags, sweptFraction, minimum }: BandMeasures): boolean {
  const isSound = !flags.some((flag) => spoiling.has(flag));
  return isSound && sweptFraction >= 0.5 && minimum !== null && !minimum.atEdge;
}

/**
 * The baseline of each band of one era: the median of the first good sweeps in dry weather, else of
 * the first good ones whatever the weather was. `rows` ascend in time and are of one era and plane.
 */
export function automaticBaseline(rows: readonly HistoryRow[]): readonly BandBaseline[] {
  return bandsIn(rows).flatMap((band) => {
    const good = rows.filter((row) => {
      const measures = bandIn(row, band);
      return measures !== null && isGoodBand(measures);
    });
    const dry = good.filter(({ condition }) => condition === 'dry');
    const source = dry.length > 0 ? 'dry' : 'any';
    const taken = (dry.length > 0 ? dry : good).slice(0, mostSweeps);
    return taken.length === 0 ? [] : [baselineOf(taken, band, source)];
  });
}

/** The baseline that these sweeps make; chosen ones count as they are. */
export function chosenBaseline(rows: readonly HistoryRow[]): readonly BandBaseline[] {
  return bandsIn(rows).map((band) =>
    baselineOf(
      rows.filter((row) => bandIn(row, band) !== null),
      band,
      'chosen',
    ),
  );
}

function bandsIn(rows: readonly HistoryRow[]): readonly string[] {
  return [...new Set(rows.flatMap(({ measures }) => measures.bands.map(({ band }) => band)))];
}

function bandIn({ measures }: HistoryRow, band: string): BandMeasures | null {
  return measures.bands.find((one) => one.band === band) ?? null;
}

function baselineOf(
  rows: readonly HistoryRow[],
  band: string,
  source: BandBaseline['source'],
): BandBaseline {
  const measures = rows.flatMap((row) => bandIn(row, band) ?? []);
  const minima = measures.flatMap(({ minimum }) => minimum ?? []);
  const spans = measures.flatMap(({ span }) =>
    span === null || span.lowOpen || span.highOpen ? [] : [span],
  );
  const tracks = followResonances(rows, band).filter(
    ({ points }) => points.length >= rows.length / 2,
  );
  return {
    band,
    source,
    sweepIds: rows.map(({ sweepId }) => sweepId),
    resonances: tracks.map(({ kind, points }) => {
      const seen = points.map(({ resonance }) => resonance);
      return {
        kind,
        frequencyHz: middleOf(seen.map((r) => [r.frequencyHz, r.frequencyU95Hz])),
        resistanceOhm: middle(seen.map((r) => [r.resistanceOhm, r.resistanceU95Ohm])),
        swr: middle(seen.map((r) => [r.swr, r.swrU95])),
        q: middle(seen.map((r) => [r.q, r.qU95])),
      };
    }),
    minimumHz: middle(minima.map((m) => [m.frequencyHz, m.frequencyU95Hz])),
    minimumSwr: middle(minima.map((m) => [m.swr, m.swrU95])),
    spanWidthHz: middle(spans.map((s) => [s.widthHz, s.widthU95Hz])),
    usableFraction: middleOf(measures.map((m) => [m.usableFraction, null])),
  };
}

type Known = readonly [value: number, u95: number | null];
type MaybeKnown = readonly [value: number | null, u95: number | null];

function middle(values: readonly MaybeKnown[]): BaselineValue | null {
  const known = values.flatMap(([value, u95]): Known[] => (value === null ? [] : [[value, u95]]));
  return known.length === 0 ? null : middleOf(known);
}

/**
 * The median, with the middle half-width of the values joined to that of their scatter: what an
 * instrument is off by does not average out. The standard error of a median is sqrt(pi/2) that of the
 * mean (normal values, large samples: standard theory), times Student's t.
 */
function middleOf(values: readonly Known[]): BaselineValue {
  const figures = values.map(([value]) => value);
  const value = median(figures);
  const halfWidths = values.flatMap(([, u95]) => u95 ?? []);
  if (halfWidths.length < values.length) return { value, u95: null };
  return { value, u95: Math.hypot(median(halfWidths), scatterU95(figures)) };
}

function scatterU95(values: readonly number[]): number {
  const count = values.length;
  if (count === 1) return 0;
  if (count === 2) return Math.abs(values[1] - values[0]) / 2;
  const error = (Math.sqrt(Math.PI / 2) * robustScale(values)) / Math.sqrt(count);
  return studentQuantile(0.975, count - 1) * error;
}

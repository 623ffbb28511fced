import { median, robustScale } from '../statistics/robust.ts';
import { type Candidate, candidatesOf, isBorneOut } from './candidates.ts';
import type { DriftMeasure, DriftSweep } from './drift-series.ts';
import { type ModelColumn, type RidgeFit, ridgeFit } from './ridge-fit.ts';
import { type UsualScatter, usualScatter } from './usual-scatter.ts';

/** What is known of an instrument beforehand, in the logarithm of a measure. */
export interface KnownBias {
  readonly bias: number;
  readonly standardError: number;
}
export type KnownBiases = ReadonlyMap<string, Readonly<Partial<Record<DriftMeasure, KnownBias>>>>;

/** A change that neither scatter nor instruments, weather or the year explain. Changes are relative. */
export interface Effect extends Candidate {
  /** Of the logarithm: in all for a step or the wet, by year for a trend. */
  readonly factor: number;
  readonly standardError: number;
  /** By how much chi-squared falls with it. */
  readonly gain: number;
}

export interface InstrumentBias {
  readonly analyzerId: string;
  readonly bias: number;
  readonly standardError: number;
  readonly sweeps: number;
}

/** One measure of one antenna through time, taken apart. */
export interface SeriesModel {
  readonly measure: DriftMeasure;
  readonly sweeps: readonly DriftSweep[];
  /** Logarithms, less what instruments and the year explain. */
  readonly corrected: Float64Array;
  /** What is left of the logarithms for instruments and scatter to explain. */
  readonly ofInstruments: Float64Array;
  /** Standard deviation of the logarithm from one sweep to the next. */
  readonly scatter: number;
  readonly biases: readonly InstrumentBias[];
  readonly effects: readonly Effect[];
}

const yearMs = 365.25 * 24 * 3600 * 1000;
const normal95 = 1.959964;
/** Beyond four standard deviations: many places are tried, and the year's weather is not independent noise. */
const leastGain = 20;
/** For what rests on two sweeps. */
const leastGainOfTwo = 32;
const mostEffects = 5;
/** A lone value so many standard deviations off counts for little. */
const wild = 5;

/**
 * Takes a measure apart: a level for each era, a bias for each instrument and the course of the year
 * and of wet weather, each kept near what is usual; then, one after the other, the trend, step or
 * wet-only change that explains most of the rest, as long as it is both sure and worth a word.
 * Null below three values. `sweeps` ascend in time.
 */
export function seriesModel(
  sweeps: readonly DriftSweep[],
  measure: DriftMeasure,
  known: KnownBiases,
): SeriesModel | null {
  const measured = sweeps.filter(({ values }) => values[measure] !== undefined);
  if (measured.length < 3) return null;
  const usual = usualScatter[measure];
  const base = baseColumns(measured, usual, known, measure);
  const y = Float64Array.from(measured, (sweep) => logOf(sweep, measure) - base.offsetOf(sweep));
  const { weights, scatter } = weighted(measured, measure, base.columns, y, usual);
  let fit = ridgeFit(base.columns, y, weights);
  const effects: { candidate: Candidate; gain: number }[] = [];
  const columns = () => [...base.columns, ...effects.map(({ candidate }) => columnOf(candidate))];
  const candidates = candidatesOf(measured);
  const wetColumn = base.columns.length - 1;
  while (effects.length < mostEffects) {
    // The usual wet may have taken up what is tried as wet-only: it is put back.
    const wetFactor = fit.factors[wetColumn];
    const withWet = fit.residuals.map(
      (rest, i) => rest + wetFactor * base.columns[wetColumn].values[i],
    );
    const best = bestOf(candidates, fit, usual, measured, withWet);
    if (best === null) break;
    effects.push(best);
    fit = ridgeFit(columns(), y, weights);
  }
  const corrected = y.map((value, i) =>
    base.nuisance.reduce((rest, k) => rest - fit.factors[k] * base.columns[k].values[i], value),
  );
  const biasOf = new Map(
    base.instruments.map((id, i) => [id, fit.factors[base.firstInstrument + i]]),
  );
  return {
    measure,
    sweeps: measured,
    corrected,
    ofInstruments: fit.residuals.map(
      (rest, i) =>
        rest + (biasOf.get(measured[i].analyzerId ?? '') ?? 0) + base.offsetOf(measured[i]),
    ),
    scatter,
    biases: base.instruments.map((analyzerId, i) => ({
      analyzerId,
      bias: fit.factors[base.firstInstrument + i] + (known.get(analyzerId)?.[measure]?.bias ?? 0),
      standardError: fit.standardErrors[base.firstInstrument + i],
      sweeps: measured.filter((sweep) => sweep.analyzerId === analyzerId).length,
    })),
    effects: effects.map(({ candidate, gain }, i) => ({
      ...candidate,
      gain,
      factor: fit.factors[base.columns.length + i],
      standardError: fit.standardErrors[base.columns.length + i],
    })),
  };
}

function logOf({ values }: DriftSweep, measure: DriftMeasure): number {
  return Math.log(values[measure]?.value ?? Number.NaN);
}

function columnOf({ column }: Candidate): ModelColumn {
  return { values: column, priorPrecision: 0 };
}

function baseColumns(
  sweeps: readonly DriftSweep[],
  usual: UsualScatter,
  known: KnownBiases,
  measure: DriftMeasure,
) {
  const column = (of: (sweep: DriftSweep) => number, spread: number): ModelColumn => ({
    values: Float64Array.from(sweeps, of),
    priorPrecision: spread === 0 ? 0 : 1 / spread ** 2,
  });
  const eras = [...new Set(sweeps.map(({ eraIndex }) => eraIndex))];
  const instruments = [...new Set(sweeps.flatMap(({ analyzerId }) => analyzerId ?? []))];
  const angle = ({ measuredAtMs }: DriftSweep) => (2 * Math.PI * measuredAtMs) / yearMs;
  const columns = [
    ...eras.map((era) => column(({ eraIndex }) => Number(eraIndex === era), 0)),
    ...instruments.map((id) =>
      column(
        ({ analyzerId }) => Number(analyzerId === id),
        known.get(id)?.[measure]?.standardError ?? usual.instrument,
      ),
    ),
    column((sweep) => Math.cos(angle(sweep)), usual.season),
    column((sweep) => Math.sin(angle(sweep)), usual.season),
    column(({ wetness }) => Number(wetness === 'wet'), usual.wet),
  ];
  return {
    columns,
    instruments,
    firstInstrument: eras.length,
    nuisance: columns.map((_, k) => k).slice(eras.length, -1),
    offsetOf: ({ analyzerId }: DriftSweep) =>
      analyzerId === null ? 0 : (known.get(analyzerId)?.[measure]?.bias ?? 0),
  };
}

/** Weights from each half-width and from the scatter that changes between neighbours show. */
function weighted(
  sweeps: readonly DriftSweep[],
  measure: DriftMeasure,
  columns: readonly ModelColumn[],
  y: Float64Array,
  usual: UsualScatter,
) {
  const ownVariance = Float64Array.from(sweeps, ({ values }) => {
    const { value = 1, u95 = null } = values[measure] ?? {};
    return ((u95 ?? 0) / normal95 / value) ** 2;
  });
  const flat = ridgeFit(
    columns,
    y,
    ownVariance.map((variance) => 1 / (variance + usual.sweep ** 2)),
  );
  const steps = neighbourSteps(sweeps, flat.residuals);
  const seen = steps.length === 0 ? 0 : Math.max(robustScale(steps) ** 2 - median(ownVariance), 0);
  // As if four sweeps of a usual antenna had been seen before.
  const variance = (4 * usual.sweep ** 2 + steps.length * seen) / (4 + steps.length);
  const scatter = Math.sqrt(variance);
  const weights = ownVariance.map(
    (own, i) => (isLone(sweeps, flat.residuals, i, wild * scatter) ? 0.01 : 1) / (own + variance),
  );
  return { weights, scatter };
}

/** Changes from each sweep to the next in the same weather and era, scaled to one of both. */
function neighbourSteps(sweeps: readonly DriftSweep[], residuals: Float64Array): readonly number[] {
  return sweeps.flatMap(({ wetness, eraIndex }, at) => {
    const next = sweeps.findIndex(
      (other, i) => i > at && other.wetness === wetness && other.eraIndex === eraIndex,
    );
    return next < 0 ? [] : [(residuals[next] - residuals[at]) / Math.SQRT2];
  });
}

/** Whether a value is far from those of the same weather on both sides. */
function isLone(
  sweeps: readonly DriftSweep[],
  residuals: Float64Array,
  at: number,
  limit: number,
): boolean {
  const isPeer = (i: number) =>
    sweeps[i].wetness === sweeps[at].wetness && sweeps[i].eraIndex === sweeps[at].eraIndex;
  const peers = sweeps.map((_, i) => i).filter((i) => i !== at && isPeer(i));
  const near = [
    ...peers.filter((i) => i < at).slice(-2),
    ...peers.filter((i) => i > at).slice(0, 2),
  ];
  if (near.length < 3 || near[0] > at || near.at(-1) === undefined) return false;
  return near.every((i) => Math.abs(residuals[at] - residuals[i]) > limit);
}

function bestOf(
  candidates: readonly Candidate[],
  fit: RidgeFit,
  usual: UsualScatter,
  sweeps: readonly DriftSweep[],
  withWet: Float64Array,
): { candidate: Candidate; gain: number } | null {
  let best: { candidate: Candidate; gain: number } | null = null;
  for (const candidate of candidates) {
    const { factor, gain } = fit.tryColumn(candidate.column);
    if (gain < (candidate.after.length < 3 ? leastGainOfTwo : leastGain)) continue;
    if (Math.abs(factor) * candidate.reach < usual.worthReporting) continue;
    if (best !== null && gain <= best.gain) continue;
    const rest = candidate.kind === 'wet' ? withWet : fit.residuals;
    if (!isBorneOut(candidate, factor, rest, sweeps)) continue;
    best = { candidate, gain };
  }
  return best;
}

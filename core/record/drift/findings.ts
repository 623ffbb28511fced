import { median } from '../statistics/robust.ts';
import type { DriftMeasure } from './drift-series.ts';
import type { Effect, SeriesModel } from './series-model.ts';
import { usualScatter } from './usual-scatter.ts';

export const driftCodes = [
  'slow_drift_down',
  'slow_drift_up',
  'sudden_jump',
  'loss_growing',
  'only_when_wet',
  'instrument_off',
  'resonance_lost',
  'test_overdue',
] as const;
export type DriftCode = (typeof driftCodes)[number];

/** What a keeper can do about it. */
export const driftSteps = [
  'inspect_antenna',
  'check_line',
  'look_for_water',
  'check_instrument',
  'sweep_again',
] as const;

/** What became of an antenna or an instrument, and on which sweeps that rests. */
export interface DriftFinding {
  readonly code: DriftCode;
  readonly eraIndex: number;
  /** The measure that shows it best; null where none does. */
  readonly measure: DriftMeasure | null;
  readonly detail: string;
  /** Ids of sweeps. */
  readonly evidence: readonly string[];
  readonly confidence: 'medium' | 'high';
  readonly next: (typeof driftSteps)[number];
  /** Relative: in all, or by year for a slow drift. */
  readonly change: number | null;
  /** The first sweep that shows it; milliseconds since 1970, UTC. */
  readonly sinceMs: number;
}

interface Found {
  readonly model: SeriesModel;
  readonly effect: Effect;
}

const words: Readonly<Record<DriftMeasure, string>> = {
  resonance_hz: 'The resonance',
  minimum_swr_hz: 'The frequency of the lowest SWR',
  minimum_swr: 'The lowest SWR',
  span_width_hz: 'The width within the SWR limit',
  resistance_ohm: 'The resistance at resonance',
};
/** A gain in chi-squared beyond which nothing else is likely. */
const sureGain = 60;

/** One finding for each thing that happened, told by the measure that shows it best. */
export function findingsOf(models: readonly SeriesModel[]): readonly DriftFinding[] {
  const found = models.flatMap((model) => model.effects.map((effect) => ({ model, effect })));
  const losses = found.filter((one) => isLoss(one, models));
  const isOfLoss = ({ model, effect }: Found) =>
    model.measure !== 'resonance_hz' &&
    losses.some((loss) => effect.eraIndex === loss.effect.eraIndex && effect.kind !== 'wet');
  const rest = found.filter((one) => !isOfLoss(one));
  return [
    ...clearest(losses).map((one) => ofLoss(one)),
    ...clearest(rest.filter(({ effect }) => effect.kind === 'step')).map(ofStep),
    ...clearest(rest.filter(isSlow(rest))).map(ofTrend),
    ...clearest(rest.filter(({ effect }) => effect.kind === 'wet')).map(ofWet),
    ...offInstruments(models),
  ];
}

/** A trend counts of frequencies; of other measures where nothing tells what lies behind it. */
function isSlow(found: readonly Found[]): (one: Found) => boolean {
  return ({ model, effect }) =>
    effect.kind === 'trend' &&
    (isFrequency(model.measure) ||
      !found.some((other) => {
        return other.effect.eraIndex === effect.eraIndex && other.effect.kind !== 'trend';
      }));
}

function isFrequency(measure: DriftMeasure): boolean {
  return measure === 'resonance_hz' || measure === 'minimum_swr_hz';
}

/** The clearest effect of each era. */
function clearest(found: readonly Found[]): readonly Found[] {
  const eras = [...new Set(found.map(({ effect }) => effect.eraIndex))];
  return eras.flatMap((era) => {
    const own = found.filter(({ effect }) => effect.eraIndex === era);
    return own.toSorted((a, b) => rank(b) - rank(a)).slice(0, 1);
  });
}

/** Frequencies tell most of an antenna, so they go first. */
function rank({ model, effect }: Found): number {
  return effect.gain * (isFrequency(model.measure) ? 2 : 1);
}

/** Width up while SWR goes down, or the other way round: one is sure, the other goes with it. */
function isLoss({ model, effect }: Found, models: readonly SeriesModel[]): boolean {
  if (effect.kind === 'wet') return false;
  if (model.measure === 'span_width_hz' && effect.factor > 0) {
    return goesAlong(effect, model, models, 'minimum_swr', -1);
  }
  if (model.measure === 'minimum_swr' && effect.factor < 0) {
    return goesAlong(effect, model, models, 'span_width_hz', 1);
  }
  return false;
}

function goesAlong(
  effect: Effect,
  shown: SeriesModel,
  models: readonly SeriesModel[],
  measure: DriftMeasure,
  sign: number,
): boolean {
  const other = models.find((model) => model.measure === measure);
  if (other === undefined) return false;
  const ids = new Set(effect.after.map((place) => shown.sweeps[place].sweepId));
  const sinceMs = shown.sweeps[effect.after[0]].measuredAtMs;
  const own = other.sweeps.flatMap(({ eraIndex, wetness }, i) =>
    eraIndex === effect.eraIndex && wetness !== 'wet' ? [i] : [],
  );
  const after = own.filter((i) => ids.has(other.sweeps[i].sweepId));
  const before = own.filter((i) => other.sweeps[i].measuredAtMs < sinceMs);
  const late = effect.kind === 'trend' ? after.slice(-Math.ceil(after.length / 2)) : after;
  const early = before.length >= 2 ? before : after.slice(0, 3);
  if (late.length === 0 || early.length < 2) return false;
  const change =
    median(late.map((i) => other.corrected[i])) - median(early.map((i) => other.corrected[i]));
  const spread = other.scatter * Math.sqrt(1 / late.length + 1 / early.length);
  return sign * change > 2 * spread;
}

function percent(change: number): string {
  const size = Math.abs(100 * Math.expm1(change));
  return `${size.toFixed(size < 1 ? 2 : 1)} %`;
}

function way(change: number): string {
  return change > 0 ? 'up' : 'down';
}

function about({ model, effect }: Found) {
  const shown = effect.after.map((place) => model.sweeps[place]);
  return {
    eraIndex: effect.eraIndex,
    measure: model.measure,
    evidence: shown.map(({ sweepId }) => sweepId),
    confidence:
      effect.gain > sureGain && shown.length > 2 ? ('high' as const) : ('medium' as const),
    change: Math.expm1(effect.factor),
    sinceMs: shown[0].measuredAtMs,
  };
}

function ofLoss(found: Found): DriftFinding {
  const { factor, kind } = found.effect;
  return {
    ...about(found),
    code: 'loss_growing',
    detail: `SWR is lower and the span wider than before (${words[found.model.measure].toLowerCase()} ${way(factor)} by ${percent(factor)}${kind === 'trend' ? ' a year' : ''}): loss is growing, in the line or a connector. The antenna is no better.`,
    next: 'check_line',
  };
}

function ofStep(found: Found): DriftFinding {
  const { factor } = found.effect;
  return {
    ...about(found),
    code: 'sudden_jump',
    detail: `${words[found.model.measure]} jumped ${way(factor)} by ${percent(factor)}, with no work on the antenna to explain it.`,
    next: 'inspect_antenna',
  };
}

function ofTrend(found: Found): DriftFinding {
  const { factor } = found.effect;
  return {
    ...about(found),
    code: factor < 0 ? 'slow_drift_down' : 'slow_drift_up',
    detail: `${words[found.model.measure]} moves ${way(factor)} by ${percent(factor)} a year.`,
    next: 'inspect_antenna',
  };
}

function ofWet(found: Found): DriftFinding {
  const { factor } = found.effect;
  return {
    ...about(found),
    code: 'only_when_wet',
    detail: `${words[found.model.measure]} is ${way(factor)} by ${percent(factor)} in wet weather only: water gets in somewhere.`,
    next: 'look_for_water',
  };
}

/** Instruments that differ from the others by more than chance and more than is usual. */
function offInstruments(models: readonly SeriesModel[]): readonly DriftFinding[] {
  const off = models.flatMap((model) =>
    model.biases
      .filter(({ bias, standardError, sweeps }) => {
        const others = model.sweeps.length - sweeps;
        const limit = usualScatter[model.measure].instrumentLimit;
        return sweeps > 2 && others > 2 && Math.abs(bias) > Math.max(limit, 3 * standardError);
      })
      .map((bias) => ({ model, bias })),
  );
  const ids = [...new Set(off.map(({ bias }) => bias.analyzerId))];
  return ids.map((id) => {
    const score = ({ bias }: (typeof off)[number]) => Math.abs(bias.bias) / bias.standardError;
    const own = off.filter(({ bias }) => bias.analyzerId === id);
    const { model, bias } = own.toSorted((a, b) => score(b) - score(a))[0];
    const by = model.sweeps.filter(({ analyzerId }) => analyzerId === id);
    return {
      code: 'instrument_off',
      eraIndex: by[by.length - 1].eraIndex,
      measure: model.measure,
      detail: `One instrument shows ${words[model.measure].toLowerCase()} ${percent(bias.bias)} ${bias.bias > 0 ? 'higher' : 'lower'} than the others do.`,
      evidence: by.map(({ sweepId }) => sweepId),
      confidence: score({ model, bias }) > 5 ? 'high' : 'medium',
      next: 'check_instrument',
      change: Math.expm1(bias.bias),
      sinceMs: by[0].measuredAtMs,
    };
  });
}

import type { Comparison, Quantity } from './comparison.ts';
import { type BenchFigure, byFamily, comparisonsOf, worst } from './figure.ts';
import type { CaseScore } from './scores.ts';
import { median, rms } from './statistics.ts';

const quantities: readonly Quantity[] = ['resonance', 'min_swr_frequency', 'min_swr', 'span_edge'];

/** How often the stated half-widths hold the truth; an estimate without one counts as not holding it. */
export function coverageFigure(scores: readonly CaseScore[]): BenchFigure {
  const coverage = (some: readonly Comparison[]) =>
    some.filter((c) => c.u95 !== null && Math.abs(c.error) <= c.u95).length / some.length;
  const of = (quantity: Quantity) => {
    const all = comparisonsOf(scores, quantity);
    const stated = all.filter((c) => c.u95 !== null);
    return {
      compared: all.length,
      without_half_width: all.length - stated.length,
      median_half_width_over_rms_error: halfWidthOverRms(stated),
      of_the_model_fit: modelFitCoverage(all),
      by_family: byFamily(scores, (some) => coverage(comparisonsOf(some, quantity))),
      where_noise_rules: coverage(all.filter((c) => noiseRules(c))),
      where_rounding_rules: coverage(all.filter((c) => !noiseRules(c))),
      worst: worst(stated, (c) => Math.abs(c.error) / (c.u95 ?? 1)),
    };
  };
  const value = Object.fromEntries(
    quantities.map((quantity) => [quantity, coverage(comparisonsOf(scores, quantity))]),
  );
  return {
    value,
    aim: 'each 0.93 to 0.97',
    met: Object.values(value).every((share) => share >= 0.93 && share <= 0.97),
    detail: Object.fromEntries(quantities.map((quantity) => [quantity, of(quantity)])),
  };
}

/** Coverage by the model fit's own 1.96 standard deviations: what linear theory reaches here. */
function modelFitCoverage(all: readonly Comparison[]): number {
  const fitted = all.filter((c) => c.yardstick !== null && c.yardstick.fitted !== null);
  const covered = fitted.filter(
    ({ yardstick, truth }) =>
      yardstick !== null &&
      Math.abs((yardstick.fitted ?? 0) - truth) <= 1.959964 * yardstick.deviation,
  );
  return covered.length / fitted.length;
}

function noiseRules({ bench }: Comparison): boolean {
  return bench.noise / Math.SQRT2 > 0.7 * bench.sigma;
}

/** Each over the model fit's deviation for its case, so that no case outweighs another. Ideal: 1.96. */
function halfWidthOverRms(stated: readonly Comparison[]): number {
  const sound = stated.filter((c) => c.yardstick !== null && c.yardstick.deviation > 0);
  const scaled = (value: number, c: Comparison) => value / (c.yardstick?.deviation ?? 1);
  return (
    median(sound.map((c) => scaled(c.u95 ?? 0, c))) / rms(sound.map((c) => scaled(c.error, c)))
  );
}

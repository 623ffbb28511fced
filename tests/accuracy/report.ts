import type { BenchScores } from './bench.ts';
import {
  addFindings,
  type CaseScore,
  type Comparison,
  type Finding,
  type Quantity,
} from './scores.ts';

/** One line of the bench: a value, what it should be, and what lies behind it. */
export interface BenchFigure {
  readonly value: number | Readonly<Record<string, number>>;
  readonly aim: string;
  readonly met: boolean;
  readonly detail: Readonly<Record<string, unknown>>;
}

export type BenchReport = Readonly<Record<string, BenchFigure>>;

const quantities: readonly Quantity[] = ['resonance', 'min_swr_frequency', 'min_swr', 'span_edge'];

/** The figures of the accuracy bench, each with its aim. */
export function reportOf({ exact, asInFiles }: BenchScores): BenchReport {
  return {
    noise_free_resonance_error_steps: exactFigure(exact, 'resonance', 0.001),
    noise_free_min_swr_error_steps: exactFigure(exact, 'min_swr_frequency', null),
    resonance_rms_vs_model_fit: ratioFigure(asInFiles, 'resonance'),
    min_swr_rms_vs_model_fit: ratioFigure(asInFiles, 'min_swr_frequency'),
    coverage_95: coverageFigure(asInFiles),
    resonance_missed: findingFigure(asInFiles, 'missed'),
    resonance_invented: findingFigure(asInFiles, 'invented'),
    verdict_wrong: verdictFigure(asInFiles),
  };
}

function comparisonsOf(scores: readonly CaseScore[], quantity: Quantity): Comparison[] {
  return scores.flatMap((score) => score.comparisons.filter((c) => c.quantity === quantity));
}

function byFamily<T>(
  scores: readonly CaseScore[],
  of: (scores: readonly CaseScore[]) => T,
): Record<string, T> {
  const names = [...new Set(scores.map((score) => score.bench.antenna.family.name))];
  return Object.fromEntries(
    names.map((name) => [name, of(scores.filter((s) => s.bench.antenna.family.name === name))]),
  );
}

function exactFigure(
  scores: readonly CaseScore[],
  quantity: Quantity,
  medianAim: number | null,
): BenchFigure {
  const withSpan = scores.filter((score) => score.bench.hasSpan);
  const stepsOf = (some: readonly CaseScore[]) =>
    sorted(comparisonsOf(some, quantity).map(errorSteps));
  const errors = stepsOf(withSpan);
  const median = quantile(errors, 0.5);
  const p99 = quantile(errors, 0.99);
  const findings = scores.map((score) => score.resonances).reduce(addFindings, noFinding);
  return {
    value: medianAim === null ? p99 : { median, p99 },
    aim: medianAim === null ? '99 % <= 0.01' : `median <= ${medianAim}, 99 % <= 0.01`,
    met: p99 <= 0.01 && (medianAim === null || median <= medianAim),
    detail: {
      compared: errors.length,
      median,
      largest: quantile(errors, 1),
      by_family_p99: byFamily(withSpan, (some) => quantile(stepsOf(some), 0.99)),
      without_span_p99: quantile(stepsOf(scores.filter((s) => !s.bench.hasSpan)), 0.99),
      missed: findings.missed,
      invented: findings.invented,
      minima_lost: scores.filter((score) => score.minimumLost).length,
      worst: worst(comparisonsOf(withSpan, quantity), errorSteps),
    },
  };
}

/** A comparison whose yardstick is there and sound. */
interface Measured {
  readonly comparison: Comparison;
  readonly estimate: number;
  readonly fit: number;
  readonly deviationSteps: number;
}

function measured(scores: readonly CaseScore[], quantity: Quantity): Measured[] {
  return comparisonsOf(scores, quantity).flatMap((comparison) => {
    const { yardstick, bench, error, truth } = comparison;
    if (yardstick === null || yardstick.fitted === null || bench.noise === 0) return [];
    const { deviation, fitted } = yardstick;
    return [
      {
        comparison,
        estimate: error / deviation,
        fit: (fitted - truth) / deviation,
        deviationSteps: deviation / bench.stepHz,
      },
    ];
  });
}

function ratioFigure(scores: readonly CaseScore[], quantity: Quantity): BenchFigure {
  const all = measured(scores, quantity);
  const ratioOf = (some: readonly Measured[]) =>
    rms(some.map((m) => m.estimate)) / rms(some.map((m) => m.fit));
  const inSteps = (some: readonly Measured[]) =>
    rms(some.map((m) => m.estimate * m.deviationSteps)) /
    rms(some.map((m) => m.fit * m.deviationSteps));
  const value = ratioOf(all);
  const ratiosWhere = (keep: (m: Measured) => boolean) => ratioOf(all.filter(keep));
  return {
    value,
    aim: '<= 1.5',
    met: value <= 1.5,
    detail: {
      compared: all.length,
      normalised: 'each error over the standard deviation that the model fit states for its case',
      fit_rms_over_its_own_deviation: rms(all.map((m) => m.fit)),
      trimmed_1_percent: ratioOf(trimmed(all)),
      median_ratio:
        median(all.map((m) => Math.abs(m.estimate))) / median(all.map((m) => Math.abs(m.fit))),
      plain_steps: inSteps(all),
      by_family: byFamily(scores, (some) => ratioOf(measured(some, quantity))),
      by_family_trimmed: byFamily(scores, (some) => ratioOf(trimmed(measured(some, quantity)))),
      by_noise: {
        below_0_001: ratiosWhere((m) => m.comparison.bench.noise < 0.001),
        to_0_005: ratiosWhere(
          (m) => m.comparison.bench.noise >= 0.001 && m.comparison.bench.noise < 0.005,
        ),
        above_0_005: ratiosWhere((m) => m.comparison.bench.noise >= 0.005),
      },
      worst: worst(
        all.map((m) => m.comparison),
        (c) => Math.abs(c.error) / (c.yardstick?.deviation ?? 1),
      ),
    },
  };
}

/** Without the hundredth part whose estimate is worst. */
function trimmed(all: readonly Measured[]): Measured[] {
  const ranked = [...all].sort((a, b) => Math.abs(a.estimate) - Math.abs(b.estimate));
  return ranked.slice(0, Math.ceil(0.99 * ranked.length));
}

function coverageFigure(scores: readonly CaseScore[]): BenchFigure {
  const coverage = (some: readonly Comparison[]) =>
    some.filter((c) => c.u95 !== null && Math.abs(c.error) <= c.u95).length / some.length;
  const of = (quantity: Quantity) => {
    const all = comparisonsOf(scores, quantity);
    const stated = all.filter((c) => c.u95 !== null);
    return {
      compared: all.length,
      without_half_width: all.length - stated.length,
      median_half_width_over_rms_error: halfWidthOverRms(stated),
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

const noFinding: Finding = { clear: 0, missed: 0, invented: 0, hedged: 0 };

function findingFigure(scores: readonly CaseScore[], what: 'missed' | 'invented'): BenchFigure {
  const sum = (some: readonly CaseScore[], part: 'resonances' | 'edges') =>
    some.map((score) => score[part]).reduce(addFindings, noFinding);
  const total = sum(scores, 'resonances');
  const value = (1e4 * total[what]) / total.clear;
  return {
    value,
    aim: '<= 5 per 10,000 clear ones',
    met: value <= 5,
    detail: {
      ...total,
      clear_means:
        '3 sigma of Im(reflection) at some point on both sides, before the next crossing',
      by_family: byFamily(scores, (some) => sum(some, 'resonances')),
      span_edges: sum(scores, 'edges'),
      minima_lost: scores.filter((score) => score.minimumLost).length,
      cases: scores
        .filter((score) => score.resonances[what] > 0)
        .slice(0, 12)
        .map((score) => label(score.bench)),
    },
  };
}

function verdictFigure(scores: readonly CaseScore[]): BenchFigure {
  const sum = (of: (score: CaseScore) => number) =>
    scores.reduce((all, score) => all + of(score), 0);
  const value = sum((score) => score.verdicts.wrongBeyondHalfWidth);
  return {
    value,
    aim: '0',
    met: value === 0,
    detail: {
      bands_asked: sum((score) => score.verdicts.asked),
      wrong_within_half_width: sum((score) => score.verdicts.wrong) - value,
      expected_by_chance_of_exact_intervals: sum((score) => score.verdicts.expectedByChance),
      cases: scores
        .filter((score) => score.verdicts.wrongBeyondHalfWidth > 0)
        .slice(0, 12)
        .map((score) => label(score.bench)),
    },
  };
}

function worst(comparisons: readonly Comparison[], badness: (c: Comparison) => number) {
  return [...comparisons]
    .sort((a, b) => badness(b) - badness(a))
    .slice(0, 6)
    .map((c) => ({
      badness: badness(c),
      ...label(c.bench),
      truth: c.truth,
      error: c.error,
      u95: c.u95,
    }));
}

function label(bench: CaseScore['bench']) {
  return {
    case: bench.index,
    seed: bench.seed,
    family: bench.antenna.family.name,
    points: bench.clean.length,
    noise: bench.noise,
    rounding: bench.rounding,
  };
}

function errorSteps(comparison: Comparison): number {
  return Math.abs(comparison.error) / comparison.bench.stepHz;
}

function sorted(values: readonly number[]): number[] {
  return [...values].sort((a, b) => a - b);
}

/** Of ascending values; NaN where there are none. */
function quantile(ascending: readonly number[], p: number): number {
  if (ascending.length === 0) return Number.NaN;
  return ascending[Math.min(ascending.length - 1, Math.ceil(p * ascending.length) - 1)];
}

function median(values: readonly number[]): number {
  return quantile(sorted(values), 0.5);
}

function rms(values: readonly number[]): number {
  return Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);
}

import type { BenchScores } from './bench.ts';
import type { Quantity } from './comparison.ts';
import { coverageFigure } from './coverage-figure.ts';
import { addFindings, type Finding } from './crossings.ts';
import {
  type BenchFigure,
  type BenchReport,
  byFamily,
  comparisonsOf,
  errorSteps,
  label,
  worst,
} from './figure.ts';
import { ratioFigure } from './ratio-figure.ts';
import type { CaseScore } from './scores.ts';
import { quantile, sorted } from './statistics.ts';

/** The figures of the accuracy bench, each with its aim. */
export function reportOf({ exact, asInFiles }: BenchScores): BenchReport {
  return {
    noise_free_resonance_error_steps: exactFigure(exact, 'resonance', 0.001),
    noise_free_min_swr_error_steps: exactFigure(exact, 'min_swr_frequency', null),
    resonance_rms_vs_model_fit: ratioFigure(asInFiles, 'resonance'),
    min_swr_rms_vs_model_fit: ratioFigure(asInFiles, 'min_swr_frequency'),
    coverage_95: coverageFigure(asInFiles),
    resonance_missed: findingFigure([...exact, ...asInFiles], 'missed'),
    resonance_invented: findingFigure([...exact, ...asInFiles], 'invented'),
    verdict_wrong: verdictFigure(asInFiles),
  };
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

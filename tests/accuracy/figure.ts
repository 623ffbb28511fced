import type { Comparison, Quantity } from './comparison.ts';
import type { CaseScore } from './scores.ts';

/** One line of the bench: a value, what it should be, and what lies behind it. */
export interface BenchFigure {
  readonly value: number | Readonly<Record<string, number>>;
  readonly aim: string;
  readonly met: boolean;
  readonly detail: Readonly<Record<string, unknown>>;
}

export type BenchReport = Readonly<Record<string, BenchFigure>>;

export function comparisonsOf(scores: readonly CaseScore[], quantity: Quantity): Comparison[] {
  return scores.flatMap((score) => score.comparisons.filter((c) => c.quantity === quantity));
}

export function byFamily<T>(
  scores: readonly CaseScore[],
  of: (scores: readonly CaseScore[]) => T,
): Record<string, T> {
  const names = [...new Set(scores.map((score) => score.bench.antenna.family.name))];
  return Object.fromEntries(
    names.map((name) => [name, of(scores.filter((s) => s.bench.antenna.family.name === name))]),
  );
}

export function worst(comparisons: readonly Comparison[], badness: (c: Comparison) => number) {
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

export function label(bench: CaseScore['bench']) {
  return {
    case: bench.index,
    seed: bench.seed,
    family: bench.antenna.family.name,
    points: bench.clean.length,
    noise: bench.noise,
    rounding: bench.rounding,
  };
}

export function errorSteps(comparison: Comparison): number {
  return Math.abs(comparison.error) / comparison.bench.stepHz;
}

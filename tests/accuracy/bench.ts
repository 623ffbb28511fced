import { type BenchCase, drawCase, type Imperfection } from './cases.ts';
import type { Estimator } from './estimator.ts';
import { fitModel } from './model-fit.ts';
import type { AntennaFamily } from './models/antenna-model.ts';
import { families } from './models/families.ts';
import { type CaseScore, scoreCase } from './scores.ts';

export interface BenchPlan {
  readonly seed: number;
  /** Sweeps as files carry them; a quarter as many are run exact. */
  readonly cases: number;
  /** All families in turn where absent. */
  readonly family?: AntennaFamily['name'];
}

export interface BenchScores {
  readonly exact: readonly CaseScore[];
  readonly asInFiles: readonly CaseScore[];
}

/** Case `index` of a seed: the families take turns. */
export function benchCase(seed: number, index: number, imperfection: Imperfection): BenchCase {
  const family = families[index % families.length];
  return drawCase(family, seed, index, imperfection);
}

/** Judges an estimator on every case of the plan. */
export function runBench(plan: BenchPlan, estimator: Estimator): BenchScores {
  const indices = Array.from({ length: plan.cases }, (_, i) => i).filter(
    (i) => plan.family === undefined || families[i % families.length].name === plan.family,
  );
  const exact = indices
    .filter((i) => i < plan.cases / 4)
    .map((i) => benchCase(plan.seed, i, 'exact'))
    .map((bench) => scoreCase(bench, estimator(bench.sweep), null));
  const asInFiles = indices
    .map((i) => benchCase(plan.seed, i, 'as_in_files'))
    .map((bench) => scoreCase(bench, estimator(bench.sweep), fitModel(bench)));
  return { exact, asInFiles };
}

import { analyse } from '../../core/analysis/analysis.ts';
import { curveOf } from '../../core/analysis/refined-swr.ts';
import { summariseAnalysis } from '../../core/analysis/summarise.ts';
import type { ComplexSweep } from '../../core/sweep.ts';
import type { Estimate } from './estimator.ts';

/** What the service answers: its summary and its report of usable bands stand on one analysis. */
export function summaryEstimator(sweep: ComplexSweep): Estimate {
  const analysis = analyse(sweep);
  const { resonances, minimumSwr } = summariseAnalysis(analysis);
  return { resonances, minimumSwr, curve: curveOf(analysis) };
}

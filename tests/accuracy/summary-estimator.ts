import { swrCurve } from '../../core/analysis/refined-swr.ts';
import { summarise } from '../../core/analysis/summarise.ts';
import type { ComplexSweep } from '../../core/sweep.ts';
import type { Estimate } from './estimator.ts';

/** What the service answers. */
export function summaryEstimator(sweep: ComplexSweep): Estimate {
  const { resonances, minimumSwr } = summarise(sweep);
  return { resonances, minimumSwr, curve: swrCurve(sweep) };
}

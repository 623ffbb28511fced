import { analyse } from '../../core/analysis/analysis.ts';
import { curveOf } from '../../core/analysis/refined-swr.ts';
import { summariseAnalysis } from '../../core/analysis/summarise.ts';
import { findPlan } from '../../core/bands/plans.ts';
import { usableBands } from '../../core/bands/usable.ts';
import type { ChartStyle } from '../../core/chart/chart-style.ts';
import type { Sweep } from '../../core/sweep.ts';

export const plainStyle: ChartStyle = {
  widthPx: 720,
  heightPx: 432,
  theme: 'light',
  numbers: 'en',
};

/** A sweep with all that its charts show, judged by the plan of IARU region 1. */
export function chartOf<Given extends Sweep>(sweep: Given, maxSwr = 2, title = 'Test antenna') {
  const analysis = analyse(sweep, null);
  const plan = findPlan('iaru-r1');
  if (plan === null) throw new Error('The plan is gone.');
  return {
    heading: { title, subtitle: 'invented', tableUrl: null },
    sweep,
    summary: summariseAnalysis(analysis, {
      plane: 'measured',
      assumptions: [],
      swrLimits: [maxSwr],
    }),
    report: usableBands(curveOf(analysis), plan, { maxSwr }),
  };
}

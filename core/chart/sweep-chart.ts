import type { Summary } from '../analysis/summary.ts';
import type { UsableReport } from '../bands/usable-report.ts';
import type { Sweep } from '../sweep.ts';
import type { ChartHeading } from './chart-style.ts';

/** A sweep and what was found in it, all at one plane and against one reference. */
export interface SweepChart {
  readonly heading: ChartHeading;
  readonly sweep: Sweep;
  readonly summary: Summary;
  readonly report: UsableReport;
}

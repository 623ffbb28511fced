import type { Resonance, SwrMinimum } from '../../core/analysis/summary.ts';
import type { SwrCurve } from '../../core/analysis/swr-curve.ts';
import type { ComplexSweep } from '../../core/sweep.ts';

/** The answers of whatever is being judged, about one sweep. */
export interface Estimate {
  readonly resonances: readonly Resonance[];
  readonly minimumSwr: SwrMinimum | null;
  readonly curve: SwrCurve;
}

export type Estimator = (sweep: ComplexSweep) => Estimate;

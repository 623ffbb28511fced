import { reflectionMagnitude, type Sweep } from '../sweep.ts';

/**
 * SWR = (1 + |Γ|)/(1 - |Γ|). Null where |Γ| >= 1: nothing is absorbed there, and the formula would
 * give an infinite or a negative number. Null for NaN too.
 */
export function swrOf(magnitude: number): number | null {
  return magnitude < 1 ? (1 + magnitude) / (1 - magnitude) : null;
}

/** |Γ| = (SWR - 1)/(SWR + 1), 1 for an infinite SWR. Null below 1, which is no SWR. */
export function magnitudeOfSwr(swr: number): number | null {
  if (!(swr >= 1)) return null;
  return swr === Number.POSITIVE_INFINITY ? 1 : (swr - 1) / (swr + 1);
}

/** `swrOf` at every point of a sweep, against its own reference; NaN where |Γ| >= 1. */
export function sweepSwr(sweep: Sweep): Float64Array {
  return reflectionMagnitude(sweep).map((magnitude) => swrOf(magnitude) ?? Number.NaN);
}

import type { SwrCurve, SwrExtremes } from '../analysis/swr-curve.ts';
import type { HzRange } from './ranges.ts';

/** The extremes of SWR over swept ranges together; null if there are none. */
export function extremesOver(curve: SwrCurve, swept: readonly HzRange[]): SwrExtremes | null {
  return swept
    .flatMap(({ lowHz, highHz }) => curve.extremes(lowHz, highHz) ?? [])
    .reduce<SwrExtremes | null>(widest, null);
}

/** A null SWR is a total reflection: above every number. */
function widest(one: SwrExtremes | null, other: SwrExtremes): SwrExtremes {
  if (one === null) return other;
  const above = (swr: number | null) => swr ?? Number.POSITIVE_INFINITY;
  const worst = above(other.worstSwr) > above(one.worstSwr) ? other : one;
  const least = above(other.minimumSwr) < above(one.minimumSwr) ? other : one;
  return {
    worstSwr: worst.worstSwr,
    worstSwrHz: worst.worstSwrHz,
    worstSwrU95: worst.worstSwrU95,
    minimumSwr: least.minimumSwr,
    minimumSwrHz: least.minimumSwrHz,
  };
}

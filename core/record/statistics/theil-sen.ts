import { normalQuantile } from './distributions.ts';
import { mannKendallVariance } from './mann-kendall.ts';
import { median, medianOfSorted } from './robust.ts';

export interface RobustTrend {
  /** Median of the slopes between all pairs, in units of y per unit of x. */
  readonly slope: number;
  /** median(y) - slope * median(x). */
  readonly intercept: number;
  /** Limits of the slope at the asked confidence; null where there are too few pairs for it. */
  readonly slopeLow: number | null;
  readonly slopeHigh: number | null;
}

/**
 * The Theil–Sen trend of y over x, with Sen's interval (P. K. Sen, Journal of the American
 * Statistical Association 63, 1968, pp. 1379–1389). Null if no two x differ.
 */
export function theilSen(
  x: ArrayLike<number>,
  y: ArrayLike<number>,
  confidence = 0.95,
): RobustTrend | null {
  const slopes = pairSlopes(x, y);
  if (slopes.length === 0) return null;
  const slope = medianOfSorted(slopes);
  const z = normalQuantile(0.5 + confidence / 2);
  const reach = z * Math.sqrt(mannKendallVariance(y));
  // One-based ranks (N - C)/2 and (N + C)/2 + 1, as in the publication.
  const low = Math.round((slopes.length - reach) / 2) - 1;
  const high = Math.round((slopes.length + reach) / 2);
  const isInside = low >= 0 && high < slopes.length;
  return {
    slope,
    intercept: median(y) - slope * median(x),
    slopeLow: isInside ? slopes[low] : null,
    slopeHigh: isInside ? slopes[high] : null,
  };
}

function pairSlopes(x: ArrayLike<number>, y: ArrayLike<number>): Float64Array {
  const slopes: number[] = [];
  for (let i = 0; i < x.length; i++) {
    for (let j = i + 1; j < x.length; j++) {
      if (x[i] !== x[j]) slopes.push((y[j] - y[i]) / (x[j] - x[i]));
    }
  }
  return Float64Array.from(slopes).sort();
}

import { fisherUpperQuantile, studentQuantile } from './distributions.ts';

/** A statistic beside its critical values: outlying beyond 1 %, straggling beyond 5 % (ISO 5725-2). */
export interface OutlierTest {
  readonly statistic: number;
  readonly critical5: number;
  readonly critical1: number;
  readonly verdict: 'none' | 'straggler' | 'outlier';
  /** Zero-based index of the group or value that the statistic is about. */
  readonly index: number;
}

/**
 * Cochran's test whether the largest of several variances, each from `measurements` values, stands
 * out (ISO 5725-2:1994, clause 7.3.3). Critical values from the F distribution: with p groups
 * C = 1 / (1 + (p - 1) / F), F the upper alpha/p quantile at (n - 1, (p - 1)(n - 1)).
 * Null for fewer than two groups or measurements, or where all variances are zero.
 */
export function cochran(variances: readonly number[], measurements: number): OutlierTest | null {
  const total = variances.reduce((sum, variance) => sum + variance, 0);
  const groups = variances.length;
  if (groups < 2 || measurements < 2 || !(total > 0)) return null;
  const largest = Math.max(...variances);
  const critical = (alpha: number) => {
    const f = fisherUpperQuantile(
      alpha / groups,
      measurements - 1,
      (groups - 1) * (measurements - 1),
    );
    return 1 / (1 + (groups - 1) / f);
  };
  return judged(largest / total, critical(0.05), critical(0.01), variances.indexOf(largest));
}

/**
 * Grubbs' test whether the value farthest from the mean stands out, two-sided as ISO 5725-2:1994,
 * clause 7.3.4 uses it: critical values from Student's distribution at alpha / (2 p). Null for
 * fewer than three values or where all are equal.
 */
export function grubbs(values: readonly number[]): OutlierTest | null {
  const count = values.length;
  if (count < 3) return null;
  const mean = values.reduce((sum, value) => sum + value, 0) / count;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  if (!(squares > 0)) return null;
  const deviations = values.map((value) => Math.abs(value - mean));
  const largest = Math.max(...deviations);
  const critical = (alpha: number) => {
    const t = studentQuantile(1 - alpha / (2 * count), count - 2);
    return ((count - 1) / Math.sqrt(count)) * Math.sqrt((t * t) / (count - 2 + t * t));
  };
  const statistic = largest / Math.sqrt(squares / (count - 1));
  return judged(statistic, critical(0.05), critical(0.01), deviations.indexOf(largest));
}

function judged(
  statistic: number,
  critical5: number,
  critical1: number,
  index: number,
): OutlierTest {
  const verdict = statistic > critical1 ? 'outlier' : statistic > critical5 ? 'straggler' : 'none';
  return { statistic, critical5, critical1, verdict, index };
}

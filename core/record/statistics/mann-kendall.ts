import { normalCdf } from './distributions.ts';

export interface MannKendall {
  /** Number of rising pairs less that of falling ones. */
  readonly s: number;
  /** Standard score with the correction for continuity; 0 where S is 0. */
  readonly z: number;
  /** Two-sided probability of so large an |S| without a trend. */
  readonly probability: number;
}

/** Up to here the probability is counted out exactly, unless values tie. */
const largestExactCount = 10;

/**
 * The Mann–Kendall test of values in the order of time (M. G. Kendall, Rank Correlation Methods;
 * R. O. Gilbert, Statistical Methods for Environmental Pollution Monitoring, 1987, chapter 16).
 */
export function mannKendall(values: ArrayLike<number>): MannKendall {
  const count = values.length;
  let s = 0;
  for (let i = 0; i < count; i++) {
    for (let j = i + 1; j < count; j++) s += Math.sign(values[j] - values[i]);
  }
  const variance = mannKendallVariance(values);
  const z = s === 0 || variance === 0 ? 0 : (s - Math.sign(s)) / Math.sqrt(variance);
  const isExact = count <= largestExactCount && new Set(Array.from(values)).size === count;
  const probability = isExact ? exactTwoSided(count, s) : 2 * normalCdf(-Math.abs(z));
  return { s, z, probability: Math.min(1, probability) };
}

/** The variance of S without a trend, less what tied values take from it. */
export function mannKendallVariance(values: ArrayLike<number>): number {
  const count = values.length;
  const ties = new Map<number, number>();
  for (let i = 0; i < count; i++) ties.set(values[i], (ties.get(values[i]) ?? 0) + 1);
  let sum = count * (count - 1) * (2 * count + 5);
  for (const tie of ties.values()) sum -= tie * (tie - 1) * (2 * tie + 5);
  return sum / 18;
}

/** P(|S| >= |s|) over all orders of `count` different values, by counting inversions. */
function exactTwoSided(count: number, s: number): number {
  // Orders by number of falling pairs, one value added at a time (Mahonian numbers).
  let orders = [1];
  for (let n = 2; n <= count; n++) {
    const next = new Array<number>(orders.length + n - 1).fill(0);
    for (const [falling, ways] of orders.entries()) {
      for (let more = 0; more < n; more++) next[falling + more] += ways;
    }
    orders = next;
  }
  const pairs = (count * (count - 1)) / 2;
  const total = orders.reduce((sum, ways) => sum + ways, 0);
  const extreme = orders.reduce(
    (sum, ways, falling) => (Math.abs(pairs - 2 * falling) >= Math.abs(s) ? sum + ways : sum),
    0,
  );
  return extreme / total;
}

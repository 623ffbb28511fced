import { Random } from '../support/random.ts';
import { type BenchCase, swrLimits } from './cases.ts';
import type { Estimate } from './estimator.ts';
import { mismatchOf, swrAtMismatch, worstMismatch } from './true-answers.ts';

const BANDS_PER_CASE = 4;

export interface VerdictScore {
  readonly asked: number;
  readonly wrong: number;
  readonly wrongBeyondHalfWidth: number;
  /** What 95 % intervals that are exactly right would get wrong beyond their half-widths by chance. */
  readonly expectedByChance: number;
}

/**
 * Asks whether random bands inside the sweep are usable throughout, half of them around the first
 * minimum, with limits of 1.5, 2 and 3. A wrong answer contradicts the truth by more than the stated
 * half-width where the true worst SWR lies farther than that from the limit; one without a half-width
 * claims to be exact.
 */
export function scoreVerdicts(bench: BenchCase, estimate: Estimate): VerdictScore {
  const random = Random.ofCase(bench.seed ^ 0x5bd1e995, bench.index);
  const { frequencyHz } = bench.sweep;
  const lowest = frequencyHz[0];
  const highest = frequencyHz[frequencyHz.length - 1];
  const curve = (f: number) => bench.antenna.family.impedance(f, bench.antenna.parameters);
  const mismatch = mismatchOf(curve, bench.referenceOhm);
  const home = bench.truth.minima[0]?.frequencyHz ?? (lowest + highest) / 2;
  let wrong = 0;
  let beyond = 0;
  let expected = 0;
  for (let band = 0; band < BANDS_PER_CASE; band++) {
    const half = (random.logUniform(0.02, 1) * (highest - lowest)) / 2;
    const middle = random.chance(0.5) ? home : random.uniform(lowest, highest);
    const low = Math.max(lowest, middle - half);
    const high = Math.min(highest, middle + half);
    const limit = random.pick(swrLimits);
    const trueWorst = swrAtMismatch(worstMismatch(mismatch, low, high));
    const answer = estimate.curve.extremes(low, high);
    const halfWidth = answer?.worstSwrU95 ?? 0;
    const usable = answer !== null && answer.worstSwr !== null && answer.worstSwr <= limit;
    const distance = Math.abs(trueWorst - limit);
    if (halfWidth > 0 && distance > halfWidth) {
      expected += upperNormalTail((1.959964 * distance) / halfWidth);
    }
    if (usable === trueWorst <= limit) continue;
    wrong++;
    if (distance > halfWidth) beyond++;
  }
  return {
    asked: BANDS_PER_CASE,
    wrong,
    wrongBeyondHalfWidth: beyond,
    expectedByChance: expected,
  };
}

/** P(normal > z) for z > 0: Abramowitz & Stegun 26.2.17, within 7.5e-8. */
function upperNormalTail(z: number): number {
  const t = 1 / (1 + 0.231_641_9 * z);
  const polynomial =
    t *
    (0.319_381_53 +
      t * (-0.356_563_782 + t * (1.781_477_937 + t * (-1.821_255_978 + t * 1.330_274_429))));
  return (Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI)) * polynomial;
}

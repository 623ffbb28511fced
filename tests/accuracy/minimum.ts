import type { BenchCase } from './cases.ts';
import { type Comparison, clearSigmas } from './comparison.ts';
import type { Estimate } from './estimator.ts';
import type { ModelFit } from './model-fit.ts';
import { mismatchAtSwr, type TrueMinimum } from './true-answers.ts';
import { minimumSwrYardstick, minimumYardstick } from './yardstick.ts';

/** Sets the reported minimum SWR against the true one; `lost` where a clear one was not reported. */
export function scoreMinimum(
  bench: BenchCase,
  estimate: Estimate,
  fit: ModelFit | null,
): { comparisons: Comparison[]; lost: boolean } {
  const target = clearMinimum(bench);
  if (target === null) return { comparisons: [], lost: false };
  const found = estimate.minimumSwr;
  if (found === null || found.atEdge) return { comparisons: [], lost: true };
  const frequency = fit === null ? null : minimumYardstick(bench, fit, target.frequencyHz);
  const value =
    fit === null
      ? null
      : minimumSwrYardstick(bench, fit, target.frequencyHz, frequency?.fitted ?? null);
  return {
    comparisons: [
      {
        quantity: 'min_swr_frequency',
        bench,
        truth: target.frequencyHz,
        error: found.frequencyHz - target.frequencyHz,
        u95: found.frequencyU95Hz,
        yardstick: frequency,
      },
      {
        quantity: 'min_swr',
        bench,
        truth: target.swr,
        error: found.swr - target.swr,
        u95: found.swrU95,
        yardstick: value,
      },
    ],
    lost: false,
  };
}

/**
 * The lowest true SWR of the sweep where it is a local minimum from which |reflection| rises by
 * three sigmas on both sides inside the sweep, and by three sigmas less than at any other minimum
 * or at the sweep's ends; null elsewhere.
 */
function clearMinimum(bench: BenchCase): TrueMinimum | null {
  const { minima } = bench.truth;
  if (minima.length === 0) return null;
  const magnitude = bench.clean.map(({ re, im }) => Math.hypot(re, im));
  const magnitudeAt = (swr: number) => Math.sqrt(mismatchAtSwr(swr));
  const [best, ...others] = [...minima].sort((a, b) => a.swr - b.swr);
  const floor = magnitudeAt(best.swr) + clearSigmas * bench.sigma;
  const rivals = [magnitude[0], magnitude[magnitude.length - 1]];
  rivals.push(...others.map((other) => magnitudeAt(other.swr)));
  return rivals.every((rival) => rival > floor) ? best : null;
}

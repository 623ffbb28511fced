import type { BenchCase } from './cases.ts';
import { type Comparison, clearSigmas, type Quantity } from './comparison.ts';
import type { Yardstick } from './yardstick.ts';

/** True crossings of one sort that stand clear of the noise, and what became of them. */
export interface Finding {
  readonly clear: number;
  readonly missed: number;
  /** Reported without a doubt where no true crossing is, clear or not. */
  readonly invented: number;
  /** Clear ones that were reported, but as grazing. */
  readonly hedged: number;
}

/** The sum of two counts. */
export function addFindings(a: Finding, b: Finding): Finding {
  return {
    clear: a.clear + b.clear,
    missed: a.missed + b.missed,
    invented: a.invented + b.invented,
    hedged: a.hedged + b.hedged,
  };
}

export interface Crossing {
  readonly frequencyHz: number;
  readonly kind: string;
}

export interface Reported extends Crossing {
  readonly u95Hz: number | null;
  readonly hedged: boolean;
}

/**
 * Pairs what is reported with what is true, closest first, same kind only, no farther apart than
 * 3 steps, 10 standard deviations of the model fit or 3 stated half-widths, whichever is most.
 * True crossings that do not stand clear of the noise may be found or not; they are never counted
 * as missed and their errors are not counted.
 */
export function scoreCrossings(
  bench: BenchCase,
  quantity: Quantity,
  signal: readonly number[],
  inside: readonly Crossing[],
  around: readonly Crossing[],
  reported: readonly Reported[],
  yardstickAt: (trueHz: number) => Yardstick | null,
): { comparisons: Comparison[]; finding: Finding } {
  const clear = new Set(clearCrossings(bench, signal, inside).map((at) => at.frequencyHz));
  const yardsticks = around.map((at) =>
    clear.has(at.frequencyHz) ? yardstickAt(at.frequencyHz) : null,
  );
  const reach = (t: number, r: number) =>
    Math.max(3 * bench.stepHz, 10 * (yardsticks[t]?.deviation ?? 0), 3 * (reported[r].u95Hz ?? 0));
  const pairs = around
    .flatMap((at, t) =>
      reported.map((found, r) => ({
        t,
        r,
        distance: Math.abs(at.frequencyHz - found.frequencyHz),
        alike: at.kind === found.kind,
      })),
    )
    .filter(({ t, r, distance, alike }) => alike && distance <= reach(t, r))
    .sort((a, b) => a.distance - b.distance);
  const matchOf = new Map<number, number>();
  const taken = new Set<number>();
  for (const { t, r } of pairs) {
    if (matchOf.has(t) || taken.has(r)) continue;
    matchOf.set(t, r);
    taken.add(r);
  }
  const comparisons: Comparison[] = [];
  let missed = 0;
  let hedged = 0;
  around.forEach((at, t) => {
    if (!clear.has(at.frequencyHz)) return;
    const r = matchOf.get(t);
    if (r === undefined) {
      missed++;
      return;
    }
    if (reported[r].hedged) hedged++;
    comparisons.push({
      quantity,
      bench,
      truth: at.frequencyHz,
      error: reported[r].frequencyHz - at.frequencyHz,
      u95: reported[r].u95Hz,
      yardstick: yardsticks[t],
    });
  });
  const invented = reported.filter((found, r) => !taken.has(r) && !found.hedged).length;
  return { comparisons, finding: { clear: clear.size, missed, invented, hedged } };
}

/**
 * Those true crossings on both sides of which, before the next true crossing or the sweep's end,
 * the clean signal at some point of the sweep is at least three sigmas of one noisy part.
 */
function clearCrossings(
  bench: BenchCase,
  signal: readonly number[],
  crossings: readonly Crossing[],
): Crossing[] {
  const { frequencyHz } = bench.sweep;
  const bounds = [-1, ...crossings.map((at) => at.frequencyHz), Number.POSITIVE_INFINITY];
  const peaks = bounds.slice(1).map((high, i) => {
    let peak = 0;
    signal.forEach((value, p) => {
      const inSection = frequencyHz[p] > bounds[i] && frequencyHz[p] < high;
      if (inSection) peak = Math.max(peak, Math.abs(value));
    });
    return peak;
  });
  const least = clearSigmas * bench.sigma;
  return crossings.filter(
    (_, i) => peaks[i] > least && peaks[i + 1] > least && peaks[i] > 0 && peaks[i + 1] > 0,
  );
}

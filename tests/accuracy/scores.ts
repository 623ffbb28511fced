import { Random } from '../support/random.ts';
import { type BenchCase, swrLimits } from './cases.ts';
import type { Estimate } from './estimator.ts';
import type { ModelFit } from './model-fit.ts';
import {
  mismatchAtSwr,
  mismatchOf,
  swrAtMismatch,
  type TrueMinimum,
  worstMismatch,
} from './true-answers.ts';
import {
  edgeYardstick,
  minimumSwrYardstick,
  minimumYardstick,
  resonanceYardstick,
  type Yardstick,
} from './yardstick.ts';

export type Quantity = 'resonance' | 'min_swr_frequency' | 'min_swr' | 'span_edge';

/** One estimate set against the truth. Frequencies in hertz, SWR as a number. */
export interface Comparison {
  readonly quantity: Quantity;
  readonly bench: BenchCase;
  readonly truth: number;
  readonly error: number;
  readonly u95: number | null;
  /** Null where nothing was fitted (exact cases). */
  readonly yardstick: Yardstick | null;
}

/** True crossings of one sort that stand clear of the noise, and what became of them. */
export interface Finding {
  readonly clear: number;
  readonly missed: number;
  /** Reported without a doubt where no true crossing is, clear or not. */
  readonly invented: number;
  /** Clear ones that were reported, but as grazing. */
  readonly hedged: number;
}

export interface VerdictScore {
  readonly asked: number;
  readonly wrong: number;
  readonly wrongBeyondHalfWidth: number;
  /** What 95 % intervals that are exactly right would get wrong beyond their half-widths by chance. */
  readonly expectedByChance: number;
}

export interface CaseScore {
  readonly bench: BenchCase;
  readonly comparisons: readonly Comparison[];
  readonly resonances: Finding;
  readonly edges: Finding;
  /** A clear interior minimum was reported as lying at the sweep's end, or not at all. */
  readonly minimumLost: boolean;
  readonly verdicts: VerdictScore;
}

/** A crossing is clear when |signal| reaches this many sigmas on both of its sides. */
const CLEAR_SIGMAS = 3;
const BANDS_PER_CASE = 4;

interface Crossing {
  readonly frequencyHz: number;
  readonly kind: string;
}

interface Reported extends Crossing {
  readonly u95Hz: number | null;
  readonly hedged: boolean;
}

/** Sets one estimate against the truth of its case. */
export function scoreCase(bench: BenchCase, estimate: Estimate, fit: ModelFit | null): CaseScore {
  const resonances = scoreResonances(bench, estimate, fit);
  const edges = swrLimits.map((limit) => scoreEdges(bench, estimate, fit, limit));
  const minimum = scoreMinimum(bench, estimate, fit);
  return {
    bench,
    comparisons: [
      ...resonances.comparisons,
      ...edges.flatMap((edge) => edge.comparisons),
      ...minimum.comparisons,
    ],
    resonances: resonances.finding,
    edges: edges.map((edge) => edge.finding).reduce(addFindings),
    minimumLost: minimum.lost,
    verdicts: scoreVerdicts(bench, estimate),
  };
}

export function addFindings(a: Finding, b: Finding): Finding {
  return {
    clear: a.clear + b.clear,
    missed: a.missed + b.missed,
    invented: a.invented + b.invented,
    hedged: a.hedged + b.hedged,
  };
}

function scoreResonances(bench: BenchCase, estimate: Estimate, fit: ModelFit | null) {
  const signal = bench.clean.map(({ im }) => im);
  return scoreCrossings(
    bench,
    'resonance',
    signal,
    bench.truth.resonances,
    bench.truthAround.resonances,
    estimate.resonances.map((found) => ({
      frequencyHz: found.frequencyHz,
      kind: found.kind,
      u95Hz: found.frequencyU95Hz,
      hedged: found.grazing,
    })),
    (trueHz) => (fit === null ? null : resonanceYardstick(bench, fit, trueHz)),
  );
}

function scoreEdges(bench: BenchCase, estimate: Estimate, fit: ModelFit | null, limit: number) {
  const level = Math.sqrt(mismatchAtSwr(limit));
  const signal = bench.clean.map(({ re, im }) => Math.hypot(re, im) - level);
  const of = (edges: typeof bench.truth.edges) =>
    edges
      .filter((edge) => edge.maxSwr === limit)
      .map((edge) => ({ frequencyHz: edge.frequencyHz, kind: edge.side }));
  const reported: Reported[] = estimate.curve
    .spans(limit)
    .flatMap((span) => [
      ...(span.lowOpen
        ? []
        : [{ frequencyHz: span.lowHz, kind: 'low', u95Hz: span.lowU95Hz, hedged: false }]),
      ...(span.highOpen
        ? []
        : [{ frequencyHz: span.highHz, kind: 'high', u95Hz: span.highU95Hz, hedged: false }]),
    ]);
  return scoreCrossings(
    bench,
    'span_edge',
    signal,
    of(bench.truth.edges),
    of(bench.truthAround.edges),
    reported,
    (trueHz) => (fit === null ? null : edgeYardstick(bench, fit, trueHz, limit)),
  );
}

/**
 * Pairs what is reported with what is true, closest first, same kind only, no farther apart than
 * 3 steps, 10 standard deviations of the model fit or 3 stated half-widths, whichever is most.
 * True crossings that do not stand clear of the noise may be found or not; they are never counted
 * as missed and their errors are not counted.
 */
function scoreCrossings(
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
  const least = CLEAR_SIGMAS * bench.sigma;
  return crossings.filter(
    (_, i) => peaks[i] > least && peaks[i + 1] > least && peaks[i] > 0 && peaks[i + 1] > 0,
  );
}

function scoreMinimum(
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
  const floor = magnitudeAt(best.swr) + CLEAR_SIGMAS * bench.sigma;
  const rivals = [magnitude[0], magnitude[magnitude.length - 1]];
  rivals.push(...others.map((other) => magnitudeAt(other.swr)));
  return rivals.every((rival) => rival > floor) ? best : null;
}

function scoreVerdicts(bench: BenchCase, estimate: Estimate): VerdictScore {
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

import { type BenchCase, swrLimits } from './cases.ts';
import type { Comparison } from './comparison.ts';
import { addFindings, type Finding, type Reported, scoreCrossings } from './crossings.ts';
import type { Estimate } from './estimator.ts';
import { scoreMinimum } from './minimum.ts';
import type { ModelFit } from './model-fit.ts';
import { mismatchAtSwr } from './true-answers.ts';
import { scoreVerdicts, type VerdictScore } from './verdicts.ts';
import { edgeYardstick, resonanceYardstick } from './yardstick.ts';

export interface CaseScore {
  readonly bench: BenchCase;
  readonly comparisons: readonly Comparison[];
  readonly resonances: Finding;
  readonly edges: Finding;
  /** A clear interior minimum was reported as lying at the sweep's end, or not at all. */
  readonly minimumLost: boolean;
  readonly verdicts: VerdictScore;
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

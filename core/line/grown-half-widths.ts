import type { Resonance, Summary, SwrMinimum, UsableSpan } from '../analysis/summary.ts';

/** The summaries at both ends of the interval of one uncertain quantity. */
export interface SummaryPair {
  readonly plus: Summary;
  readonly minus: Summary;
}

/**
 * The summary with each half-width grown by what the pairs differ from it, as a root sum of squares.
 * A half-width that was unknown stays unknown; one becomes unknown where a pair has no counterpart.
 */
export function growHalfWidths(summary: Summary, pairs: readonly SummaryPair[]): Summary {
  const minimumOf = (minimum: SwrMinimum) => grownMinimum(minimum, pairs);
  return {
    ...summary,
    minimumSwr: summary.minimumSwr === null ? null : minimumOf(summary.minimumSwr),
    swrMinima: summary.swrMinima.map(minimumOf),
    resonances: summary.resonances.map((resonance) => grownResonance(resonance, pairs)),
    spans: summary.spans.map((span) => grownSpan(span, pairs)),
  };
}

function grownMinimum(minimum: SwrMinimum, pairs: readonly SummaryPair[]): SwrMinimum {
  const others = counterparts(pairs, (summary) =>
    nearest(minimum.frequencyHz, [
      ...summary.swrMinima,
      ...(summary.minimumSwr === null ? [] : [summary.minimumSwr]),
    ]),
  );
  return {
    ...minimum,
    frequencyU95Hz: grown(
      minimum.frequencyU95Hz,
      minimum.frequencyHz,
      others,
      (o) => o.frequencyHz,
    ),
    swrU95: grown(minimum.swrU95, minimum.swr, others, (o) => o.swr),
  };
}

function grownResonance(resonance: Resonance, pairs: readonly SummaryPair[]): Resonance {
  const others = counterparts(pairs, (summary) =>
    nearest(
      resonance.frequencyHz,
      summary.resonances.filter((other) => other.kind === resonance.kind),
    ),
  );
  return {
    ...resonance,
    frequencyU95Hz: grown(
      resonance.frequencyU95Hz,
      resonance.frequencyHz,
      others,
      (o) => o.frequencyHz,
    ),
    resistanceU95Ohm: grown(
      resonance.resistanceU95Ohm,
      resonance.resistanceOhm,
      others,
      (o) => o.resistanceOhm,
    ),
    swrU95: grown(resonance.swrU95, resonance.swr, others, (o) => o.swr),
    qU95: grown(resonance.qU95, resonance.q, others, (o) => o.q),
  };
}

function grownSpan(span: UsableSpan, pairs: readonly SummaryPair[]): UsableSpan {
  const others = counterparts(pairs, (summary) => overlapping(span, summary.spans));
  return {
    ...span,
    lowU95Hz: span.lowOpen
      ? span.lowU95Hz
      : grown(span.lowU95Hz, span.lowHz, others, (o) => o.lowHz),
    highU95Hz: span.highOpen
      ? span.highU95Hz
      : grown(span.highU95Hz, span.highHz, others, (o) => o.highHz),
  };
}

type Counterparts<T> = readonly (readonly [plus: T | null, minus: T | null])[];

function counterparts<T>(
  pairs: readonly SummaryPair[],
  find: (summary: Summary) => T | null,
): Counterparts<T> {
  return pairs.map(({ plus, minus }) => [find(plus), find(minus)] as const);
}

function grown<T>(
  halfWidth: number | null,
  value: number | null,
  others: Counterparts<T>,
  read: (other: T) => number | null,
): number | null {
  if (halfWidth === null || value === null) return null;
  let sum = halfWidth * halfWidth;
  for (const pair of others) {
    let largest = 0;
    for (const other of pair) {
      const moved = other === null ? null : read(other);
      if (moved === null) return null;
      largest = Math.max(largest, Math.abs(moved - value));
    }
    sum += largest * largest;
  }
  return Math.sqrt(sum);
}

function nearest<T extends { readonly frequencyHz: number }>(
  frequencyHz: number,
  candidates: readonly T[],
): T | null {
  let best: T | null = null;
  for (const candidate of candidates) {
    const distance = Math.abs(candidate.frequencyHz - frequencyHz);
    if (best === null || distance < Math.abs(best.frequencyHz - frequencyHz)) best = candidate;
  }
  return best;
}

function overlapping(span: UsableSpan, candidates: readonly UsableSpan[]): UsableSpan | null {
  let best: UsableSpan | null = null;
  let widest = 0;
  for (const candidate of candidates) {
    if (candidate.maxSwr !== span.maxSwr) continue;
    const common = Math.min(span.highHz, candidate.highHz) - Math.max(span.lowHz, candidate.lowHz);
    if (common > widest) [best, widest] = [candidate, common];
  }
  return best;
}

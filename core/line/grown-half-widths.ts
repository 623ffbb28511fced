import type { Resonance, Summary, SwrMinimum, UsableSpan } from '../analysis/summary.ts';

/** The summaries at both ends of the interval of one uncertain quantity. */
export interface SummaryPair {
  readonly plus: Summary;
  readonly minus: Summary;
}

/**
 * The summary with each half-width grown by what the pairs differ from `base`, as a root sum of
 * squares. `base` is the summary itself, or one of fewer of its points if the pairs were made of
 * those. A half-width that was unknown stays unknown; one becomes unknown where base or a pair has no
 * counterpart.
 */
export function growHalfWidths(
  summary: Summary,
  base: Summary,
  pairs: readonly SummaryPair[],
): Summary {
  const family: Family = { base, pairs };
  const minimumOf = (minimum: SwrMinimum) => grownMinimum(minimum, family);
  return {
    ...summary,
    minimumSwr: summary.minimumSwr === null ? null : minimumOf(summary.minimumSwr),
    swrMinima: summary.swrMinima.map(minimumOf),
    resonances: summary.resonances.map((resonance) => grownResonance(resonance, family)),
    spans: summary.spans.map((span) => grownSpan(span, family)),
  };
}

function grownMinimum(minimum: SwrMinimum, family: Family): SwrMinimum {
  const others = counterparts(family, (summary) =>
    nearest(minimum.frequencyHz, [
      ...summary.swrMinima,
      ...(summary.minimumSwr === null ? [] : [summary.minimumSwr]),
    ]),
  );
  return {
    ...minimum,
    frequencyU95Hz: grown(minimum.frequencyU95Hz, others, (o) => o.frequencyHz),
    swrU95: grown(minimum.swrU95, others, (o) => o.swr),
  };
}

function grownResonance(resonance: Resonance, family: Family): Resonance {
  const others = counterparts(family, (summary) =>
    nearest(
      resonance.frequencyHz,
      summary.resonances.filter((other) => other.kind === resonance.kind),
    ),
  );
  return {
    ...resonance,
    frequencyU95Hz: grown(resonance.frequencyU95Hz, others, (o) => o.frequencyHz),
    resistanceU95Ohm: grown(resonance.resistanceU95Ohm, others, (o) => o.resistanceOhm),
    swrU95: grown(resonance.swrU95, others, (o) => o.swr),
    qU95: grown(resonance.qU95, others, (o) => o.q),
  };
}

function grownSpan(span: UsableSpan, family: Family): UsableSpan {
  const others = counterparts(family, (summary) => overlapping(span, summary.spans));
  return {
    ...span,
    lowU95Hz: span.lowOpen ? span.lowU95Hz : grown(span.lowU95Hz, others, (o) => o.lowHz),
    highU95Hz: span.highOpen ? span.highU95Hz : grown(span.highU95Hz, others, (o) => o.highHz),
  };
}

interface Family {
  readonly base: Summary;
  readonly pairs: readonly SummaryPair[];
}

/** The same item in the other summaries; null where one does not have it. */
interface Counterparts<T> {
  readonly base: T | null;
  readonly pairs: readonly (readonly [plus: T | null, minus: T | null])[];
}

function counterparts<T>(
  { base, pairs }: Family,
  find: (summary: Summary) => T | null,
): Counterparts<T> {
  return {
    base: find(base),
    pairs: pairs.map(({ plus, minus }) => [find(plus), find(minus)] as const),
  };
}

function grown<T>(
  halfWidth: number | null,
  others: Counterparts<T>,
  read: (other: T) => number | null,
): number | null {
  const value = others.base === null ? null : read(others.base);
  if (halfWidth === null || value === null) return null;
  let sum = halfWidth * halfWidth;
  for (const pair of others.pairs) {
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

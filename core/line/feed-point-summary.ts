import type { Summary } from '../analysis/summary.ts';
import { ok, type Result } from '../result.ts';
import type { Sweep } from '../sweep.ts';
import { type Conditioning, judgeRemoval } from './conditioning.ts';
import type { FeedLine } from './feed-line.ts';
import { growHalfWidths, type SummaryPair } from './grown-half-widths.ts';
import { type LineError, toFeedPoint } from './line.ts';
import { removeLine } from './removal-half-width.ts';
import { lineVariants } from './variants.ts';

/** A summary at the feed point and how far it can be relied on. */
export interface FeedPointSummary {
  readonly summary: Summary;
  readonly conditioning: Conditioning;
}

/**
 * Removes the line, summarises what is left by `summarise`, and grows the half-widths by what the
 * uncertain quantities of the line do to each figure (each is moved to both ends of its interval
 * and the sweep summarised again). `measuredU95` is the half-width of the measured reflection.
 */
export function feedPointSummary(
  measured: Sweep,
  line: FeedLine,
  measuredU95: number,
  summarise: (sweep: Sweep) => Summary,
): Result<FeedPointSummary, LineError> {
  const removal = removeLine(measured, line, measuredU95);
  if (!removal.ok) return removal;
  const pairs: SummaryPair[] = [];
  for (const variant of lineVariants(line)) {
    const plus = toFeedPoint(measured, variant.plus);
    if (!plus.ok) return plus;
    const minus = toFeedPoint(measured, variant.minus);
    if (!minus.ok) return minus;
    pairs.push({ plus: summarise(plus.value), minus: summarise(minus.value) });
  }
  const conditioning = judgeRemoval(removal.value);
  const grown = growHalfWidths(summarise(removal.value.sweep), pairs);
  const summary: Summary = {
    ...grown,
    plane: 'feed_point',
    assumptions: [...grown.assumptions, ...line.assumptions],
    cautions: [...conditioning.reasons, ...grown.cautions],
  };
  return ok({ summary, conditioning });
}

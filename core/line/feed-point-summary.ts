import type { Summary } from '../analysis/summary.ts';
import type { Assumption } from '../formats/read-types.ts';
import { ok, type Result } from '../result.ts';
import type { Sweep } from '../sweep.ts';
import { type Conditioning, judgeRemoval } from './conditioning.ts';
import { extrapolatedLoss, type FeedLine } from './feed-line.ts';
import { growHalfWidths, type SummaryPair } from './grown-half-widths.ts';
import { type LineError, toFeedPoint } from './line.ts';
import { type Removal, removeLine } from './removal-half-width.ts';
import { lineVariants } from './variants.ts';

/** A summary at the feed point and how far it can be relied on. */
export interface FeedPointSummary {
  readonly summary: Summary;
  readonly conditioning: Conditioning;
  readonly removal: Removal;
}

/** Half-width of a measured reflection where none is stated: an effective directivity of 40 dB. */
const USUAL_U95 = 0.01;
/** What a line does to a figure is found from at most this many points. */
const MOST_POINTS = 1001;

/**
 * Removes the line, summarises what is left by `summarise`, and grows the half-widths by what the
 * uncertain quantities of the line do to each figure (each is moved to both ends of its interval
 * and the sweep summarised again). `measuredU95` is the half-width of the measured reflection, by which the
 * removal is judged; null: not known, 0.01 is assumed and said.
 */
export function feedPointSummary(
  measured: Sweep,
  line: FeedLine,
  measuredU95: number | null,
  summarise: (sweep: Sweep) => Summary,
): Result<FeedPointSummary, LineError> {
  const removal = removeLine(measured, line, measuredU95 ?? USUAL_U95);
  if (!removal.ok) return removal;
  const few = thinned(measured);
  const pairs: SummaryPair[] = [];
  for (const variant of lineVariants(line)) {
    const plus = toFeedPoint(few, variant.plus);
    if (!plus.ok) return plus;
    const minus = toFeedPoint(few, variant.minus);
    if (!minus.ok) return minus;
    pairs.push({ plus: summarise(plus.value), minus: summarise(minus.value) });
  }
  const halfWidthAssumed: readonly Assumption[] =
    measuredU95 === null
      ? [
          {
            code: 'reflection_half_width_assumed',
            detail: `The analyzer's own error is not stated; +-${USUAL_U95} of reflection is assumed.`,
          },
        ]
      : [];
  const conditioning = judgeRemoval(removal.value);
  const whole = summarise(removal.value.sweep);
  const base = few === measured ? whole : summarise(thinned(removal.value.sweep));
  const grown = growHalfWidths(whole, base, pairs);
  const summary: Summary = {
    ...grown,
    plane: 'feed_point',
    assumptions: [
      ...grown.assumptions,
      ...line.assumptions,
      ...extrapolatedLoss(line, grown.span.lowHz, grown.span.highHz),
      ...halfWidthAssumed,
    ],
    cautions: [...conditioning.reasons, ...grown.cautions],
  };
  return ok({ summary, conditioning, removal: removal.value });
}

/** Every n-th point and the last, so that the repeated summaries of a long sweep stay cheap. */
function thinned(sweep: Sweep): Sweep {
  const last = sweep.frequencyHz.length - 1;
  const every = Math.ceil((last + 1) / MOST_POINTS);
  if (every === 1 || sweep.phase === 'none') return sweep;
  const keep = (_: number, i: number) => i % every === 0 || i === last;
  return {
    ...sweep,
    frequencyHz: sweep.frequencyHz.filter(keep),
    reflectionRe: sweep.reflectionRe.filter(keep),
    reflectionIm: sweep.reflectionIm.filter(keep),
  };
}

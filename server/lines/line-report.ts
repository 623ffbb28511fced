import type { Summary } from '../../core/analysis/summary.ts';
import type { Assumption } from '../../core/formats/read-types.ts';
import { type LineReport, lineReport } from '../../core/line/both-ends.ts';
import type { Conditioning } from '../../core/line/conditioning.ts';
import { extrapolatedLoss } from '../../core/line/feed-line.ts';
import type { Sweep } from '../../core/sweep.ts';
import type { LineBasis } from './line-basis.ts';

/** What the line does to an answer, beside the answer. */
export interface LineView extends LineReport {
  readonly assumptions: readonly Assumption[];
  /** How far an answer at the feed point holds; null where no line was removed. */
  readonly conditioning: Conditioning | null;
}

/** Both ends of the line at the frequencies of a summary; `measured` is the sweep at its own plane. */
export function lineViewOf(
  { resolved }: LineBasis,
  measured: Sweep,
  summary: Summary,
  maxSwr: number,
  conditioning: Conditioning | null,
): LineView {
  const { ends, flags } = lineReport(measured, summary, resolved, maxSwr);
  const { lowHz, highHz } = summary.span;
  const atFeedPoint = summary.plane === 'feed_point';
  return {
    ends,
    // A resonance at the feed point is the antenna's own.
    flags: atFeedPoint ? flags.filter(({ code }) => code !== 'line_moves_resonance') : flags,
    assumptions: resolved.ok
      ? [...resolved.value.assumptions, ...extrapolatedLoss(resolved.value, lowHz, highHz)]
      : [],
    conditioning,
  };
}

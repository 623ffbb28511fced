import {
  type FeedLine,
  type FeedLineError,
  type FeedLineSection,
  resolveFeedLine,
} from '../../core/line/feed-line.ts';
import { type LineError, toFeedPoint } from '../../core/line/line.ts';
import { fail, ok, type Result } from '../../core/result.ts';
import type { CableRecord, SweepMeasured } from '../store/port.ts';
import { cableLookUp } from './club-cables.ts';

/** What lies between analyzer and antenna: as the record states it, and as calculations take it. */
export interface LineBasis {
  readonly feedLine: readonly FeedLineSection[] | null;
  /** What each section's cable is taken for; null: not on the list. */
  readonly cables: readonly (string | null)[];
  readonly resolved: Result<FeedLine, FeedLineError>;
}

/** The line of an antenna; `own` are the club's own cables that it names. */
export function lineBasisOf(
  feedLine: readonly FeedLineSection[] | null,
  own: readonly CableRecord[],
): LineBasis {
  const cableOf = cableLookUp(own);
  return {
    feedLine,
    cables: (feedLine ?? []).map(({ cable }) => cableOf(cable)?.id ?? null),
    resolved: resolveFeedLine(feedLine, cableOf),
  };
}

/**
 * The line that has to be removed to see the feed point; one without a section leaves the sweep as
 * it is, whatever its phase. Errors: the line is not known enough, or the sweep cannot be moved.
 */
export function removableLine(
  { resolved }: LineBasis,
  { phase, referenceOhm, highHz }: Pick<SweepMeasured, 'phase' | 'referenceOhm' | 'highHz'>,
): Result<FeedLine, FeedLineError | LineError> {
  if (!resolved.ok || resolved.value.sections.length === 0) return resolved;
  const nothing = Float64Array.of(0);
  const frequencyHz = Float64Array.of(highHz);
  // Whether it can be moved follows from its phase and the loss at its upper end alone.
  const moved = toFeedPoint(
    phase === 'none'
      ? { phase, frequencyHz, referenceOhm, reflectionMagnitude: nothing }
      : { phase, frequencyHz, referenceOhm, reflectionRe: nothing, reflectionIm: nothing },
    resolved.value,
  );
  return moved.ok ? ok(resolved.value) : fail(moved.error);
}

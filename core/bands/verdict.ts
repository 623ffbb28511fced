import type { UsableSpan } from '../analysis/summary.ts';
import { type HzRange, intersectRanges, mergeRanges, widthOf } from './ranges.ts';
import type { UsableVerdict } from './usable-report.ts';

/** Frequencies are written to the hertz in most files: a gap up to this is rounding, not a gap. */
const roundingHz = 1;

/** Widths closer than this are equal: the noise of subtraction at gigahertz, with room. */
const equalWidthHz = 1e-3;

/** The swept part of ranges; a sweep of one point inside a range sweeps a part of no width. */
export function sweptPart(ranges: readonly HzRange[], sweep: HzRange): readonly HzRange[] {
  const touches = (range: HzRange) =>
    sweep.lowHz === sweep.highHz
      ? range.lowHz <= sweep.lowHz && sweep.lowHz <= range.highHz
      : range.lowHz < sweep.highHz && sweep.lowHz < range.highHz;
  return ranges.filter(touches).map((range) => ({
    lowHz: sweep.lowHz - range.lowHz <= roundingHz ? range.lowHz : sweep.lowHz,
    highHz: range.highHz - sweep.highHz <= roundingHz ? range.highHz : sweep.highHz,
  }));
}

/**
 * The part of `swept` that lies in the spans. Edges that are SWR crossings are moved outwards by
 * `growBy` half-widths (inwards if negative); edges at which the sweep ended stay.
 */
export function usablePart(
  swept: readonly HzRange[],
  spans: readonly UsableSpan[],
  growBy = 0,
): readonly HzRange[] {
  const edges = spans
    .map((span) => ({
      lowHz: span.lowHz - (span.lowOpen ? roundingHz : growBy * (span.lowU95Hz ?? 0)),
      highHz: span.highHz + (span.highOpen ? roundingHz : growBy * (span.highU95Hz ?? 0)),
    }))
    .filter(({ lowHz, highHz }) => lowHz < highHz);
  return intersectRanges(swept, mergeRanges(edges));
}

export interface Judgement {
  readonly verdict: UsableVerdict;
  readonly sweptFraction: number;
  readonly usableFraction: number;
}

/**
 * Judges permitted ranges by what of them was swept and what of that is usable. The verdict claims
 * no more than holds whatever the unswept part may be:
 *
 * | swept | usable of the swept | verdict |
 * |---|---|---|
 * | nothing | - | `not_swept` |
 * | all | all | `usable` |
 * | all or a part | a part | `partly_usable` |
 * | all | none | `not_usable` |
 * | a part | all, or none | `partly_swept` |
 */
export function judge(
  ranges: readonly HzRange[],
  swept: readonly HzRange[],
  usable: readonly HzRange[],
): Judgement {
  if (swept.length === 0) return { verdict: 'not_swept', sweptFraction: 0, usableFraction: 0 };
  const permittedHz = widthOf(ranges);
  const sweptHz = widthOf(swept);
  const usableHz = widthOf(usable);
  const allSwept = permittedHz - sweptHz < equalWidthHz;
  const allUsable = sweptHz - usableHz < equalWidthHz;
  const sweptFraction = allSwept ? 1 : sweptHz / permittedHz;
  const usableFraction = allUsable ? sweptFraction : usableHz / permittedHz;
  return { verdict: verdictOf(allSwept, allUsable, usableHz > 0), sweptFraction, usableFraction };
}

function verdictOf(allSwept: boolean, allUsable: boolean, someUsable: boolean): UsableVerdict {
  if (someUsable && !allUsable) return 'partly_usable';
  if (!allSwept) return 'partly_swept';
  return someUsable ? 'usable' : 'not_usable';
}

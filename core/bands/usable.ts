import { standingCautions } from '../advice/cautions.ts';
import type { UsableSpan } from '../analysis/summary.ts';
import type { SwrCurve, SwrExtremes } from '../analysis/swr-curve.ts';
import { bandsOf, type PlanBand } from './bands-of.ts';
import type { BandPlan, BandSegment } from './plan.ts';
import { planCautions } from './plan-cautions.ts';
import { type HzRange, intersectRanges, widthOf } from './ranges.ts';
import { extremesOver } from './swept-extremes.ts';
import { bandDetail } from './usable-detail.ts';
import type { BandUse, Permission, RangeUse, SegmentUse, UsableReport } from './usable-report.ts';
import { type Judgement, judge, sweptPart, usablePart } from './verdict.ts';

export interface UsableOptions {
  /** The limit: usable is SWR <= maxSwr. */
  readonly maxSwr: number;
  /** The operator class to judge by; null or absent: the rows of every class. */
  readonly licence?: string | null;
  /** Bands that the antenna is meant for: reported even where the sweep does not touch them. */
  readonly designBands?: readonly string[];
}

/**
 * Reports which part of each band of `plan` is usable, for the bands that the sweep touches and the
 * antenna's design bands, ascending in frequency.
 *
 * - Permission comes first: limits are the plan's generally permitted rows, merged where they touch
 *   (see `bandsOf`). Gaps between rows, as between channels, belong to no fraction and no verdict.
 *   A row with status `national` never counts as usable: it adds nothing to `usableFraction`, and a
 *   band or segment that has nothing else is `not_usable` once swept; its SWR is told all the same.
 * - Swept and usable are two fractions of the same permitted width: unswept is not usable. A sweep
 *   that ends within 1 Hz of an edge reaches it.
 * - The verdict claims no more than holds whatever the unswept part may be (see `judge`).
 * - `marginal`: the verdict would be another one if a crossing lay one half-width elsewhere, or the
 *   worst or least SWR is within its half-width of the limit. Without half-widths (null) nothing is
 *   marginal: an unknown uncertainty is not a small one, and the curve says which it is.
 * - Segments are judged alike over their generally permitted part. Voluntary segments inform; they
 *   take nothing from the band.
 */
export function usableBands(curve: SwrCurve, plan: BandPlan, options: UsableOptions): UsableReport {
  const { maxSwr, licence = null, designBands = [] } = options;
  const asked: Asked = { curve, maxSwr, spans: curve.spans(maxSwr) };
  const known = bandsOf(plan, { licence });
  const reported = known.filter(
    (band) => designBands.includes(band.band) || sweptPart(measureOf(band), curve).length > 0,
  );
  const bands = reported.map((band) => bandUse(asked, band));
  return {
    plan: plan.id,
    licence,
    maxSwr,
    bands,
    cautions: [
      ...planCautions({ plan, licence, designBands, known, reported }),
      ...standingCautions,
    ],
  };
}

/** What is asked of every band alike. */
interface Asked {
  readonly curve: SwrCurve;
  readonly maxSwr: number;
  readonly spans: readonly UsableSpan[];
}

function measureOf(band: PlanBand): readonly HzRange[] {
  return band.ranges.length > 0 ? band.ranges : band.nationalRanges;
}

function bandUse(asked: Asked, band: PlanBand): BandUse {
  const permission = permissionOf(band.ranges, band.nationalRanges);
  const { use, spans } = rangeUse(asked, band, measureOf(band), permission);
  return {
    band: band.band,
    ...use,
    ranges: band.ranges,
    detail: bandDetail(use, asked.maxSwr),
    spans,
    segments: band.segments.map((segment) => segmentUse(asked, band, segment)),
  };
}

function segmentUse(asked: Asked, band: PlanBand, segment: BandSegment): SegmentUse {
  const general = intersectRanges([segment], band.ranges);
  const isWhole = widthOf(general) === segment.highHz - segment.lowHz;
  const permission = permissionOf(general, isWhole ? [] : [segment]);
  const measure = general.length > 0 ? general : [segment];
  return {
    use: segment.use,
    family: segment.family,
    status: segment.status ?? null,
    licence: segment.licence ?? null,
    maxBandwidthHz: segment.maxBandwidthHz ?? null,
    ...rangeUse(asked, segment, measure, permission).use,
  };
}

function permissionOf(general: readonly HzRange[], national: readonly HzRange[]): Permission {
  if (general.length === 0) return 'national';
  return national.length === 0 ? 'general' : 'part_national';
}

function rangeUse(
  asked: Asked,
  { lowHz, highHz }: HzRange,
  measure: readonly HzRange[],
  permission: Permission,
): { readonly use: RangeUse; readonly spans: readonly HzRange[] } {
  const swept = sweptPart(measure, asked.curve);
  const extremes = extremesOver(asked.curve, swept);
  const permitted = permission !== 'national';
  const judgeWith = (spans: readonly HzRange[]): Judgement => judge(measure, swept, spans);
  const spans = permitted ? usablePart(swept, asked.spans) : [];
  const judgement = judgeWith(spans);
  const use: RangeUse = {
    lowHz,
    highHz,
    permission,
    ...judgement,
    verdict: permitted || swept.length === 0 ? judgement.verdict : 'not_usable',
    marginal: permitted && isMarginal(asked, swept, extremes, judgeWith),
    worstSwr: extremes?.worstSwr ?? null,
    worstSwrHz: extremes?.worstSwrHz ?? null,
    worstSwrU95: extremes?.worstSwrU95 ?? null,
    minimumSwr: extremes?.minimumSwr ?? null,
    minimumSwrHz: extremes?.minimumSwrHz ?? null,
  };
  return { use, spans };
}

function isMarginal(
  { curve, maxSwr, spans }: Asked,
  swept: readonly HzRange[],
  extremes: SwrExtremes | null,
  judgeWith: (usable: readonly HzRange[]) => Judgement,
): boolean {
  if (extremes === null) return false;
  const grown = judgeWith(usablePart(swept, spans, 1)).verdict;
  const shrunk = judgeWith(usablePart(swept, spans, -1)).verdict;
  if (grown !== shrunk) return true;
  // The half-width of the least SWR is asked for as that of the worst on the one frequency.
  const { minimumSwrHz } = extremes;
  const least = curve.extremes(minimumSwrHz, minimumSwrHz);
  return [extremes, least].some(
    (at) => at?.worstSwr != null && Math.abs(at.worstSwr - maxSwr) <= (at.worstSwrU95 ?? 0),
  );
}

import { type BandName, type BandPlan, type BandSegment, bandNames } from './plan.ts';
import { findPlan } from './plans.ts';
import { type HzRange, mergeRanges } from './ranges.ts';

/** One band as a plan limits it. */
export interface PlanBand {
  readonly band: BandName;
  /**
   * The lowest and highest edge of `ranges` (of `nationalRanges` where nothing is generally
   * permitted); between them there may be gaps.
   */
  readonly lowHz: number;
  readonly highHz: number;
  /** What is generally permitted, merged: the measure of every fraction. May be empty. */
  readonly ranges: readonly HzRange[];
  /** Rows that hold only where an administration or a named-country footnote permits. */
  readonly nationalRanges: readonly HzRange[];
  /** The plan's own rows in this band, ascending. */
  readonly segments: readonly BandSegment[];
  /** The rows that set the limits: the plan's own, or those of the plans a band plan nests in. */
  readonly limitRows: readonly BandSegment[];
}

export interface BandsOfOptions {
  /** The operator class to judge by; null or absent: the rows of every class. */
  readonly licence?: string | null;
}

/**
 * The bands of a plan with their limits, ascending in frequency.
 *
 * Precedence: a licence plan is judged by its own rows alone, so national law goes before the
 * allocation it nests in, whether it gives less or more. A voluntary band plan limits nothing: its
 * rows are segments laid over the limits of the plans that it nests in. A row whose status is
 * `national` is never generally permitted; it is kept apart in `nationalRanges`.
 */
export function bandsOf(plan: BandPlan, options: BandsOfOptions = {}): readonly PlanBand[] {
  const licence = options.licence ?? null;
  const own = rowsFor(plan, licence);
  const limits = limitPlansOf(plan).flatMap((limitPlan) => rowsFor(limitPlan, licence));
  return bandNames.flatMap((band) => {
    const segments = own.filter((row) => row.band === band);
    const limitRows = limits.filter((row) => row.band === band);
    if (segments.length === 0 || limitRows.length === 0) return [];
    const ranges = mergeRanges(limitRows.filter((row) => row.status !== 'national'));
    const nationalRanges = mergeRanges(limitRows.filter((row) => row.status === 'national'));
    const outer = ranges.length > 0 ? ranges : nationalRanges;
    const lowHz = outer[0].lowHz;
    const highHz = outer[outer.length - 1].highHz;
    return [{ band, lowHz, highHz, ranges, nationalRanges, segments, limitRows }];
  });
}

/** The operator classes that a plan (or the licence plan it nests in) knows, in its order. */
export function licencesOf(plan: BandPlan): readonly string[] {
  const rows = limitPlansOf(plan).flatMap((limitPlan) => limitPlan.segments);
  return [...new Set(rows.flatMap((row) => row.licence ?? []))];
}

/** The plans whose rows set the limits: the plan itself unless it is a voluntary band plan. */
export function limitPlansOf(plan: BandPlan): readonly BandPlan[] {
  if (plan.kind !== 'bandplan') return [plan];
  return plan.nestsIn.flatMap((id) => findPlan(id) ?? []);
}

function rowsFor(plan: BandPlan, licence: string | null): readonly BandSegment[] {
  if (licence === null) return plan.segments;
  return plan.segments.filter((row) => row.licence === undefined || row.licence === licence);
}

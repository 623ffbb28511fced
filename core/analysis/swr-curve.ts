import type { UsableSpan } from './summary.ts';

/** Largest and smallest SWR on a range, both refined below the grid. */
export interface SwrExtremes {
  readonly worstSwr: number | null;
  readonly worstSwrHz: number;
  readonly worstSwrU95: number | null;
  readonly minimumSwr: number | null;
  readonly minimumSwrHz: number;
}

/** The refined SWR of one sweep against one reference, made once and asked many times. */
export interface SwrCurve {
  readonly lowHz: number;
  readonly highHz: number;
  /** The usable spans over the whole sweep, ascending. */
  spans(maxSwr: number): readonly UsableSpan[];
  /** Extremes on the swept part of [lowHz, highHz]; null where nothing of it was swept. */
  extremes(lowHz: number, highHz: number): SwrExtremes | null;
}

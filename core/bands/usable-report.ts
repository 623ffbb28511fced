import type { Caution } from '../analysis/summary.ts';
import type { BandName, SegmentFamily, SegmentStatus } from './plan.ts';
import type { HzRange } from './ranges.ts';

/**
 * `usable`: all of it was swept and all of it is within the limit. `partly_usable`: some swept part
 * is within the limit and some is not. `not_usable`: all of it was swept, none is within the limit
 * (or none is generally permitted). `partly_swept`: the part that was swept does not decide.
 * `not_swept`: no part was swept.
 */
export type UsableVerdict =
  | 'usable'
  | 'partly_usable'
  | 'not_usable'
  | 'partly_swept'
  | 'not_swept';

/** `national`: only where an administration permits it. `part_national`: a part of it is so. */
export type Permission = 'general' | 'part_national' | 'national';

/** How far SWR serves on a band or a segment. Fractions are of what is generally permitted. */
export interface RangeUse {
  readonly lowHz: number;
  readonly highHz: number;
  readonly permission: Permission;
  readonly verdict: UsableVerdict;
  /** The verdict hangs on a difference smaller than the half-width of the measurement. */
  readonly marginal: boolean;
  /** Swept width / permitted width, 0 to 1. */
  readonly sweptFraction: number;
  /** Width that was swept and is within the limit / permitted width; never above `sweptFraction`. */
  readonly usableFraction: number;
  /** Null where nothing was swept, and where the reflection is total (|reflection| >= 1). */
  readonly worstSwr: number | null;
  readonly worstSwrHz: number | null;
  readonly worstSwrU95: number | null;
  readonly minimumSwr: number | null;
  readonly minimumSwrHz: number | null;
}

export interface SegmentUse extends RangeUse {
  readonly use: string;
  readonly family: SegmentFamily;
  readonly status: SegmentStatus | null;
  readonly licence: string | null;
  readonly maxBandwidthHz: number | null;
}

export interface BandUse extends RangeUse {
  readonly band: BandName;
  /** What is generally permitted, merged; a band of channels has one range for each. */
  readonly ranges: readonly HzRange[];
  /** The verdict in a sentence. */
  readonly detail: string;
  /** Where SWR is within the limit, cut to what was swept and is generally permitted. */
  readonly spans: readonly HzRange[];
  readonly segments: readonly SegmentUse[];
}

/** Which part of each band is usable at an SWR limit, judged by one plan. */
export interface UsableReport {
  readonly plan: string;
  readonly licence: string | null;
  readonly maxSwr: number;
  readonly bands: readonly BandUse[];
  readonly cautions: readonly Caution[];
}

import type { QualityFlag } from '../analysis/summary.ts';
import type { AntennaKind } from './antenna-kind.ts';

/** What a keeper can do about a finding. */
export type NextStep =
  | 'trim'
  | 'match'
  | 'line_check'
  | 'measure_at_feed_point'
  | 'sweep_again'
  | 'leave';

/** A plain sentence with a code, and what to do next. */
export interface Finding {
  readonly code: string;
  readonly detail: string;
  readonly next: NextStep;
  /** The band or segment it concerns; null for the whole sweep. */
  readonly band: string | null;
}

/** A part of the spectrum that a resonance should lie in. */
export interface Aim {
  readonly name: string;
  readonly lowHz: number;
  readonly highHz: number;
}

/** What is known of the antenna beside its sweep. */
export interface FindingFacts {
  readonly kind: AntennaKind;
  readonly maxSwr: number;
  /** Bands that it is meant for; empty: every band of the report. */
  readonly designBands: readonly string[];
  /** Segments it is meant for inside its bands, for instance where its keeper works most. */
  readonly aims: readonly Aim[];
  /** What the line does to the answer; see `lineReport`. */
  readonly lineFlags: readonly QualityFlag[];
}

/** Megahertz to the kilohertz, for sentences. */
export function mhz(hz: number): string {
  return (hz / 1e6).toFixed(3);
}

/** The size of a difference in whole kilohertz, for sentences. */
export function khz(hz: number): string {
  return (Math.abs(hz) / 1e3).toFixed(0);
}

import type { ComponentQ } from './element.ts';

export type MatchKind =
  | 'l_network'
  | 'quarter_wave'
  | 'series_section'
  | 'open_stub'
  | 'short_stub'
  | 'transformer';

/** What is to be matched, where and how well. */
export interface MatchRequest {
  /** Where the sweep holds, and so where the network stands. */
  readonly place: 'feed_point' | 'line_end';
  readonly lowHz: number;
  readonly highHz: number;
  readonly maxSwr: number;
  readonly targetOhm: number;
  /** Null: the geometric middle of what was swept of the band. */
  readonly designHz: number | null;
  readonly componentQ: ComponentQ;
  /** Of the main line, from which distances and stubs are cut. */
  readonly velocityFactor: number;
}

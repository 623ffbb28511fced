import type { Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';

/** What the numbers of a point are. */
export interface PointLayout {
  readonly ports: 1 | 2;
  /** Offsets of the pairs behind the frequency; null where the file does not hold the entry. */
  readonly at11: number;
  readonly at12: number | null;
  readonly at21: number | null;
  readonly at22: number | null;
}

/** Where the numbers of each point stand in the table, and what they are. */
export interface Points {
  readonly layout: PointLayout;
  readonly count: number;
  /** Index of each point's frequency among the values; may be longer than `count`. */
  readonly start: Int32Array;
  /** One-based line of each point; may be longer than `count`. */
  readonly line: Int32Array;
  readonly assumptions: readonly Assumption[];
}

export type ReadPoints = Result<Points, ReadError>;

export const onePort: PointLayout = { ports: 1, at11: 1, at12: null, at21: null, at22: null };
/** The order of version 1: 11, 21, 12, 22. */
export const twoPort: PointLayout = { ports: 2, at11: 1, at21: 3, at12: 5, at22: 7 };

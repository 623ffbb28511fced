import type { Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';

/** Where the numbers of each point stand in the table, and what they are. */
export interface Points {
  readonly ports: 1 | 2;
  /** Index of each point's frequency among the values. */
  readonly start: Int32Array;
  readonly count: number;
  /** One-based line of each point. */
  readonly line: Int32Array;
  /** Offsets of the pairs behind the frequency; null where the file does not hold the entry. */
  readonly at11: number;
  readonly at12: number | null;
  readonly at21: number | null;
  readonly at22: number | null;
  readonly assumptions: readonly Assumption[];
}

export type ReadPoints = Result<Points, ReadError>;

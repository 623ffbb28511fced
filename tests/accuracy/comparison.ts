import type { BenchCase } from './cases.ts';
import type { Yardstick } from './yardstick.ts';

export type Quantity = 'resonance' | 'min_swr_frequency' | 'min_swr' | 'span_edge';

/** One estimate set against the truth. Frequencies in hertz, SWR as a number. */
export interface Comparison {
  readonly quantity: Quantity;
  readonly bench: BenchCase;
  readonly truth: number;
  readonly error: number;
  readonly u95: number | null;
  /** Null where nothing was fitted (exact cases). */
  readonly yardstick: Yardstick | null;
}

/** What counts as standing clear of the noise: this many sigmas of one noisy part. */
export const clearSigmas = 3;

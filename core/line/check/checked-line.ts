import type { Absence, Caution } from '../../analysis/summary.ts';
import type { Assumption } from '../../formats/read-types.ts';
import type { Cable } from '../cable.ts';
import type { EndLoss } from './end-loss.ts';
import type { ReflectionTrace } from './trace.ts';
import type { WindowId } from './windows.ts';

export type FarEnd = 'open' | 'short' | 'loaded';

/** What is known of the line before it is checked. */
export interface LineUnderTest {
  readonly farEnd: FarEnd;
  /** Null: none on the list; distances then hold for `velocityFactor`, and no loss is expected. */
  readonly cable: Cable | null;
  /** Instead of the cable's own; needed where there is no cable. */
  readonly velocityFactor: number | null;
  readonly velocityFactorU95: number | null;
  readonly lengthM: number | null;
  readonly lengthU95M: number | null;
  readonly window: WindowId;
  /** Raise the trace by the cable's loss, so that distant reflections read as they are. */
  readonly compensateLoss: boolean;
}

/** One place where the wave turns back, as a report shows it. */
export interface LocatedDiscontinuity {
  readonly distanceM: number;
  /** From noise and velocity factor. */
  readonly distanceU95M: number;
  /** |reflection| as it arrives at the analyzer. */
  readonly magnitude: number;
  /** |reflection| at its place, freed of the cable's two-way loss; null without a cable. */
  readonly magnitudeThere: number | null;
  /** `echo`: a reflection that went to and fro between others, or lies beyond the end. */
  readonly kind: 'near_end' | 'on_line' | 'end' | 'echo';
}

export interface LineCheck {
  readonly farEnd: FarEnd;
  readonly velocityFactor: number;
  readonly velocityFactorU95: number;
  /** Length of the same delay in vacuum; null where no end was seen. */
  readonly electricalLengthM: number | null;
  readonly electricalLengthU95M: number | null;
  /** With the velocity factor above. */
  readonly lengthM: number | null;
  readonly lengthU95M: number | null;
  /** `phase`: slope of the phase of the end's reflection. `peak`: place of its peak in the trace. */
  readonly lengthMethod: 'phase' | 'peak' | null;
  /** From the stated length; null without one. */
  readonly measuredVelocityFactor: number | null;
  readonly measuredVelocityFactorU95: number | null;
  readonly loss: EndLoss | null;
  readonly trace: ReflectionTrace;
  readonly discontinuities: readonly LocatedDiscontinuity[];
  /** Reflections below this are not told from noise and sidelobes. */
  readonly reflectionFloor: number;
  /** Two places nearer than this are seen as one, metres. */
  readonly separableM: number;
  readonly findings: readonly Caution[];
  readonly absent: readonly Absence[];
  readonly assumptions: readonly Assumption[];
}

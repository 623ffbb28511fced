import type { Assumption } from '../formats/read-types.ts';
import type { PhaseKnowledge } from '../sweep.ts';

/** Where the reflection holds. */
export type Plane = 'measured' | 'feed_point';

/** What a person must know beside the numbers. */
export interface Caution {
  readonly code: string;
  readonly detail: string;
}

/** A local (or the global) minimum of SWR. `*U95` are half-widths of a 95 % interval, null if unknown. */
export interface SwrMinimum {
  readonly frequencyHz: number;
  readonly frequencyU95Hz: number | null;
  readonly swr: number;
  readonly swrU95: number | null;
  readonly resistanceOhm: number | null;
  readonly reactanceOhm: number | null;
  readonly returnLossDb: number | null;
  /** The sweep ends before the minimum does. */
  readonly atEdge: boolean;
}

/** A frequency of zero reactance. */
export interface Resonance {
  readonly frequencyHz: number;
  readonly frequencyU95Hz: number | null;
  readonly kind: 'series' | 'parallel';
  readonly resistanceOhm: number | null;
  readonly resistanceU95Ohm: number | null;
  readonly swr: number | null;
  readonly swrU95: number | null;
  readonly q: number | null;
  readonly qU95: number | null;
  /** The reactance touches zero within the noise without a crossing beyond doubt. */
  readonly grazing: boolean;
}

/** A contiguous range where SWR <= maxSwr. `lowOpen`/`highOpen`: the sweep ended before the crossing. */
export interface UsableSpan {
  readonly maxSwr: number;
  readonly lowHz: number;
  readonly lowU95Hz: number | null;
  readonly highHz: number;
  readonly highU95Hz: number | null;
  readonly widthHz: number;
  readonly lowOpen: boolean;
  readonly highOpen: boolean;
}

export interface QualityFlag {
  readonly code: string;
  readonly detail: string;
}

/** A field that is null or empty, and why. */
export interface Absence {
  readonly field: string;
  readonly code: string;
  readonly detail: string;
}

/** The resonance and minimum-SWR summary of one sweep at one plane. */
export interface Summary {
  readonly analysisVersion: string;
  readonly plane: Plane;
  readonly referenceOhm: number;
  readonly phase: PhaseKnowledge;
  readonly span: {
    readonly lowHz: number;
    readonly highHz: number;
    readonly points: number;
    readonly medianStepHz: number | null;
  };
  readonly minimumSwr: SwrMinimum | null;
  readonly swrMinima: readonly SwrMinimum[];
  readonly resonances: readonly Resonance[];
  readonly resonanceOffsetHz: number | null;
  readonly spans: readonly UsableSpan[];
  readonly quality: {
    readonly flags: readonly QualityFlag[];
    readonly reflectionNoise: number | null;
  };
  readonly absent: readonly Absence[];
  readonly assumptions: readonly Assumption[];
  readonly cautions: readonly Caution[];
}

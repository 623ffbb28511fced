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
  readonly matchedBandwidth: MatchedBandwidth | null;
  /** The reactance touches zero within the noise without a crossing beyond doubt. */
  readonly grazing: boolean;
}

/**
 * Bandwidth at an SWR of an antenna matched at its resonance: as its Q predicts it, and as the sweep
 * has it, referred to the resistance at resonance; null where the sweep ends before.
 */
export interface MatchedBandwidth {
  readonly maxSwr: number;
  readonly predictedHz: number;
  readonly predictedU95Hz: number | null;
  readonly measuredHz: number | null;
  readonly measuredU95Hz: number | null;
}

/**
 * Where the magnitude of a reactance whose sign is not known is smallest. It may be a resonance, or a
 * near miss; nothing in the sweep tells which.
 */
export interface ReactanceMagnitudeMinimum {
  readonly frequencyHz: number;
  readonly frequencyU95Hz: number | null;
  readonly reactanceMagnitudeOhm: number;
  readonly resistanceOhm: number | null;
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

/** What is doubtful about a sweep, and what to do about it. */
export interface QualityFlag {
  readonly code: string;
  readonly detail: string;
  /** The stretch it concerns, where it is not the whole sweep. */
  readonly lowHz?: number;
  readonly highHz?: number;
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
  /** With unsigned phase only: "reactance magnitude smallest at", never a resonance. */
  readonly reactanceMagnitudeMinima: readonly ReactanceMagnitudeMinimum[];
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

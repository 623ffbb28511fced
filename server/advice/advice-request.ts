import type { AntennaKind } from '../../core/advice/antenna-kind.ts';
import type { ComponentQ } from '../../core/advice/match/element.ts';
import type { TrimPair } from '../../core/advice/trim-history.ts';
import type { HzRange } from '../../core/bands/ranges.ts';

/** What a keeper asks; null takes what follows from the antenna. */
export interface AdviceRequest {
  /** The band that match and findings are for. */
  readonly band: string | null;
  /** A part of the spectrum that the resonance should lie in. */
  readonly aim: HzRange | null;
  readonly targetHz: number | null;
  readonly goal: 'resonance' | 'swr_minimum' | null;
  /** Net power into the feed point; null: nothing is said of voltage and current. */
  readonly powerW: number | null;
  readonly componentQ: ComponentQ;
  /** Of line that sections and stubs are cut from. */
  readonly velocityFactor: number | null;
  /** Of the whole resonant conductor. */
  readonly lengthM: number | null;
  readonly radiusM: number | null;
}

/** What the record knows of the antenna beside the sweep. */
export interface AdvisedAntenna {
  readonly kind: AntennaKind;
  /** Sweeps before and after earlier work on its length: where its own sensitivity comes from. */
  readonly workPairs: readonly TrimPair[];
}

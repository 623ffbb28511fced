import type { Caution } from '../analysis/summary.ts';
import type { Assumption } from '../formats/read-types.ts';
import type { AntennaKind } from './antenna-kind.ts';
import type { TrimPair, TrimSensitivity } from './trim-history.ts';

export interface TrimRequest {
  readonly kind: AntennaKind;
  /** Which frequency is to be moved: that of resonance or that of the least SWR. */
  readonly goal: 'resonance' | 'swr_minimum';
  readonly fromHz: number;
  readonly fromU95Hz: number | null;
  readonly targetHz: number;
  /** Of the whole resonant conductor, metres; null if not known. */
  readonly lengthM: number | null;
  /** The frequency was seen through a line that moves resonances. */
  readonly throughLine: boolean;
  /** Before and after earlier work on this antenna; its own sensitivity is used where it shows. */
  readonly history: readonly TrimPair[];
}

export interface TrimAdvice {
  /** `trial`: no figure can be given; a small change and a sweep must come first. */
  readonly method: 'own_sensitivity' | 'simple_rule' | 'trial' | 'leave';
  readonly goal: 'resonance' | 'swr_minimum';
  readonly direction: 'shorten' | 'lengthen' | 'leave';
  readonly frequencyChangeHz: number;
  /** Of the whole conductor; negative is shorter. Null where no figure can be given. */
  readonly lengthChangeM: number | null;
  readonly lengthChangeU95M: number | null;
  /** As a fraction of the length, by the simple rule; null where it does not hold. */
  readonly lengthChangeFraction: number | null;
  /** For a first try; null where the length is not known or nothing is to be done. */
  readonly trialChangeM: number | null;
  readonly sensitivity: TrimSensitivity | null;
  readonly detail: string;
  readonly assumptions: readonly Assumption[];
  readonly cautions: readonly Caution[];
}

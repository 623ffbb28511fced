import type { Impedance } from '../../../server/demo/models/lumped.ts';
import type { Random } from '../../support/random.ts';

export type FamilyName =
  | 'varying_rlc'
  | 'dipole'
  | 'line_fed_rlc'
  | 'coupled_resonators'
  | 'loaded_short_dipole';

/** One antenna of a family. */
export interface Antenna {
  readonly family: AntennaFamily;
  /** What a fit of the family's form may move. */
  readonly parameters: readonly number[];
  /** About where it is meant to be used, hertz. */
  readonly nominalHz: number;
  /** About its loaded bandwidth, hertz: where no SWR limit says how wide a sweep should be. */
  readonly bandwidthHz: number;
  /** Outside of this range the closed form is not meant. */
  readonly validHz: readonly [low: number, high: number];
}

/** A closed physical model with a few parameters. */
export interface AntennaFamily {
  readonly name: FamilyName;
  /** Steps that count as small for each parameter of this antenna. */
  scales(parameters: readonly number[]): readonly number[];
  impedance(frequencyHz: number, parameters: readonly number[]): Impedance;
  draw(random: Random): Antenna;
}

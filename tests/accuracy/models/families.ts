import type { AntennaFamily } from './antenna-model.ts';
import { coupledResonators } from './coupled-resonators.ts';
import { dipole } from './dipole.ts';
import { lineFedRlc } from './line-fed-rlc.ts';
import { loadedShortDipole } from './loaded-short-dipole.ts';
import { varyingRlc } from './varying-rlc.ts';

/** Every family of the bench, in the order in which cases are dealt. */
export const families: readonly AntennaFamily[] = [
  varyingRlc,
  dipole,
  lineFedRlc,
  coupledResonators,
  loadedShortDipole,
];

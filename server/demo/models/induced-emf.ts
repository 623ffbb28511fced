import type { Impedance } from './lumped.ts';
import { sineIntegrals } from './sine-integrals.ts';

const EULER_GAMMA = 0.577_215_664_901_532_9;
/** Impedance of free space, ohm (CODATA 2022). */
const FREE_SPACE_OHM = 376.730_313_412;
const LIGHT_M_PER_S = 299_792_458;

/** A straight, centre-fed wire dipole in free space. */
export interface WireDipole {
  /** Tip to tip, metres. */
  readonly lengthM: number;
  /** Of the wire, metres. */
  readonly radiusM: number;
}

/**
 * Impedance at the centre of a thin dipole by the induced-EMF method with sinusoidal current
 * (C. A. Balanis, Antenna Theory, ch. 8, eqs. 8-60a/b divided by sin^2(kl/2)); ohm.
 * Grows without bound where the length nears a whole number of wavelengths: the model's limit.
 */
export function dipoleImpedance(frequencyHz: number, dipole: WireDipole): Impedance {
  const k = (2 * Math.PI * frequencyHz) / LIGHT_M_PER_S;
  const kl = k * dipole.lengthM;
  const sin = Math.sin(kl);
  const cos = Math.cos(kl);
  const one = sineIntegrals(kl);
  const two = sineIntegrals(2 * kl);
  const wire = sineIntegrals((2 * k * dipole.radiusM * dipole.radiusM) / dipole.lengthM);
  const radiation =
    EULER_GAMMA +
    Math.log(kl) -
    one.ci +
    0.5 * sin * (two.si - 2 * one.si) +
    0.5 * cos * (EULER_GAMMA + Math.log(kl / 2) + two.ci - 2 * one.ci);
  const stored = 2 * one.si + cos * (2 * one.si - two.si) - sin * (2 * one.ci - two.ci - wire.ci);
  const atFeed = 1 / Math.sin(kl / 2) ** 2;
  return {
    re: (FREE_SPACE_OHM / (2 * Math.PI)) * radiation * atFeed,
    im: (FREE_SPACE_OHM / (4 * Math.PI)) * stored * atFeed,
  };
}

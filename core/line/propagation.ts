import { attenuationDbPer100M } from './attenuation.ts';
import type { Cable } from './cable.ts';
import type { Complex } from './complex.ts';

export const LIGHT_M_PER_S = 299_792_458;
export const DB_PER_NEPER = 20 / Math.LN10;

/** alpha (Np/m) and beta (rad/m) of a wave on a cable, with its complex characteristic impedance (ohm). */
export interface Propagation {
  readonly alpha: number;
  readonly beta: number;
  readonly characteristic: Complex;
}

/**
 * gamma = alpha + j beta from the fitted loss and the velocity factor, and
 * Z0 = gamma/(G + jwC) with C = 1/(R0 v) and G = 2 alpha_d/R0 from the dielectric part of the loss
 * (telegrapher's equations, e.g. D. M. Pozar, Microwave Engineering, sec. 2.7). At 0 Hz: no loss, R0.
 */
export function propagation(cable: Cable, frequencyHz: number): Propagation {
  const { characteristicOhm, velocityFactor, attenuation } = cable;
  if (frequencyHz === 0) {
    return { alpha: 0, beta: 0, characteristic: { re: characteristicOhm, im: 0 } };
  }
  const beta = (2 * Math.PI * frequencyHz) / (velocityFactor * LIGHT_M_PER_S);
  const alpha = attenuationDbPer100M(attenuation, frequencyHz) / 100 / DB_PER_NEPER;
  const dielectric =
    ((attenuation.dielectricDbPer100M * frequencyHz) / 1e6 / 100 / DB_PER_NEPER) * 2;
  // R0 (alpha + j beta)/(2 alpha_d + j beta)
  const ratio = characteristicOhm / (dielectric * dielectric + beta * beta);
  return {
    alpha,
    beta,
    characteristic: {
      re: ratio * (alpha * dielectric + beta * beta),
      im: ratio * beta * (dielectric - alpha),
    },
  };
}

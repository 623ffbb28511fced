import { fail, ok, type Result } from '../result.ts';
import {
  type Attenuation,
  type AttenuationError,
  type AttenuationPoint,
  fitAttenuation,
} from './attenuation.ts';

/** What a line calculation needs to know of a cable. */
export interface Cable {
  /** Lower-case letters, digits and hyphens. */
  readonly id: string;
  readonly name: string;
  /** Nominal, of the high-frequency limit. */
  readonly characteristicOhm: number;
  readonly characteristicU95Ohm: number;
  /** Speed of the wave over that of light in vacuum. */
  readonly velocityFactor: number;
  readonly velocityFactorU95: number;
  readonly attenuation: Attenuation;
  /** Half-width of the loss as a fraction of it. */
  readonly lossU95Fraction: number;
}

/** A cable as a club states it. Half-widths that are not stated are taken from the spread of cables. */
export interface StatedCable {
  readonly id: string;
  readonly name: string;
  readonly characteristicOhm: number;
  readonly velocityFactor: number;
  readonly points: readonly AttenuationPoint[];
  readonly characteristicU95Ohm?: number;
  readonly velocityFactorU95?: number;
  readonly lossU95Fraction?: number;
}

export type CableErrorCode =
  | AttenuationError['code']
  | 'cable_impedance_out_of_range'
  | 'cable_velocity_factor_out_of_range'
  | 'cable_half_width_negative';

export interface CableError {
  readonly code: CableErrorCode;
  readonly detail: string;
  readonly index?: number;
}

/** Makers' nominal losses differ by 10 to 30 %; value from memory. */
const LOSS_SPREAD = 0.15;
/** Velocity factor of one type varies by about 2 %; value from memory. */
const VELOCITY_SPREAD = 0.02;
/** Military sheets allow 50 +- 2 ohm (read in: posted summary of MIL-C-17/28 and /74, 2004). */
const IMPEDANCE_SPREAD = 0.04;

/**
 * Makes a cable of a club's own figures: loss fitted to its points, half-widths assumed where none
 * is stated (4 % of impedance, 2 % of velocity factor, 15 % of loss or twice the fit's residual).
 */
export function fitCable(stated: StatedCable): Result<Cable, CableError> {
  const { characteristicOhm, velocityFactor } = stated;
  if (!(characteristicOhm >= 5 && characteristicOhm <= 2000)) {
    return fail({
      code: 'cable_impedance_out_of_range',
      detail: `A characteristic impedance lies between 5 and 2000 ohm; ${characteristicOhm} does not.`,
    });
  }
  if (!(velocityFactor >= 0.3 && velocityFactor <= 1)) {
    return fail({
      code: 'cable_velocity_factor_out_of_range',
      detail: `A velocity factor lies between 0.3 and 1; ${velocityFactor} does not.`,
    });
  }
  const halfWidths = [
    stated.characteristicU95Ohm,
    stated.velocityFactorU95,
    stated.lossU95Fraction,
  ];
  if (halfWidths.some((halfWidth) => halfWidth !== undefined && !(halfWidth >= 0))) {
    return fail({ code: 'cable_half_width_negative', detail: 'A half-width is zero or more.' });
  }
  const attenuation = fitAttenuation(stated.points);
  if (!attenuation.ok) return attenuation;
  const misfit = 2 * (attenuation.value.residualRms ?? 0);
  return ok({
    id: stated.id,
    name: stated.name,
    characteristicOhm,
    characteristicU95Ohm: stated.characteristicU95Ohm ?? IMPEDANCE_SPREAD * characteristicOhm,
    velocityFactor,
    velocityFactorU95: stated.velocityFactorU95 ?? VELOCITY_SPREAD * velocityFactor,
    attenuation: attenuation.value,
    lossU95Fraction: stated.lossU95Fraction ?? Math.max(LOSS_SPREAD, misfit),
  });
}

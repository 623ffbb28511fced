import { reflectionMagnitude, type Sweep } from '../sweep.ts';

/**
 * Return loss -20 log10 |Γ| in dB: positive for a passive load (T. S. Bird, "Definition and misuse
 * of return loss", IEEE Antennas and Propagation Magazine 51(2), 2009). Null at |Γ| = 0, where it
 * is infinite, and for NaN.
 */
export function returnLossDb(magnitude: number): number | null {
  return magnitude > 0 ? -20 * Math.log10(magnitude) : null;
}

/** |Γ| of a return loss in dB. */
export function magnitudeOfReturnLoss(lossDb: number): number {
  return 10 ** (-lossDb / 20);
}

/**
 * Mismatch loss -10 log10 (1 - |Γ|²) in dB: the power that the reflection keeps from the load, of
 * the power available. Null where |Γ| >= 1, where nothing arrives, and for NaN.
 */
export function mismatchLossDb(magnitude: number): number | null {
  return magnitude < 1 ? -10 * Math.log10(1 - magnitude * magnitude) : null;
}

/** `returnLossDb` at every point of a sweep; NaN at |Γ| = 0. */
export function sweepReturnLossDb(sweep: Sweep): Float64Array {
  return reflectionMagnitude(sweep).map((magnitude) => returnLossDb(magnitude) ?? Number.NaN);
}

import type { Sweep } from '../sweep.ts';
import type { Reflection } from './impedance.ts';

/**
 * A reflection against another real reference: Γ' = (Γ - k)/(1 - kΓ), k = (Z0' - Z0)/(Z0' + Z0),
 * both in ohm. Null where 1 = kΓ, which a passive load never has.
 */
export function renormalise(
  { re, im }: Reflection,
  fromOhm: number,
  toOhm: number,
): Reflection | null {
  const k = (toOhm - fromOhm) / (toOhm + fromOhm);
  const dr = 1 - k * re;
  const di = -k * im;
  const square = dr * dr + di * di;
  if (square === 0) return null;
  return { re: ((re - k) * dr + im * di) / square, im: (im * dr - (re - k) * di) / square };
}

/**
 * The sweep against another real reference, see `renormalise`. With unsigned phase the sign of the
 * imaginary part stays open, since it never changes. A magnitude alone cannot be moved and comes
 * back as it is.
 */
export function renormaliseSweep(sweep: Sweep, referenceOhm: number): Sweep {
  if (sweep.phase === 'none' || referenceOhm === sweep.referenceOhm) return sweep;
  const k = (referenceOhm - sweep.referenceOhm) / (referenceOhm + sweep.referenceOhm);
  const count = sweep.frequencyHz.length;
  const reflectionRe = new Float64Array(count);
  const reflectionIm = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    const re = sweep.reflectionRe[i];
    const im = sweep.reflectionIm[i];
    const dr = 1 - k * re;
    const di = -k * im;
    const d = dr * dr + di * di;
    reflectionRe[i] = ((re - k) * dr + im * di) / d;
    reflectionIm[i] = (im * dr - (re - k) * di) / d;
  }
  return { ...sweep, referenceOhm, reflectionRe, reflectionIm };
}

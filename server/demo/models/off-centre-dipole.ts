import { dipoleImpedance, type WireDipole } from './induced-emf.ts';
import type { Impedance } from './lumped.ts';

const LIGHT_M_PER_S = 299_792_458;

/**
 * Impedance of a wire fed at `fraction` of its length from one end, ohm: the centre-fed value
 * referred to the current at the feed by the sinusoidal distribution, sin^2(kl/2)/sin^2(k d)
 * (the way C. A. Balanis, Antenna Theory, sec. 4.5 refers radiation resistance to the input).
 */
export function offCentreImpedance(
  frequencyHz: number,
  wire: WireDipole,
  fraction: number,
): Impedance {
  const k = (2 * Math.PI * frequencyHz) / LIGHT_M_PER_S;
  const centre = dipoleImpedance(frequencyHz, wire);
  const ratio = Math.sin((k * wire.lengthM) / 2) / Math.sin(k * wire.lengthM * fraction);
  return { re: centre.re * ratio * ratio, im: centre.im * ratio * ratio };
}

import type { Quantity } from './quantities.ts';

/**
 * A quantity recomputed from a reflection (re, im) against a reference, in ohm, siemens, radian, dB
 * or fractions of one. Where only the magnitude is known, `re` is the magnitude and `im` zero: then
 * only quantities that depend on the magnitude alone may be asked for.
 */
export function fromReflection(
  quantity: Quantity,
  re: number,
  im: number,
  referenceOhm: number,
): number {
  return computed[quantity](re, im, referenceOhm);
}

type FromReflection = (re: number, im: number, referenceOhm: number) => number;

const computed: Readonly<Record<Quantity, FromReflection>> = {
  frequency: () => Number.NaN,
  reflection_re: (re) => re,
  reflection_im: (_re, im) => im,
  reflection_im_magnitude: (_re, im) => Math.abs(im),
  reflection_magnitude: (re, im) => Math.hypot(re, im),
  reflection_db: (re, im) => 20 * Math.log10(Math.hypot(re, im)),
  return_loss: (re, im) => -20 * Math.log10(Math.hypot(re, im)),
  reflected_power: (re, im) => re * re + im * im,
  swr: (re, im) => {
    const rho = Math.hypot(re, im);
    return rho < 1 ? (1 + rho) / (1 - rho) : Number.POSITIVE_INFINITY;
  },
  reflection_angle: (re, im) => Math.atan2(im, re),
  reflection_angle_magnitude: (re, im) => Math.abs(Math.atan2(im, re)),
  resistance: resistanceOf,
  reactance: reactanceOf,
  reactance_magnitude: (re, im, reference) => Math.abs(reactanceOf(re, im, reference)),
  impedance_magnitude: (re, im, reference) =>
    (reference * Math.hypot(1 + re, im)) / Math.hypot(1 - re, im),
  impedance_angle: impedanceAngle,
  impedance_angle_magnitude: (re, im) => Math.abs(impedanceAngle(re, im)),
  parallel_resistance: (re, im, reference) => 1 / conductanceOf(re, im, reference),
  parallel_reactance: (re, im, reference) => -1 / susceptanceOf(re, im, reference),
  conductance: conductanceOf,
  susceptance: susceptanceOf,
};

/** Z = Z0 (1 + Γ)/(1 - Γ). */
export function resistanceOf(re: number, im: number, referenceOhm: number): number {
  return (referenceOhm * (1 - re * re - im * im)) / ((1 - re) * (1 - re) + im * im);
}

export function reactanceOf(re: number, im: number, referenceOhm: number): number {
  return (2 * referenceOhm * im) / ((1 - re) * (1 - re) + im * im);
}

function impedanceAngle(re: number, im: number): number {
  return Math.atan2(2 * im, 1 - re * re - im * im);
}

/** Y = (1 - Γ)/(Z0 (1 + Γ)). */
function conductanceOf(re: number, im: number, referenceOhm: number): number {
  return (1 - re * re - im * im) / (referenceOhm * ((1 + re) * (1 + re) + im * im));
}

function susceptanceOf(re: number, im: number, referenceOhm: number): number {
  return (-2 * im) / (referenceOhm * ((1 + re) * (1 + re) + im * im));
}

import type { ComplexSweep } from '../sweep.ts';

/** A series impedance, ohm. */
export interface Impedance {
  readonly resistanceOhm: number;
  readonly reactanceOhm: number;
}

/** A complex reflection against a real reference. */
export interface Reflection {
  readonly re: number;
  readonly im: number;
}

/**
 * Z = Z0 (1 + Γ)/(1 - Γ) for a real reference Z0 in ohm. Null at Γ = 1 exactly: an open has no
 * impedance.
 */
export function impedanceOf({ re, im }: Reflection, referenceOhm: number): Impedance | null {
  const square = (1 - re) * (1 - re) + im * im;
  if (square === 0) return null;
  return {
    resistanceOhm: (referenceOhm * (1 - re * re - im * im)) / square,
    reactanceOhm: (2 * referenceOhm * im) / square,
  };
}

/**
 * Γ = (Z - Z0)/(Z + Z0) for a real reference Z0 in ohm. An infinite resistance or reactance is an
 * open, Γ = 1. Null at Z = -Z0, which no reflection describes, and for NaN.
 */
export function reflectionOf(
  { resistanceOhm, reactanceOhm }: Impedance,
  referenceOhm: number,
): Reflection | null {
  const r = resistanceOhm / referenceOhm;
  const x = reactanceOhm / referenceOhm;
  const square = (r + 1) * (r + 1) + x * x;
  if (square === 0 || Number.isNaN(r) || Number.isNaN(x)) return null;
  if (square === Number.POSITIVE_INFINITY) return { re: 1, im: 0 };
  return { re: ((r - 1) * (r + 1) + x * x) / square, im: (2 * x) / square };
}

/** Series impedances of many points, ohm. */
export interface Impedances {
  readonly resistanceOhm: Float64Array;
  readonly reactanceOhm: Float64Array;
}

/** `impedanceOf` at every point of a sweep; NaN at an open. With `unsigned` phase X is |X|. */
export function sweepImpedances(sweep: ComplexSweep): Impedances {
  const { reflectionRe, reflectionIm, referenceOhm } = sweep;
  const resistanceOhm = new Float64Array(reflectionRe.length);
  const reactanceOhm = new Float64Array(reflectionRe.length);
  for (let i = 0; i < reflectionRe.length; i++) {
    const re = reflectionRe[i];
    const im = reflectionIm[i];
    const square = (1 - re) * (1 - re) + im * im;
    const scale = square === 0 ? Number.NaN : referenceOhm / square;
    resistanceOhm[i] = scale * (1 - re * re - im * im);
    reactanceOhm[i] = scale * 2 * im;
  }
  return { resistanceOhm, reactanceOhm };
}

/** Reflections of many points. */
export interface ReflectionColumns {
  readonly reflectionRe: Float64Array;
  readonly reflectionIm: Float64Array;
}

/** `reflectionOf` at every point; NaN where there is none. */
export function reflectionsOf(
  { resistanceOhm, reactanceOhm }: Impedances,
  referenceOhm: number,
): ReflectionColumns {
  const reflectionRe = new Float64Array(resistanceOhm.length);
  const reflectionIm = new Float64Array(resistanceOhm.length);
  for (let i = 0; i < resistanceOhm.length; i++) {
    const point = { resistanceOhm: resistanceOhm[i], reactanceOhm: reactanceOhm[i] };
    const reflection = reflectionOf(point, referenceOhm);
    reflectionRe[i] = reflection?.re ?? Number.NaN;
    reflectionIm[i] = reflection?.im ?? Number.NaN;
  }
  return { reflectionRe, reflectionIm };
}

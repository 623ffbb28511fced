import type { ComplexSweep, ScalarSweep } from '../../core/sweep.ts';
import { Random } from './random.ts';

/** An impedance in ohm. */
export interface Ohms {
  readonly resistance: number;
  readonly reactance: number;
}

/** Resistance and reactance in ohm as a function of frequency in hertz. */
export type ImpedanceOf = (frequencyHz: number) => Ohms;

/** Evenly spaced frequencies, both ends among them. */
export function evenFrequencies(lowHz: number, highHz: number, points: number): Float64Array {
  if (points === 1) return Float64Array.of(lowHz);
  return Float64Array.from(
    { length: points },
    (_, i) => lowHz + ((highHz - lowHz) * i) / (points - 1),
  );
}

/** The exact sweep of an impedance. */
export function sweepOf(
  impedanceOf: ImpedanceOf,
  frequencyHz: Float64Array,
  referenceOhm = 50,
): ComplexSweep {
  const reflectionRe = new Float64Array(frequencyHz.length);
  const reflectionIm = new Float64Array(frequencyHz.length);
  frequencyHz.forEach((f, i) => {
    const { resistance, reactance } = impedanceOf(f);
    const d = (resistance + referenceOhm) ** 2 + reactance ** 2;
    reflectionRe[i] = (resistance ** 2 - referenceOhm ** 2 + reactance ** 2) / d;
    reflectionIm[i] = (2 * referenceOhm * reactance) / d;
  });
  return { phase: 'signed', frequencyHz, referenceOhm, reflectionRe, reflectionIm };
}

/** A sweep with seeded Gaussian noise of this rms magnitude on its complex reflection. */
export function withNoise(sweep: ComplexSweep, rms: number, seed: number): ComplexSweep {
  const random = new Random(seed);
  const noisy = (value: number) => value + (rms / Math.SQRT2) * random.gaussian();
  return {
    ...sweep,
    reflectionRe: sweep.reflectionRe.map(noisy),
    reflectionIm: sweep.reflectionIm.map(noisy),
  };
}

/** A sweep as a file with this many decimals carries it. */
export function rounded(sweep: ComplexSweep, decimals: number): ComplexSweep {
  const unit = 10 ** decimals;
  const written = (value: number) => Math.round(value * unit) / unit;
  return {
    ...sweep,
    reflectionRe: sweep.reflectionRe.map(written),
    reflectionIm: sweep.reflectionIm.map(written),
  };
}

/** The same sweep with the sign of its reactance lost. */
export function withoutSign(sweep: ComplexSweep): ComplexSweep {
  return { ...sweep, phase: 'unsigned', reflectionIm: sweep.reflectionIm.map(Math.abs) };
}

/** The same sweep with its phase lost. */
export function magnitudeOnly(sweep: ComplexSweep): ScalarSweep {
  const { frequencyHz, referenceOhm, reflectionRe, reflectionIm } = sweep;
  const reflectionMagnitude = reflectionRe.map((re, i) => Math.hypot(re, reflectionIm[i]));
  return { phase: 'none', frequencyHz, referenceOhm, reflectionMagnitude };
}

/** Resistance, inductance and capacitance in series, by resonant frequency and Q. */
export function seriesCircuit(resistance: number, q: number, resonanceHz: number): ImpedanceOf {
  return (f) => ({
    resistance,
    reactance: f === 0 ? -1e12 : resistance * q * (f / resonanceHz - resonanceHz / f),
  });
}

/** Resistance, inductance and capacitance in parallel, by resonant frequency and Q. */
export function parallelCircuit(resistance: number, q: number, resonanceHz: number): ImpedanceOf {
  return (f) => {
    const detuning = q * (f / resonanceHz - resonanceHz / f);
    const part = 1 + detuning ** 2;
    return { resistance: resistance / part, reactance: (-resistance * detuning) / part };
  };
}

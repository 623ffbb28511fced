import type { Cable } from '../../../core/line/cable.ts';
import type { Complex } from '../../../core/line/complex.ts';
import type { FeedLine, LineSection } from '../../../core/line/feed-line.ts';
import type { ComplexSweep } from '../../../core/sweep.ts';

/** A cable of exactly known figures; losses are dB per 100 m at 1 MHz. */
export function exactCable(facts: Partial<Cable> & { k1?: number; k2?: number } = {}): Cable {
  const { k1 = 0, k2 = 0, ...rest } = facts;
  return {
    id: 'test-cable',
    name: 'test cable',
    characteristicOhm: 50,
    characteristicU95Ohm: 0,
    velocityFactor: 0.66,
    velocityFactorU95: 0,
    lossU95Fraction: 0,
    attenuation: {
      conductorDbPer100M: k1,
      dielectricDbPer100M: k2,
      lowHz: 1e6,
      highHz: 1e9,
      residualRms: null,
      residualLargest: null,
    },
    ...rest,
  };
}

export function section(
  cable: Cable,
  lengthM: number,
  rest: Partial<LineSection> = {},
): LineSection {
  return { cable, lengthM, lengthU95M: 0, extraLossDb: 0, ...rest };
}

export function lineOf(...sections: readonly LineSection[]): FeedLine {
  return { sections, assumptions: [] };
}

export function evenly(lowHz: number, highHz: number, points: number): Float64Array {
  return Float64Array.from(
    { length: points },
    (_, i) => lowHz + ((highHz - lowHz) * i) / Math.max(1, points - 1),
  );
}

/** A sweep whose impedance is a function of frequency. */
export function impedanceSweep(
  frequencyHz: Float64Array,
  impedance: (hz: number) => Complex,
  referenceOhm = 50,
): ComplexSweep {
  return reflectionSweep(
    frequencyHz,
    (hz) => reflectionOf(impedance(hz), referenceOhm),
    referenceOhm,
  );
}

export function reflectionSweep(
  frequencyHz: Float64Array,
  reflection: (hz: number) => Complex,
  referenceOhm = 50,
): ComplexSweep {
  const values = Array.from(frequencyHz, reflection);
  return {
    phase: 'signed',
    referenceOhm,
    frequencyHz,
    reflectionRe: Float64Array.from(values, (value) => value.re),
    reflectionIm: Float64Array.from(values, (value) => value.im),
  };
}

/** A series resonator R (1 + jQ(f/f0 - f0/f)), the plainest antenna. */
export function resonator(resistanceOhm: number, resonanceHz: number, q: number) {
  return (hz: number): Complex => ({
    re: resistanceOhm,
    im: resistanceOhm * q * (hz / resonanceHz - resonanceHz / hz),
  });
}

export function reflectionOf(z: Complex, referenceOhm: number): Complex {
  const re = z.re + referenceOhm;
  const square = re * re + z.im * z.im;
  return {
    re: ((z.re - referenceOhm) * re + z.im * z.im) / square,
    im: (z.im * re - (z.re - referenceOhm) * z.im) / square,
  };
}

export function impedanceOf(sweep: ComplexSweep, index: number): Complex {
  const { reflectionRe: re, reflectionIm: im, referenceOhm } = sweep;
  const square = (1 - re[index]) ** 2 + im[index] ** 2;
  return {
    re: (referenceOhm * (1 - re[index] ** 2 - im[index] ** 2)) / square,
    im: (2 * referenceOhm * im[index]) / square,
  };
}

/** The value of a result that must be there. */
export function accepted<T>(result: { ok: true; value: T } | { ok: false; error: unknown }): T {
  if (!result.ok) throw new Error(`refused: ${JSON.stringify(result.error)}`);
  return result.value;
}

/** The code of an error that must be there. */
export function refusalOf(result: { ok: true } | { ok: false; error: { code: string } }): string {
  if (result.ok) throw new Error('it was accepted');
  return result.error.code;
}

import { type Crossing, findCrossings, imaginaryPart } from './crossings.ts';
import { matchedBandwidth } from './matched-bandwidth.ts';
import { halfWidthAt, type PiecewiseModel, valueAt } from './piecewise-model.ts';
import { impedanceQ } from './q.ts';
import type { Functional, RationalValue } from './rational-value.ts';
import type { Scan } from './scan.ts';
import type { Resonance } from './summary.ts';
import { zeroBetween } from './zero.ts';

/**
 * Every frequency of zero reactance that the noise does not explain. Reactance is zero where the
 * imaginary part of the reflection is, and there alone: seen so, a pole of the impedance is one
 * crossing like any other and never two. Rising is series, falling parallel resonance; a touch is
 * called by the side of the reference on which its resistance lies.
 */
export function findResonances(
  model: PiecewiseModel,
  scan: Scan,
  referenceOhm: number,
): readonly Resonance[] {
  return findCrossings(model, scan).map((crossing) =>
    resonanceAt(model, scan, crossing, referenceOhm),
  );
}

function resonanceAt(
  model: PiecewiseModel,
  scan: Scan,
  { before, after, isGrazing }: Crossing,
  referenceOhm: number,
): Resonance {
  const low = scan.frequencyHz[before];
  const high = scan.frequencyHz[after];
  const isTouch = before === after;
  const frequencyHz = isTouch ? low : zeroBetween((f) => valueAt(model, f).im, low, high);
  const value = valueAt(model, frequencyHz);
  const isSeries = isTouch ? value.re < 0 : scan.im[after] > 0;
  const quality = impedanceQ(model, frequencyHz, value, referenceOhm);
  const { q, qU95 } = quality;
  return {
    frequencyHz,
    frequencyU95Hz: isGrazing ? null : frequencyU95(model, frequencyHz, value),
    kind: isSeries ? 'series' : 'parallel',
    ...resistanceAt(model, frequencyHz, value, referenceOhm),
    ...quality,
    matchedBandwidth: isGrazing
      ? null
      : matchedBandwidth(model, scan, frequencyHz, value.re, q, qU95),
    grazing: isGrazing,
  };
}

function frequencyU95(
  model: PiecewiseModel,
  frequencyHz: number,
  { slopeIm }: RationalValue,
): number | null {
  const imaginaryU95 = halfWidthAt(model, frequencyHz, imaginaryPart);
  return imaginaryU95 === null || slopeIm === 0 ? null : imaginaryU95 / Math.abs(slopeIm);
}

type AtResonance = Pick<Resonance, 'resistanceOhm' | 'resistanceU95Ohm' | 'swr' | 'swrU95'>;

/**
 * Resistance and SWR on the real axis of the reflection. To first order the frequency of the
 * crossing moves with the noise too, and the real part along with it.
 */
function resistanceAt(
  model: PiecewiseModel,
  frequencyHz: number,
  value: RationalValue,
  referenceOhm: number,
): AtResonance {
  const real = value.re;
  const isThere = real < 1 && real > Number.NEGATIVE_INFINITY;
  if (!isThere) return { resistanceOhm: null, resistanceU95Ohm: null, swr: null, swrU95: null };
  const along = value.slopeIm === 0 ? 0 : value.slopeRe / value.slopeIm;
  const functional: Functional = { valueRe: 1, valueIm: along, slopeRe: 0, slopeIm: 0 };
  const realU95 = halfWidthAt(model, frequencyHz, functional);
  const magnitude = Math.abs(real);
  const isPassive = magnitude < 1;
  return {
    resistanceOhm: (referenceOhm * (1 + real)) / (1 - real),
    resistanceU95Ohm: realU95 === null ? null : (2 * referenceOhm * realU95) / (1 - real) ** 2,
    swr: isPassive ? (1 + magnitude) / (1 - magnitude) : null,
    swrU95: isPassive && realU95 !== null ? (2 * realU95) / (1 - magnitude) ** 2 : null,
  };
}

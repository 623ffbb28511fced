import {
  halfWidthAt,
  type ModelPiece,
  type PiecewiseModel,
  pieceAt,
  valueAt,
} from './piecewise-model.ts';
import { impedanceQ } from './q.ts';
import type { Functional, RationalValue } from './rational-value.ts';
import { type SignChange, scanModel, signChanges } from './scan.ts';
import type { Resonance } from './summary.ts';
import { zeroBetween } from './zero.ts';

const imaginaryPart: Functional = { valueRe: 0, valueIm: -1, slopeRe: 0, slopeIm: 0 };
/** A swing of the reactance that stays within this many 95 % half-widths may be noise. */
const doubtfulWithin = 1.5;

/**
 * Every frequency of zero reactance that the noise does not explain. Reactance is zero where the
 * imaginary part of the reflection is, and there alone: seen so, a pole of the impedance is one
 * crossing like any other and never two. Rising is series, falling parallel resonance.
 *
 * Crossings between which the reactance stays within the noise are one event: an even number of
 * them is a touch and no crossing (`grazing`), an odd number one crossing.
 */
export function findResonances(
  model: PiecewiseModel,
  scan: Float64Array,
  referenceOhm: number,
): readonly Resonance[] {
  const { im } = scanModel(model, scan);
  return eventsOf(signChanges(im), model, scan, im).map((event) => {
    const { change } = event;
    const low = scan[change.before];
    const high = scan[change.after];
    const frequencyHz = zeroBetween((f) => valueAt(pieceAt(model, f), f).im, low, high);
    return resonanceAt(model, frequencyHz, referenceOhm, im[change.after] > 0, event.isTouch);
  });
}

interface CrossingEvent {
  readonly change: SignChange;
  readonly isTouch: boolean;
}

/** Joins changes of sign that noise may have made of one. */
function eventsOf(
  changes: readonly SignChange[],
  model: PiecewiseModel,
  scan: Float64Array,
  im: Float64Array,
): CrossingEvent[] {
  const events: CrossingEvent[] = [];
  let start = 0;
  while (start < changes.length) {
    let end = start;
    while (
      end + 1 < changes.length &&
      isWithinNoise(model, scan, im, changes[end].after, changes[end + 1].before)
    ) {
      end += 1;
    }
    const isTouch = (end - start) % 2 === 1;
    events.push({ change: changes[(start + end) >> 1], isTouch });
    start = end + 1;
  }
  return events;
}

/** Whether the reactance between two places of the scan never leaves the noise. */
function isWithinNoise(
  model: PiecewiseModel,
  scan: Float64Array,
  im: Float64Array,
  from: number,
  to: number,
): boolean {
  let at = from;
  for (let i = from; i <= to; i++) if (Math.abs(im[i]) > Math.abs(im[at])) at = i;
  const piece = pieceAt(model, scan[at]);
  const u95 = halfWidthAt(piece, scan[at], imaginaryPart);
  return u95 !== null && Math.abs(im[at]) < doubtfulWithin * u95;
}

function resonanceAt(
  model: PiecewiseModel,
  frequencyHz: number,
  referenceOhm: number,
  isRising: boolean,
  isTouch: boolean,
): Resonance {
  const piece = pieceAt(model, frequencyHz);
  const value = valueAt(piece, frequencyHz);
  const imU95 = halfWidthAt(piece, frequencyHz, imaginaryPart);
  const frequencyU95Hz = imU95 === null ? null : imU95 / Math.abs(value.slopeIm);
  return {
    frequencyHz,
    frequencyU95Hz: isTouch ? null : frequencyU95Hz,
    kind: isRising ? 'series' : 'parallel',
    ...resistanceAt(piece, frequencyHz, value, referenceOhm),
    ...impedanceQ(piece, frequencyHz, value, referenceOhm),
    grazing: isTouch,
  };
}

type AtResonance = Pick<Resonance, 'resistanceOhm' | 'resistanceU95Ohm' | 'swr' | 'swrU95'>;

/**
 * Resistance and SWR on the real axis of the reflection. To first order the frequency of the
 * crossing moves with the noise too, and the real part along with it.
 */
function resistanceAt(
  piece: ModelPiece,
  frequencyHz: number,
  value: RationalValue,
  referenceOhm: number,
): AtResonance {
  const real = value.re;
  if (real >= 1) return { resistanceOhm: null, resistanceU95Ohm: null, swr: null, swrU95: null };
  const along = value.slopeIm === 0 ? 0 : value.slopeRe / value.slopeIm;
  const functional: Functional = { valueRe: 1, valueIm: along, slopeRe: 0, slopeIm: 0 };
  const realU95 = halfWidthAt(piece, frequencyHz, functional);
  const magnitude = Math.abs(real);
  const isPassive = magnitude < 1;
  return {
    resistanceOhm: (referenceOhm * (1 + real)) / (1 - real),
    resistanceU95Ohm: realU95 === null ? null : (2 * referenceOhm * realU95) / (1 - real) ** 2,
    swr: isPassive ? (1 + magnitude) / (1 - magnitude) : null,
    swrU95: isPassive && realU95 !== null ? (2 * realU95) / (1 - magnitude) ** 2 : null,
  };
}

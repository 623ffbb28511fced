import { noiseHalfWidthAt, type PiecewiseModel } from './piecewise-model.ts';
import type { Functional } from './rational-value.ts';
import { farthestFrom, type Scan, signChanges } from './scan.ts';

/** Weights that take the imaginary part of the reflection. */
export const imaginaryPart: Functional = { valueRe: 0, valueIm: -1, slopeRe: 0, slopeIm: 0 };

/** A swing of the reactance that stays within this many 95 % half-widths may be noise. */
const doubtfulWithin = 1.5;

/** A place where the reactance crosses zero, or touches it. */
export interface Crossing {
  /** Places of the scan that hold it; the same two for a touch without a change of sign. */
  readonly before: number;
  readonly after: number;
  readonly isGrazing: boolean;
}

/**
 * Crossings and touches of zero by the imaginary part of the reflection, ascending. Changes of sign
 * between which it stays within the noise are one: an even number of them is a touch, an odd number
 * a crossing. One on a side of which it never leaves the noise is no crossing beyond doubt either.
 */
export function findCrossings(model: PiecewiseModel, scan: Scan): readonly Crossing[] {
  const events = eventsOf(model, scan);
  const last = scan.im.length - 1;
  const crossings: Crossing[] = events.map(({ first, end, middle }, k) => {
    const from = k === 0 ? 0 : events[k - 1].end;
    const to = k === events.length - 1 ? last : events[k + 1].first;
    const isDoubtful =
      isWithinNoise(model, scan, from, first) || isWithinNoise(model, scan, end, to);
    return { ...middle, isGrazing: middle.count % 2 === 0 || isDoubtful };
  });
  const touches = touchesOf(model, scan, events);
  return [...crossings, ...touches].sort((a, b) => a.before - b.before);
}

/** Changes of sign that noise may have made of one. */
interface CrossingEvent {
  /** Places of the scan before the first and after the last of them. */
  readonly first: number;
  readonly end: number;
  readonly middle: { readonly before: number; readonly after: number; readonly count: number };
}

function eventsOf(model: PiecewiseModel, scan: Scan): CrossingEvent[] {
  const changes = signChanges(scan.im);
  const events: CrossingEvent[] = [];
  let start = 0;
  while (start < changes.length) {
    let end = start;
    while (
      end + 1 < changes.length &&
      isWithinNoise(model, scan, changes[end].after, changes[end + 1].before)
    ) {
      end += 1;
    }
    const { before, after } = changes[(start + end) >> 1];
    const middle = { before, after, count: end - start + 1 };
    events.push({ first: changes[start].before, end: changes[end].after, middle });
    start = end + 1;
  }
  return events;
}

/** Whether the reactance never leaves the noise between two places of the scan. */
function isWithinNoise(model: PiecewiseModel, scan: Scan, from: number, to: number): boolean {
  const at = farthestFrom(scan.im, 0, from, to);
  const u95 = noiseHalfWidthAt(model, scan.frequencyHz[at], imaginaryPart);
  return u95 !== null && Math.abs(scan.im[at]) < doubtfulWithin * u95;
}

/** Places inside the sweep where the reactance comes nearest to zero, within noise, and turns back. */
function touchesOf(
  model: PiecewiseModel,
  scan: Scan,
  events: readonly CrossingEvent[],
): readonly Crossing[] {
  const { im } = scan;
  const touches: Crossing[] = [];
  let event = 0;
  for (let i = 1; i + 1 < im.length; i++) {
    while (event < events.length && events[event].end < i) event += 1;
    const size = Math.abs(im[i]);
    if (size >= Math.abs(im[i - 1]) || size > Math.abs(im[i + 1])) continue;
    if (event < events.length && events[event].first <= i) continue;
    if (!isWithinNoise(model, scan, i, i)) continue;
    const from = event === 0 ? 0 : events[event - 1].end;
    const to = event < events.length ? events[event].first : im.length - 1;
    if (isWithinNoise(model, scan, from, i) || isWithinNoise(model, scan, i, to)) continue;
    touches.push({ before: i, after: i, isGrazing: true });
  }
  return touches;
}

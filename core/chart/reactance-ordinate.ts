import { scaleLinear, scaleSymlog } from 'd3-scale';
import type { Tick } from './frequency-scale.ts';
import { linearTicks } from './frequency-scale.ts';
import type { NumberText } from './number-text.ts';

/** The ordinate of resistances and reactances. */
export interface OhmOrdinate {
  /** Share of the height above the foot, 0 to 1; what lies beyond the ends is held at them. */
  readonly share: (ohm: number) => number;
  readonly ticks: readonly Tick[];
  /** Even steps in ohm, or drawn together far from zero. */
  readonly isLinear: boolean;
}

/** Up to this many times the reference the ordinate is linear. */
const linearUpTo = 6;
/** Nothing beyond this many times the reference is told apart. */
const drawnUpTo = 200;
/** Share of the upper half that the lower has at least, for what is written about zero. */
const roomBelowZero = 0.25;
const decades = [1, 10, 100, 1000, 10_000, 100_000];
const roundOhms = decades.flatMap((decade) => [decade, 2 * decade, 5 * decade]);

/**
 * An ordinate that shows zero and all values. Where they reach far beyond the reference, as near a
 * parallel resonance, it is linear about zero and logarithmic beyond half the reference (Webber,
 * Meas. Sci. Technol. 24, 2013), so that neither part is lost.
 */
export function ohmOrdinate(
  { least, most }: { readonly least: number; readonly most: number },
  referenceOhm: number,
  heightPx: number,
  tickPx: number,
  numbers: NumberText,
): OhmOrdinate {
  const end = drawnUpTo * referenceOhm;
  const high = Math.min(end, Math.max(referenceOhm / 5, most));
  const low = Math.max(-end, Math.min(-roomBelowZero * high, least));
  if (Math.max(-low, high) <= linearUpTo * referenceOhm) {
    const scale = scaleLinear([low, high], [0, 1]).clamp(true).nice(8);
    const [from, to] = scale.domain();
    const ticks = linearTicks(from, to, heightPx, tickPx * 1.6, 1, numbers);
    return { share: scale, ticks, isLinear: true };
  }
  const scale = scaleSymlog([low, high], [0, 1])
    .constant(referenceOhm / 2)
    .clamp(true);
  const values = symlogTicks(low, high, (ohm) => scale(ohm) * heightPx, tickPx);
  const ticks = values.map((at) => ({ at, text: numbers.fixed(at, 0) }));
  return { share: scale, ticks, isLinear: false };
}

/** Zero, then round values outwards as far as each has room. */
function symlogTicks(
  low: number,
  high: number,
  place: (ohm: number) => number,
  leastPx: number,
): readonly number[] {
  const kept = [0];
  for (const sign of [1, -1]) {
    let last = 0;
    for (const ohm of roundOhms) {
      const at = sign * ohm;
      if (at < low || at > high || Math.abs(place(at) - place(last)) < leastPx) continue;
      kept.push(at);
      last = at;
    }
  }
  return kept;
}

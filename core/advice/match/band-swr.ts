import { add, type Complex, divide, magnitude, subtract } from '../../line/complex.ts';
import { type ComponentQ, type MatchElement, throughElement } from './element.ts';

/** The loads that were measured inside a band, one impedance for each frequency. */
export interface BandLoads {
  readonly frequencyHz: Float64Array;
  readonly resistanceOhm: Float64Array;
  readonly reactanceOhm: Float64Array;
}

/** What a network makes of a band. */
export interface BandMatch {
  /** SWR of every frequency; infinite for a total reflection. */
  readonly swr: Float64Array;
  readonly worstSwr: number;
  /** The widest contiguous part where SWR is within the limit; null where there is none. */
  readonly widestSpan: { readonly lowHz: number; readonly highHz: number } | null;
  readonly usableWidthHz: number;
  /** Loss in the parts at the design frequency, dB. */
  readonly designLossDb: number;
  /** Largest loss in the parts over the band, dB. */
  readonly worstLossDb: number;
}

/** Sends every load of the band through the parts, and says what comes of it against `targetOhm`. */
export function bandMatch(
  loads: BandLoads,
  elements: readonly MatchElement[],
  targetOhm: number,
  maxSwr: number,
  q: ComponentQ,
  design: { readonly frequencyHz: number; readonly load: Complex },
): BandMatch {
  const points = loads.frequencyHz.length;
  const swr = new Float64Array(points);
  let worstLossDb = 0;
  for (let i = 0; i < points; i++) {
    const load = { re: loads.resistanceOhm[i], im: loads.reactanceOhm[i] };
    const through = throughNetwork(elements, load, loads.frequencyHz[i], q);
    swr[i] = swrOf(through.impedance, targetOhm);
    worstLossDb = Math.max(worstLossDb, through.lossDb);
  }
  const widestSpan = widest(loads.frequencyHz, swr, maxSwr);
  return {
    swr,
    worstSwr: Math.max(...swr),
    widestSpan,
    usableWidthHz: widestSpan === null ? 0 : widestSpan.highHz - widestSpan.lowHz,
    designLossDb: throughNetwork(elements, design.load, design.frequencyHz, q).lossDb,
    worstLossDb,
  };
}

/**
 * Impedance at the source of a network that ends in `load`, and the loss in its parts; no loss is
 * claimed for a load that would give power back.
 */
export function throughNetwork(
  elements: readonly MatchElement[],
  load: Complex,
  frequencyHz: number,
  q: ComponentQ,
): { readonly impedance: Complex; readonly lossDb: number } {
  let impedance = load;
  let efficiency = 1;
  for (const element of elements) {
    const step = throughElement(element, impedance, frequencyHz, q);
    impedance = step.impedance;
    efficiency *= step.efficiency;
  }
  return { impedance, lossDb: efficiency > 0 ? Math.max(0, -10 * Math.log10(efficiency)) : 0 };
}

function swrOf(impedance: Complex, targetOhm: number): number {
  const target = { re: targetOhm, im: 0 };
  const rho = magnitude(divide(subtract(impedance, target), add(impedance, target)));
  return rho < 1 ? (1 + rho) / (1 - rho) : Number.POSITIVE_INFINITY;
}

/** Edges are interpolated in 1/SWR, which stays finite. */
function widest(
  frequencyHz: Float64Array,
  swr: Float64Array,
  maxSwr: number,
): { readonly lowHz: number; readonly highHz: number } | null {
  const last = swr.length - 1;
  const inside = (i: number) => swr[i] <= maxSwr;
  const crossing = (i: number, j: number): number => {
    const share = (1 / maxSwr - 1 / swr[i]) / (1 / swr[j] - 1 / swr[i]);
    return frequencyHz[i] + share * (frequencyHz[j] - frequencyHz[i]);
  };
  let best: { lowHz: number; highHz: number } | null = null;
  for (let start = 0; start <= last; start++) {
    if (!inside(start)) continue;
    let end = start;
    while (end < last && inside(end + 1)) end++;
    const lowHz = start === 0 ? frequencyHz[0] : crossing(start - 1, start);
    const highHz = end === last ? frequencyHz[last] : crossing(end, end + 1);
    if (best === null || highHz - lowHz > best.highHz - best.lowHz) best = { lowHz, highHz };
    start = end;
  }
  return best;
}

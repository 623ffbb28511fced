import type { Sweep } from '../sweep.ts';
import { type Analysis, analyse } from './analysis.ts';
import type { InstrumentError } from './instrument-error.ts';
import { findSpans, type Spans } from './spans.ts';
import type { SwrCurve, SwrExtremes } from './swr-curve.ts';

/** SWR of a squared magnitude of the reflection; null where the reflection is total. */
export function swrOfSquare(square: number): number | null {
  const magnitude = Math.sqrt(Math.max(0, square));
  return magnitude < 1 ? (1 + magnitude) / (1 - magnitude) : null;
}

/** Half-width of SWR from that of the magnitude; null where either is not to be had. */
export function swrU95OfSquare(square: number, magnitudeU95: number | null): number | null {
  const magnitude = Math.sqrt(Math.max(0, square));
  if (magnitudeU95 === null || magnitude >= 1) return null;
  return (2 * magnitudeU95) / (1 - magnitude) ** 2;
}

/** The refined SWR of a sweep against its own reference. */
export function swrCurve(sweep: Sweep, instrument: InstrumentError | null = null): SwrCurve {
  return curveOf(analyse(sweep, instrument));
}

/** The refined SWR of a sweep that was analysed already. */
export function curveOf(analysis: Analysis): SwrCurve {
  const { frequencyHz } = analysis.sweep;
  const lowHz = frequencyHz[0];
  const highHz = frequencyHz[frequencyHz.length - 1];
  return {
    lowHz,
    highHz,
    spans: (maxSwr) => spansOf(analysis, maxSwr).spans,
    extremes: (low, high) =>
      high < lowHz || low > highHz
        ? null
        : extremesOn(analysis, Math.max(low, lowHz), Math.min(high, highHz)),
  };
}

/** The usable spans of a sweep that was analysed already, and where the SWR only touches the limit. */
export function spansOf({ mismatch, scan, minima }: Analysis, maxSwr: number): Spans {
  if (mismatch !== null) return findSpans(mismatch, scan, maxSwr);
  const swr = swrOfSquare(minima[0].square);
  if (swr === null || swr > maxSwr) return { spans: [], grazingHz: [] };
  const [at] = scan.frequencyHz;
  const unknown = { lowU95Hz: null, highU95Hz: null };
  const span = { maxSwr, lowHz: at, highHz: at, widthHz: 0, lowOpen: true, highOpen: true };
  return { spans: [{ ...span, ...unknown }], grazingHz: [] };
}

interface Place {
  readonly frequencyHz: number;
  readonly square: number;
}

function extremesOn(analysis: Analysis, low: number, high: number): SwrExtremes {
  const { mismatch, minima, maxima } = analysis;
  const inside = ({ frequencyHz }: Place) => frequencyHz >= low && frequencyHz <= high;
  const ends: Place[] =
    mismatch === null
      ? []
      : [low, high].map((frequencyHz) => ({
          frequencyHz,
          square: mismatch.at(frequencyHz).square,
        }));
  const places = [...ends, ...minima.filter(inside), ...maxima.filter(inside)];
  const worst = places.reduce((a, b) => (b.square > a.square ? b : a));
  const least = places.reduce((a, b) => (b.square < a.square ? b : a));
  const worstU95 = mismatch?.magnitudeU95(worst.frequencyHz) ?? null;
  return {
    worstSwr: swrOfSquare(worst.square),
    worstSwrHz: worst.frequencyHz,
    worstSwrU95: swrU95OfSquare(worst.square, worstU95),
    minimumSwr: swrOfSquare(least.square),
    minimumSwrHz: least.frequencyHz,
  };
}

import type { Resonance, SwrMinimum, UsableSpan } from '../../core/analysis/summary.ts';
import type { SwrCurve } from '../../core/analysis/swr-curve.ts';
import { type ComplexSweep, reflectionMagnitude } from '../../core/sweep.ts';
import type { Estimate } from './estimator.ts';

/**
 * The simplest answers: straight lines between neighbouring points, the lowest point for the
 * minimum, no uncertainty. The bench has to find them wanting; that is what this one is for.
 */
export function estimateLinearly(sweep: ComplexSweep): Estimate {
  const swr = reflectionMagnitude(sweep).map((magnitude) =>
    magnitude < 1 ? (1 + magnitude) / (1 - magnitude) : Number.POSITIVE_INFINITY,
  );
  return {
    resonances: crossings(sweep.frequencyHz, sweep.reflectionIm, 0).map(resonanceAt),
    minimumSwr: lowest(sweep.frequencyHz, swr),
    curve: linearCurve(sweep.frequencyHz, swr),
  };
}

interface Crossing {
  readonly at: number;
  readonly rising: boolean;
}

function crossings(x: Float64Array, y: Float64Array, level: number): Crossing[] {
  const found: Crossing[] = [];
  for (let i = 1; i < x.length; i++) {
    const before = y[i - 1] - level;
    const after = y[i] - level;
    if (before < 0 === after < 0) continue;
    const share = Number.isFinite(after - before) ? before / (before - after) : 0.5;
    found.push({ at: x[i - 1] + share * (x[i] - x[i - 1]), rising: before < 0 });
  }
  return found;
}

function resonanceAt({ at, rising }: Crossing): Resonance {
  return {
    frequencyHz: at,
    frequencyU95Hz: null,
    kind: rising ? 'series' : 'parallel',
    resistanceOhm: null,
    resistanceU95Ohm: null,
    swr: null,
    swrU95: null,
    q: null,
    qU95: null,
    matchedBandwidth: null,
    grazing: false,
  };
}

function lowest(x: Float64Array, swr: Float64Array): SwrMinimum {
  const at = swr.reduce((best, value, i) => (value < swr[best] ? i : best), 0);
  return {
    frequencyHz: x[at],
    frequencyU95Hz: null,
    swr: swr[at],
    swrU95: null,
    resistanceOhm: null,
    reactanceOhm: null,
    returnLossDb: null,
    atEdge: at === 0 || at === x.length - 1,
  };
}

function linearCurve(x: Float64Array, swr: Float64Array): SwrCurve {
  return {
    lowHz: x[0],
    highHz: x[x.length - 1],
    spans: (maxSwr) => spansOf(x, swr, maxSwr),
    extremes(lowHz, highHz) {
      const inside = Array.from(swr.filter((_, i) => x[i] >= lowHz && x[i] <= highHz));
      if (inside.length === 0) return null;
      return {
        worstSwr: Math.max(...inside),
        worstSwrHz: lowHz,
        worstSwrU95: null,
        minimumSwr: Math.min(...inside),
        minimumSwrHz: lowHz,
      };
    },
  };
}

function spansOf(x: Float64Array, swr: Float64Array, maxSwr: number): UsableSpan[] {
  const edges = crossings(x, swr, maxSwr);
  const starts = edges.filter((edge) => !edge.rising).map((edge) => edge.at);
  const ends = edges.filter((edge) => edge.rising).map((edge) => edge.at);
  const lowOpen = swr[0] < maxSwr;
  const highOpen = swr[swr.length - 1] < maxSwr;
  if (lowOpen) starts.unshift(x[0]);
  if (highOpen) ends.push(x[x.length - 1]);
  return starts.map((lowHz, i) => ({
    maxSwr,
    lowHz,
    lowU95Hz: null,
    highHz: ends[i],
    highU95Hz: null,
    widthHz: ends[i] - lowHz,
    lowOpen: lowOpen && i === 0,
    highOpen: highOpen && i === starts.length - 1,
  }));
}

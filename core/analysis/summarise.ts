import type { Assumption } from '../formats/read-types.ts';
import { renormaliseSweep } from '../network/renormalise.ts';
import type { Sweep } from '../sweep.ts';
import { absences, type Draft } from './absences.ts';
import { type Analysis, analyse } from './analysis.ts';
import type { InstrumentError } from './instrument-error.ts';
import { valueAt } from './piecewise-model.ts';
import { qualityFlags } from './quality.ts';
import { reactanceMagnitudeMinima } from './reactance-magnitude.ts';
import { spansOf, swrOfSquare, swrU95OfSquare } from './refined-swr.ts';
import { findResonances } from './resonances.ts';
import type { Plane, Resonance, Summary, SwrMinimum } from './summary.ts';
import { summaryCautions } from './summary-cautions.ts';
import type { Turn } from './swr-minima.ts';

/** Raised whenever the same sweep would be answered otherwise. */
export const analysisVersion = '1';

export interface SummariseOptions {
  /** The resistance that SWR refers to, ohm; the sweep's own by default. */
  readonly referenceOhm?: number;
  /** Limits of the usable spans, ascending. */
  readonly swrLimits?: readonly number[];
  readonly plane?: Plane;
  /** What the reader of the file assumed; passed on. */
  readonly assumptions?: readonly Assumption[];
  /** What the analyzer may be off by; without it the half-widths hold noise alone. */
  readonly instrument?: InstrumentError | null;
}

/** Limits of the usable spans where none are asked. */
export const usualSwrLimits: readonly number[] = [1.5, 2, 3];

/** The resonance and minimum-SWR summary of a sweep. */
export function summarise(sweep: Sweep, options: SummariseOptions = {}): Summary {
  const { referenceOhm = sweep.referenceOhm, instrument = null } = options;
  const analysis = analyse(renormaliseSweep(sweep, referenceOhm), instrument);
  return summariseAnalysis(analysis, { ...options, referenceOhm });
}

/** The summary of a sweep that was analysed already, against the reference it was analysed at. */
export function summariseAnalysis(analysis: Analysis, options: SummariseOptions = {}): Summary {
  const { sweep } = analysis;
  const { plane = 'measured', assumptions = [], swrLimits = usualSwrLimits } = options;
  const resonances = resonancesOf(analysis);
  const swrMinima = analysis.minima.flatMap((turn) => swrMinimumAt(analysis, turn) ?? []);
  const minimum = lowest(swrMinima);
  const found = swrLimits.map((maxSwr) => ({ maxSwr, ...spansOf(analysis, maxSwr) }));
  const grazingHz = found.flatMap(({ maxSwr, grazingHz }) =>
    grazingHz.map((frequencyHz) => ({ maxSwr, frequencyHz })),
  );
  const { frequencyHz } = sweep;
  const draft: Draft = {
    analysisVersion,
    plane,
    referenceOhm: sweep.referenceOhm,
    phase: sweep.phase,
    span: {
      lowHz: frequencyHz[0],
      highHz: frequencyHz[frequencyHz.length - 1],
      points: frequencyHz.length,
      medianStepHz: medianStepHz(frequencyHz),
    },
    minimumSwr: minimum,
    swrMinima,
    resonances,
    reactanceMagnitudeMinima: sweep.phase === 'unsigned' ? reactanceMagnitudeMinima(sweep) : [],
    resonanceOffsetHz: offsetHz(minimum, resonances),
    spans: found.flatMap(({ spans }) => spans),
    quality: {
      flags: qualityFlags(analysis, { resonances, minimum, grazingHz, assumptions }),
      reflectionNoise: analysis.noise,
    },
    assumptions,
    cautions: summaryCautions(analysis, options.referenceOhm ?? sweep.referenceOhm),
  };
  return { ...draft, absent: absences(analysis, draft) };
}

function resonancesOf({ reflection, scan, sweep }: Analysis): readonly Resonance[] {
  return reflection === null ? [] : findResonances(reflection, scan, sweep.referenceOhm);
}

function swrMinimumAt(analysis: Analysis, turn: Turn): SwrMinimum | null {
  const { mismatch } = analysis;
  const { frequencyHz, frequencyU95Hz, square, atEdge } = turn;
  const swr = swrOfSquare(square);
  if (swr === null) return null;
  return {
    frequencyHz,
    frequencyU95Hz,
    swr,
    swrU95: swrU95OfSquare(square, mismatch?.magnitudeU95(frequencyHz) ?? null),
    ...impedanceAt(analysis, frequencyHz, square),
    returnLossDb: square > 0 ? -10 * Math.log10(square) : null,
    atEdge,
  };
}

type Impedance = Pick<SwrMinimum, 'resistanceOhm' | 'reactanceOhm'>;

/** With the sign unknown, the resistance follows from the magnitude and the real part. */
function impedanceAt(
  { reflection, realPart, sweep }: Analysis,
  frequencyHz: number,
  square: number,
): Impedance {
  const point = reflection === null ? onlyPoint(sweep) : valueAt(reflection, frequencyHz);
  const re = point?.re ?? realPartAt(realPart, sweep, frequencyHz);
  if (re === null) return { resistanceOhm: null, reactanceOhm: null };
  const d = 1 - 2 * re + square;
  if (!(d > 0)) return { resistanceOhm: null, reactanceOhm: null };
  return {
    resistanceOhm: (sweep.referenceOhm * (1 - square)) / d,
    reactanceOhm: point === null ? null : (2 * sweep.referenceOhm * point.im) / d,
  };
}

function onlyPoint(sweep: Sweep): { readonly re: number; readonly im: number } | null {
  if (sweep.phase !== 'signed' || sweep.frequencyHz.length !== 1) return null;
  return { re: sweep.reflectionRe[0], im: sweep.reflectionIm[0] };
}

function realPartAt(
  realPart: Analysis['realPart'],
  sweep: Sweep,
  frequencyHz: number,
): number | null {
  if (realPart !== null) return valueAt(realPart, frequencyHz).re;
  return sweep.phase === 'unsigned' ? sweep.reflectionRe[0] : null;
}

function lowest(minima: readonly SwrMinimum[]): SwrMinimum | null {
  if (minima.length === 0) return null;
  return minima.reduce((a, b) => (b.swr < a.swr ? b : a));
}

function medianStepHz(frequencyHz: Float64Array): number | null {
  if (frequencyHz.length < 2) return null;
  const steps = new Float64Array(frequencyHz.length - 1);
  for (let i = 0; i < steps.length; i++) steps[i] = frequencyHz[i + 1] - frequencyHz[i];
  if (steps.every((step) => step === steps[0])) return steps[0];
  steps.sort();
  const middle = steps.length >> 1;
  return steps.length % 2 === 1 ? steps[middle] : (steps[middle - 1] + steps[middle]) / 2;
}

/** Frequency of the minimum less that of the nearest resonance that is one beyond doubt. */
function offsetHz(minimum: SwrMinimum | null, resonances: readonly Resonance[]): number | null {
  if (minimum === null || minimum.atEdge) return null;
  let nearest: number | null = null;
  for (const { frequencyHz, grazing } of resonances) {
    const offset = minimum.frequencyHz - frequencyHz;
    if (grazing || (nearest !== null && Math.abs(offset) >= Math.abs(nearest))) continue;
    nearest = offset;
  }
  return nearest;
}

import type { Assumption } from '../formats/read-types.ts';
import type { Sweep } from '../sweep.ts';
import { absences } from './absences.ts';
import { type Analysis, analyse } from './analysis.ts';
import { pieceAt, valueAt } from './piecewise-model.ts';
import { qualityFlags } from './quality.ts';
import { curveOf, swrOfSquare, swrU95OfSquare } from './refined-swr.ts';
import { renormaliseSweep } from './renormalise-sweep.ts';
import { findResonances } from './resonances.ts';
import type { Plane, Resonance, Summary, SwrMinimum } from './summary.ts';
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
}

const usualLimits = [1.5, 2, 3];

/** The resonance and minimum-SWR summary of a sweep. */
export function summarise(sweep: Sweep, options: SummariseOptions = {}): Summary {
  const asked = renormaliseSweep(sweep, options.referenceOhm ?? sweep.referenceOhm);
  return summariseAnalysis(analyse(asked), options);
}

/** The same of a sweep that was analysed already, against the reference it was analysed against. */
export function summariseAnalysis(
  analysis: Analysis,
  options: Omit<SummariseOptions, 'referenceOhm'> = {},
): Summary {
  const { plane = 'measured', assumptions = [], swrLimits = usualLimits } = options;
  const { sweep: asked } = analysis;
  const resonances = resonancesOf(analysis);
  const swrMinima = analysis.minima.flatMap((turn) => swrMinimumAt(analysis, turn) ?? []);
  const minimumSwr = lowest(swrMinima);
  const curve = curveOf(analysis);
  const { frequencyHz } = asked;
  return {
    analysisVersion,
    plane,
    referenceOhm: asked.referenceOhm,
    phase: asked.phase,
    span: {
      lowHz: frequencyHz[0],
      highHz: frequencyHz[frequencyHz.length - 1],
      points: frequencyHz.length,
      medianStepHz: medianStepHz(frequencyHz),
    },
    minimumSwr,
    swrMinima,
    resonances,
    resonanceOffsetHz: offsetHz(minimumSwr, resonances),
    spans: swrLimits.flatMap((limit) => [...curve.spans(limit)]),
    quality: {
      flags: qualityFlags(analysis, resonances, minimumSwr, assumptions),
      reflectionNoise: analysis.noise,
    },
    absent: absences(analysis, resonances, minimumSwr),
    assumptions,
    cautions: [],
  };
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
    ...impedanceAt(analysis, frequencyHz),
    returnLossDb: square > 0 ? -10 * Math.log10(square) : null,
    atEdge,
  };
}

type Impedance = Pick<SwrMinimum, 'resistanceOhm' | 'reactanceOhm'>;

function impedanceAt({ reflection, sweep }: Analysis, frequencyHz: number): Impedance {
  const point =
    reflection === null ? onlyPoint(sweep) : valueAt(pieceAt(reflection, frequencyHz), frequencyHz);
  if (point === null) return { resistanceOhm: null, reactanceOhm: null };
  const d = (1 - point.re) ** 2 + point.im ** 2;
  return {
    resistanceOhm: (sweep.referenceOhm * (1 - point.re ** 2 - point.im ** 2)) / d,
    reactanceOhm: (2 * sweep.referenceOhm * point.im) / d,
  };
}

function onlyPoint(sweep: Sweep): { readonly re: number; readonly im: number } | null {
  if (sweep.phase !== 'signed' || sweep.frequencyHz.length !== 1) return null;
  return { re: sweep.reflectionRe[0], im: sweep.reflectionIm[0] };
}

function lowest(minima: readonly SwrMinimum[]): SwrMinimum | null {
  if (minima.length === 0) return null;
  return minima.reduce((a, b) => (b.swr < a.swr ? b : a));
}

function medianStepHz(frequencyHz: Float64Array): number | null {
  if (frequencyHz.length < 2) return null;
  const steps = frequencyHz.slice(1).map((f, i) => f - frequencyHz[i]);
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

import { reflectionMagnitude, type Sweep } from '../sweep.ts';
import {
  complexMismatch,
  type Mismatch,
  scalarMismatch,
  squaredMagnitudeModel,
} from './mismatch.ts';
import { type PiecewiseModel, piecewiseModel } from './piecewise-model.ts';
import { scanFrequencies } from './scan.ts';
import { mismatchMaxima, mismatchMinima, type Turn } from './swr-minima.ts';

/** A sweep with the functions that stand for it; everything that is answered comes from here. */
export interface Analysis {
  readonly sweep: Sweep;
  readonly scan: Float64Array;
  /** The complex reflection; null unless its sign is known and there are two points. */
  readonly reflection: PiecewiseModel | null;
  /** Null for a sweep of one point. */
  readonly mismatch: Mismatch | null;
  readonly minima: readonly Turn[];
  readonly maxima: readonly Turn[];
  /** Standard deviation of one component of the reflection; null if it can't be told. */
  readonly noise: number | null;
}

/** Models a sweep, once for all that will be asked of it. */
export function analyse(sweep: Sweep): Analysis {
  if (sweep.frequencyHz.length < 2) return analyseOnePoint(sweep);
  const scan = scanFrequencies(sweep.frequencyHz);
  const [reflection, squared] =
    sweep.phase === 'signed'
      ? [complexModel(sweep.frequencyHz, sweep.reflectionRe, sweep.reflectionIm), null]
      : [null, squaredMagnitudeModel(sweep)];
  const mismatch =
    reflection === null ? scalarMismatch(squared ?? { pieces: [] }) : complexMismatch(reflection);
  return {
    sweep,
    scan,
    reflection,
    mismatch,
    minima: mismatchMinima(mismatch, scan),
    maxima: mismatchMaxima(mismatch, scan),
    noise: noiseOf(reflection),
  };
}

function complexModel(frequencyHz: Float64Array, re: Float64Array, im: Float64Array) {
  return piecewiseModel({ frequencyHz, re, im }, 'reflection');
}

function analyseOnePoint(sweep: Sweep): Analysis {
  const [magnitude] = reflectionMagnitude(sweep);
  const [frequencyHz] = sweep.frequencyHz;
  const turn: Turn = { frequencyHz, frequencyU95Hz: null, square: magnitude ** 2, atEdge: true };
  return {
    sweep,
    scan: sweep.frequencyHz,
    reflection: null,
    mismatch: null,
    minima: [turn],
    maxima: [],
    noise: null,
  };
}

/** The noise of the widest piece whose noise is known. */
function noiseOf(model: PiecewiseModel | null): number | null {
  const known = (model?.pieces ?? []).filter((piece) => piece.noise !== null);
  if (known.length === 0) return null;
  const widest = known.reduce((a, b) => (b.highHz - b.lowHz > a.highHz - a.lowHz ? b : a));
  return widest.noise;
}

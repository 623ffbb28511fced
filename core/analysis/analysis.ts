import { reflectionMagnitude, type Sweep } from '../sweep.ts';
import { differenceNoise } from './difference-noise.ts';
import type { InstrumentError } from './instrument-error.ts';
import { complexMismatch, type Mismatch, scalarMismatch } from './mismatch.ts';
import { type PiecewiseModel, piecewiseModel, valuesAt } from './piecewise-model.ts';
import { type Scan, scanFrequencies } from './scan.ts';
import { mismatchMaxima, mismatchMinima, type Turn } from './swr-minima.ts';

/** A sweep with the functions that stand for it; everything that is answered comes from here. */
export interface Analysis {
  readonly sweep: Sweep;
  readonly scan: Scan;
  /** The complex reflection; null unless its sign is known and there are two points. */
  readonly reflection: PiecewiseModel | null;
  /** Its real part alone, where only the sign of the other is lost; null elsewhere. */
  readonly realPart: PiecewiseModel | null;
  /** Null for a sweep of one point. */
  readonly mismatch: Mismatch | null;
  readonly minima: readonly Turn[];
  readonly maxima: readonly Turn[];
  /** Standard deviation of one component of the reflection; null if it can't be told. */
  readonly noise: number | null;
  readonly instrument: InstrumentError | null;
}

/** Models a sweep, once for all that will be asked of it. */
export function analyse(sweep: Sweep, instrument: InstrumentError | null = null): Analysis {
  if (sweep.frequencyHz.length < 2) return analyseOnePoint(sweep, instrument);
  return sweep.phase === 'signed'
    ? analyseComplex(sweep, instrument)
    : analyseScalar(sweep, instrument);
}

type Signed = Extract<Sweep, { readonly reflectionRe: Float64Array }>;

function analyseComplex(sweep: Signed, instrument: InstrumentError | null): Analysis {
  const { reflectionRe: re, reflectionIm: im } = sweep;
  const reflection = modelOf(sweep, re, im, 'reflection', instrument);
  const frequencyHz = scanFrequencies(sweep.frequencyHz);
  const values = valuesAt(reflection, frequencyHz);
  const square = values.re.map((value, i) => value * value + values.im[i] * values.im[i]);
  const scan: Scan = { frequencyHz, square, ...values };
  const mismatch = complexMismatch(reflection);
  const noise = noiseOf(reflection);
  return { ...turnsOf(mismatch, scan), sweep, reflection, realPart: null, noise, instrument };
}

function analyseScalar(sweep: Sweep, instrument: InstrumentError | null): Analysis {
  const magnitude = reflectionMagnitude(sweep);
  const none = new Float64Array(magnitude.length);
  const squares = magnitude.map((value) => value * value);
  const model = modelOf(sweep, squares, none, 'square', instrument);
  const realPart =
    sweep.phase === 'none' ? null : modelOf(sweep, sweep.reflectionRe, none, 'square', null);
  const frequencyHz = scanFrequencies(sweep.frequencyHz);
  const { re } = valuesAt(model, frequencyHz);
  const nothing = new Float64Array(re.length);
  const square = re.map((value) => Math.max(0, value));
  const scan: Scan = { frequencyHz, square, re: nothing, im: nothing };
  const noise = realPart === null ? magnitudeNoise(magnitude, noiseOf(model)) : noiseOf(realPart);
  return {
    ...turnsOf(scalarMismatch(model), scan),
    sweep,
    reflection: null,
    realPart,
    noise,
    instrument,
  };
}

/** Noise of a magnitude: at least that between neighbours, and what the squares' fit leaves. */
function magnitudeNoise(magnitude: Float64Array, ofSquares: number | null): number | null {
  if (ofSquares === null) return null;
  const squares = magnitude.reduce((sum, value) => sum + value * value, 0);
  if (squares === 0) return ofSquares;
  const rms = Math.sqrt(squares / magnitude.length);
  return Math.max(differenceNoise(magnitude, magnitude), ofSquares / (2 * rms));
}

function modelOf(
  { frequencyHz }: Sweep,
  re: Float64Array,
  im: Float64Array,
  form: PiecewiseModel['form'],
  instrument: InstrumentError | null,
): PiecewiseModel {
  return piecewiseModel({ frequencyHz, re, im }, form, instrument);
}

function turnsOf(mismatch: Mismatch, scan: Scan) {
  return {
    scan,
    mismatch,
    minima: mismatchMinima(mismatch, scan),
    maxima: mismatchMaxima(mismatch, scan),
  };
}

function analyseOnePoint(sweep: Sweep, instrument: InstrumentError | null): Analysis {
  const [magnitude] = reflectionMagnitude(sweep);
  const [frequencyHz] = sweep.frequencyHz;
  const square = magnitude ** 2;
  const [re, im] = sweep.phase === 'signed' ? [sweep.reflectionRe, sweep.reflectionIm] : [];
  return {
    sweep,
    scan: {
      frequencyHz: sweep.frequencyHz,
      square: Float64Array.of(square),
      re: re ?? new Float64Array(1),
      im: im ?? new Float64Array(1),
    },
    reflection: null,
    realPart: null,
    mismatch: null,
    minima: [{ frequencyHz, frequencyU95Hz: null, square, atEdge: true }],
    maxima: [],
    noise: null,
    instrument,
  };
}

/** The noise of the widest piece whose noise is known. */
function noiseOf({ pieces }: PiecewiseModel): number | null {
  const known = pieces.filter((piece) => piece.noise !== null);
  if (known.length === 0) return null;
  const widest = known.reduce((a, b) => (b.highHz - b.lowHz > a.highHz - a.lowHz ? b : a));
  return widest.noise;
}

import { type InstrumentError, reflectionErrorBound } from './instrument-error.ts';
import { type ChosenFits, chooseFits, hopeless } from './model-choice.ts';
import { frequencyScale, type RationalForm } from './rational-basis.ts';
import type { RationalFit } from './rational-fit.ts';
import {
  addFitValues,
  type Functional,
  fitValueAt,
  functionalOf,
  type RationalValue,
  spreadAt,
} from './rational-value.ts';
import type { Samples } from './samples.ts';

/** A stretch of the sweep, from sample to sample, with the functions that stand for it. */
export interface ModelPiece extends Pick<ChosenFits, 'members' | 'noise' | 'factor95'> {
  readonly lowHz: number;
  readonly highHz: number;
}

/** The sweep as functions of frequency, piece after piece without gaps. */
export interface PiecewiseModel {
  readonly form: RationalForm;
  readonly pieces: readonly ModelPiece[];
  /** What the analyzer may be off by; null if only noise is known. */
  readonly instrument: InstrumentError | null;
}

/** A stretch is not halved below this many samples. */
const fewestToHalve = 24;
/** Halving is worth it where it brings the residuals below this part of what they were. */
const worthHalving = 0.6;
/** Residuals above this are more than rounding to three digits makes. */
const farOff = 0.002;
/** Samples beyond its own stretch that a piece is fitted to, as a part of the stretch. */
const overlap = 0.35;

/**
 * Stands rational functions for a sweep: for all of it where they explain all but noise, else for
 * halves of it, and so on. Each piece is fitted beyond its ends, where fits are weakest. Below five
 * samples, and where nothing fits, the pieces are straight lines and know no noise. Needs two samples.
 */
export function piecewiseModel(
  samples: Samples,
  form: RationalForm,
  instrument: InstrumentError | null = null,
): PiecewiseModel {
  const last = samples.frequencyHz.length - 1;
  const pieces: ModelPiece[] = [];
  cover(samples, form, 0, last, chooseOn(samples, form, 0, last), pieces);
  return { form, pieces, instrument };
}

/** The fits for a stretch, fitted to a part of its neighbours as well. */
function chooseOn(samples: Samples, form: RationalForm, first: number, last: number) {
  const reach = Math.ceil((last - first) * overlap);
  const from = Math.max(0, first - reach);
  const to = Math.min(samples.frequencyHz.length - 1, last + reach);
  return chooseFits(slice(samples, from, to + 1), form);
}

function cover(
  samples: Samples,
  form: RationalForm,
  first: number,
  last: number,
  chosen: ChosenFits | null,
  pieces: ModelPiece[],
): void {
  const { frequencyHz } = samples;
  const isSmall = last - first < fewestToHalve;
  if (chosen === null || (isSmall && isHopeless(chosen))) {
    for (let i = first; i < last; i++) pieces.push(straightLine(samples, form, i));
    return;
  }
  if (!chosen.isWhite && !isSmall) {
    const middle = (first + last) >> 1;
    const left = chooseOn(samples, form, first, middle);
    const right = chooseOn(samples, form, middle, last);
    if (chosen.isCapped || isFarOff(chosen) || pays(chosen, left, right)) {
      cover(samples, form, first, middle, left, pieces);
      cover(samples, form, middle, last, right, pieces);
      return;
    }
  }
  const { members, noise, factor95 } = chosen;
  pieces.push({ lowHz: frequencyHz[first], highHz: frequencyHz[last], members, noise, factor95 });
}

/** A fit that misses the samples themselves: halves of halves may do what halves cannot yet. */
function isFarOff(chosen: ChosenFits): boolean {
  const { noise, isExplained } = chosen;
  return isHopeless(chosen) || (noise !== null && noise > farOff && !isExplained);
}

function isHopeless({ noise, isWhite }: ChosenFits): boolean {
  return !isWhite && noise !== null && noise > hopeless;
}

/**
 * Whether halving takes away much of the residuals. Where they come from rounding to few digits they
 * hang together too, and halves would only follow the steps of the rounding.
 */
function pays(whole: ChosenFits, left: ChosenFits | null, right: ChosenFits | null): boolean {
  if (left === null || right === null || whole.noise === null) return false;
  const halves = Math.hypot(left.noise ?? 0, right.noise ?? 0) / Math.SQRT2;
  return halves < worthHalving * whole.noise;
}

function slice({ frequencyHz, re, im }: Samples, from: number, to: number): Samples {
  return {
    frequencyHz: frequencyHz.subarray(from, to),
    re: re.subarray(from, to),
    im: im.subarray(from, to),
  };
}

/**
 * Between two samples: a straight line, as nearly as a network of real elements can have one (the
 * parabola in the square of frequency that meets the line in three places).
 */
function straightLine({ frequencyHz, re, im }: Samples, form: RationalForm, i: number): ModelPiece {
  const lowHz = frequencyHz[i];
  const highHz = frequencyHz[i + 1];
  const scale = frequencyScale(lowHz, highHz);
  const middleHz = Math.sqrt((lowHz * lowHz + highHz * highHz) / 2);
  const share = (middleHz - lowHz) / (highHz - lowHz);
  const middleIm = im[i] + share * (im[i + 1] - im[i]);
  const oddOf = (value: number, f: number) => (f === 0 ? 0 : (value * scale.centreHz) / f);
  const even = parabola(re[i], re[i] + share * (re[i + 1] - re[i]), re[i + 1]);
  const odd = parabola(oddOf(im[i], lowHz), oddOf(middleIm, middleHz), oddOf(im[i + 1], highHz));
  const isSquare = form === 'square';
  const none = new Float64Array(isSquare ? 0 : 3);
  const fit: RationalFit = {
    form,
    degree: isSquare ? 2 : 5,
    scale,
    numerator: { even, odd: isSquare ? none : odd },
    denominator: { even: Float64Array.of(1, 0, 0), odd: none },
    still: 0,
    triangle: null,
    squares: 0,
  };
  return { lowHz, highHz, members: [{ fit, weight: 1 }], noise: null, factor95: Number.NaN };
}

/** Chebyshev coefficients of the parabola with these values at -1, 0 and 1. */
function parabola(low: number, middle: number, high: number): Float64Array {
  const mean = (low + high) / 2;
  return Float64Array.of((mean + middle) / 2, (high - low) / 2, (mean - middle) / 2);
}

/** The piece that stands for a frequency; beyond the ends the outermost. */
export function pieceAt({ pieces }: PiecewiseModel, frequencyHz: number): ModelPiece {
  let low = 0;
  let high = pieces.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (pieces[middle].highHz < frequencyHz) low = middle + 1;
    else high = middle;
  }
  return pieces[low];
}

/** The model's value and derivatives at a frequency. */
export function valueAt(model: PiecewiseModel, frequencyHz: number): RationalValue {
  return pieceValueAt(pieceAt(model, frequencyHz), frequencyHz);
}

function pieceValueAt({ members }: ModelPiece, frequencyHz: number): RationalValue {
  if (members.length === 1) return fitValueAt(members[0].fit, frequencyHz);
  let [re, im, slopeRe, slopeIm, curvatureRe, curvatureIm] = [0, 0, 0, 0, 0, 0];
  for (const { fit, weight } of members) {
    const value = fitValueAt(fit, frequencyHz);
    re += weight * value.re;
    im += weight * value.im;
    slopeRe += weight * value.slopeRe;
    slopeIm += weight * value.slopeIm;
    curvatureRe += weight * value.curvatureRe;
    curvatureIm += weight * value.curvatureIm;
  }
  return { re, im, slopeRe, slopeIm, curvatureRe, curvatureIm };
}

/**
 * 95 % half-width of a functional of the model at a frequency: from the noise, and from what the
 * weighted fits differ by. Null where the noise can't be told.
 */
export function noiseHalfWidthAt(
  model: PiecewiseModel,
  frequencyHz: number,
  functional: Functional,
): number | null {
  const piece = pieceAt(model, frequencyHz);
  const { members, noise, factor95 } = piece;
  if (noise === null) return null;
  const mean = functionalOf(pieceValueAt(piece, frequencyHz), functional);
  let variance = 0;
  for (const { fit, weight } of members) {
    const value = fitValueAt(fit, frequencyHz);
    const spread = noise * spreadAt(fit, frequencyHz, value, functional);
    variance += weight * (spread ** 2 + (functionalOf(value, functional) - mean) ** 2);
  }
  return Number.isFinite(variance) ? factor95 * Math.sqrt(variance) : null;
}

/**
 * The same with what the analyzer may be off by: an error of the reflection of whatever phase, but
 * slow in frequency, so that only the functional's part on the value feels it.
 */
export function halfWidthAt(
  model: PiecewiseModel,
  frequencyHz: number,
  functional: Functional,
): number | null {
  const ofNoise = noiseHalfWidthAt(model, frequencyHz, functional);
  const { instrument, form } = model;
  if (ofNoise === null || instrument === null) return ofNoise;
  const { re, im } = valueAt(model, frequencyHz);
  const magnitude = form === 'square' ? Math.sqrt(Math.max(0, re)) : Math.hypot(re, im);
  const bound = reflectionErrorBound(instrument, magnitude);
  const ofValue = form === 'square' ? (2 * magnitude + bound) * bound : bound;
  return Math.hypot(ofNoise, Math.hypot(functional.valueRe, functional.valueIm) * ofValue);
}

/** The model's value at many ascending frequencies. */
export function valuesAt(
  model: PiecewiseModel,
  frequencyHz: Float64Array,
): { readonly re: Float64Array; readonly im: Float64Array } {
  const re = new Float64Array(frequencyHz.length);
  const im = new Float64Array(frequencyHz.length);
  let from = 0;
  model.pieces.forEach((piece, k) => {
    let to = from;
    const isLast = k === model.pieces.length - 1;
    while (to < frequencyHz.length && (isLast || frequencyHz[to] <= piece.highHz)) to += 1;
    for (const { fit, weight } of piece.members) {
      addFitValues(fit, weight, frequencyHz, re, im, from, to);
    }
    from = to;
  });
  return { re, im };
}

import { type ChosenFit, chooseFit } from './model-choice.ts';
import type { RationalFit, Samples } from './rational-fit.ts';

/** A stretch of the sweep, from sample to sample, with the function that stands for it. */
export interface ModelPiece extends Omit<ChosenFit, 'isWhite'> {
  readonly lowHz: number;
  readonly highHz: number;
}

/** The sweep as functions of frequency, piece after piece without gaps. */
export interface PiecewiseModel {
  readonly pieces: readonly ModelPiece[];
}

/** A stretch is not halved below this many samples. */
const fewestToHalve = 32;
/** Samples beyond its own stretch that a piece is fitted to, as a part of the stretch. */
const overlap = 0.35;

/**
 * Stands rational functions for a sweep: one for all of it where one explains all but noise, else
 * halves of it, and so on. Each piece is fitted beyond its ends, where fits are weakest. Below five
 * samples the pieces are straight lines and know no noise. Needs two samples.
 */
export function piecewiseModel(samples: Samples, isReal: boolean): PiecewiseModel {
  const count = samples.frequencyHz.length;
  const pieces: ModelPiece[] = [];
  cover(samples, isReal, 0, count - 1, pieces);
  return { pieces };
}

function cover(
  samples: Samples,
  isReal: boolean,
  first: number,
  last: number,
  pieces: ModelPiece[],
): void {
  const { frequencyHz } = samples;
  const reach = Math.ceil((last - first) * overlap);
  const from = Math.max(0, first - reach);
  const to = Math.min(frequencyHz.length - 1, last + reach);
  const chosen = chooseFit(slice(samples, from, to + 1), isReal);
  if (chosen === null) {
    for (let i = first; i < last; i++) pieces.push(straightLine(samples, i));
    return;
  }
  if (chosen.isWhite || last - first < fewestToHalve) {
    const { fit, noise, factor95 } = chosen;
    pieces.push({ lowHz: frequencyHz[first], highHz: frequencyHz[last], fit, noise, factor95 });
    return;
  }
  const middle = (first + last) >> 1;
  cover(samples, isReal, first, middle, pieces);
  cover(samples, isReal, middle, last, pieces);
}

function slice({ frequencyHz, re, im }: Samples, from: number, to: number): Samples {
  return {
    frequencyHz: frequencyHz.subarray(from, to),
    re: re.subarray(from, to),
    im: im.subarray(from, to),
  };
}

function straightLine({ frequencyHz, re, im }: Samples, i: number): ModelPiece {
  const lowHz = frequencyHz[i];
  const highHz = frequencyHz[i + 1];
  const fit: RationalFit = {
    order: 1,
    centreHz: (lowHz + highHz) / 2,
    halfHz: (highHz - lowHz) / 2,
    numeratorRe: Float64Array.of((re[i] + re[i + 1]) / 2, (re[i + 1] - re[i]) / 2),
    numeratorIm: Float64Array.of((im[i] + im[i + 1]) / 2, (im[i + 1] - im[i]) / 2),
    denominatorRe: Float64Array.of(1, 0),
    denominatorIm: Float64Array.of(0, 0),
    factor: null,
    squares: 0,
    residualRe: new Float64Array(2),
    residualIm: new Float64Array(2),
  };
  return { lowHz, highHz, fit, noise: null, factor95: Number.NaN };
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

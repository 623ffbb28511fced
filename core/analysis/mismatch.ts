import type { ScalarSweep, Sweep } from '../sweep.ts';
import {
  halfWidthAt,
  type PiecewiseModel,
  pieceAt,
  piecewiseModel,
  valueAt,
} from './piecewise-model.ts';

/** The squared magnitude of the reflection at a frequency, with slopes per hertz. */
export interface MismatchValue {
  readonly square: number;
  readonly slope: number;
  readonly curvature: number;
}

/** The squared magnitude of the reflection as a smooth function of frequency. */
export interface Mismatch {
  at(frequencyHz: number): MismatchValue;
  /** 95 % half-width of the magnitude itself; null if the noise can't be told. */
  magnitudeU95(frequencyHz: number): number | null;
  /** 95 % half-width of the slope of the squared magnitude; null if the noise can't be told. */
  slopeU95(frequencyHz: number): number | null;
}

/** The mismatch of a sweep whose complex reflection was modelled. */
export function complexMismatch(model: PiecewiseModel): Mismatch {
  return {
    at(frequencyHz) {
      const v = valueAt(pieceAt(model, frequencyHz), frequencyHz);
      return {
        square: v.re * v.re + v.im * v.im,
        slope: 2 * (v.re * v.slopeRe + v.im * v.slopeIm),
        curvature:
          2 *
          (v.slopeRe * v.slopeRe +
            v.slopeIm * v.slopeIm +
            v.re * v.curvatureRe +
            v.im * v.curvatureIm),
      };
    },
    magnitudeU95(frequencyHz) {
      const piece = pieceAt(model, frequencyHz);
      const value = valueAt(piece, frequencyHz);
      const magnitude = Math.hypot(value.re, value.im);
      const [re, im] = magnitude > 0 ? [value.re / magnitude, value.im / magnitude] : [1, 0];
      const functional = { valueRe: re, valueIm: -im, slopeRe: 0, slopeIm: 0 };
      return halfWidthAt(piece, frequencyHz, functional);
    },
    slopeU95(frequencyHz) {
      const piece = pieceAt(model, frequencyHz);
      const value = valueAt(piece, frequencyHz);
      const functional = {
        valueRe: 2 * value.slopeRe,
        valueIm: -2 * value.slopeIm,
        slopeRe: 2 * value.re,
        slopeIm: -2 * value.im,
      };
      return halfWidthAt(piece, frequencyHz, functional);
    },
  };
}

/** The mismatch of a sweep of which the squared magnitude itself was modelled. */
export function scalarMismatch(model: PiecewiseModel): Mismatch {
  return {
    at(frequencyHz) {
      const v = valueAt(pieceAt(model, frequencyHz), frequencyHz);
      return { square: Math.max(0, v.re), slope: v.slopeRe, curvature: v.curvatureRe };
    },
    magnitudeU95(frequencyHz) {
      const piece = pieceAt(model, frequencyHz);
      const value = valueAt(piece, frequencyHz);
      const functional = { valueRe: 1, valueIm: 0, slopeRe: 0, slopeIm: 0 };
      const squareU95 = halfWidthAt(piece, frequencyHz, functional);
      if (squareU95 === null) return null;
      const square = Math.max(0, value.re);
      return Math.sqrt(square + squareU95) - Math.sqrt(square);
    },
    slopeU95(frequencyHz) {
      const piece = pieceAt(model, frequencyHz);
      const functional = { valueRe: 0, valueIm: 0, slopeRe: 1, slopeIm: 0 };
      return halfWidthAt(piece, frequencyHz, functional);
    },
  };
}

/** Models the squared magnitude of a sweep without usable phase. Needs two points. */
export function squaredMagnitudeModel(sweep: Sweep): PiecewiseModel {
  const square = squaredMagnitude(sweep);
  const samples = {
    frequencyHz: sweep.frequencyHz,
    re: square,
    im: new Float64Array(square.length),
  };
  return piecewiseModel(samples, 'square');
}

function squaredMagnitude(sweep: Sweep): Float64Array {
  if (sweep.phase === 'none') return squareOf(sweep);
  const { reflectionRe: re, reflectionIm: im } = sweep;
  return re.map((value, i) => value * value + im[i] * im[i]);
}

function squareOf({ reflectionMagnitude }: ScalarSweep): Float64Array {
  return reflectionMagnitude.map((value) => value * value);
}

import { halfWidthAt, noiseHalfWidthAt, type PiecewiseModel, valueAt } from './piecewise-model.ts';
import type { Functional } from './rational-value.ts';

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
  /** The same from noise alone: what tells a feature from chance. */
  magnitudeNoiseU95(frequencyHz: number): number | null;
  /** 95 % half-width of the slope of the squared magnitude; null if the noise can't be told. */
  slopeU95(frequencyHz: number): number | null;
}

/** The mismatch of a sweep whose complex reflection was modelled. */
export function complexMismatch(model: PiecewiseModel): Mismatch {
  const ofMagnitude = (frequencyHz: number): Functional => {
    const { re, im } = valueAt(model, frequencyHz);
    const magnitude = Math.hypot(re, im);
    const [along, across] = magnitude > 0 ? [re / magnitude, im / magnitude] : [1, 0];
    return { valueRe: along, valueIm: -across, slopeRe: 0, slopeIm: 0 };
  };
  return {
    at(frequencyHz) {
      const v = valueAt(model, frequencyHz);
      const steepness = v.slopeRe * v.slopeRe + v.slopeIm * v.slopeIm;
      return {
        square: v.re * v.re + v.im * v.im,
        slope: 2 * (v.re * v.slopeRe + v.im * v.slopeIm),
        curvature: 2 * (steepness + v.re * v.curvatureRe + v.im * v.curvatureIm),
      };
    },
    magnitudeU95: (frequencyHz) => halfWidthAt(model, frequencyHz, ofMagnitude(frequencyHz)),
    magnitudeNoiseU95: (frequencyHz) =>
      noiseHalfWidthAt(model, frequencyHz, ofMagnitude(frequencyHz)),
    slopeU95(frequencyHz) {
      const { re, im, slopeRe, slopeIm } = valueAt(model, frequencyHz);
      return halfWidthAt(model, frequencyHz, {
        valueRe: 2 * slopeRe,
        valueIm: -2 * slopeIm,
        slopeRe: 2 * re,
        slopeIm: -2 * im,
      });
    },
  };
}

const theValue: Functional = { valueRe: 1, valueIm: 0, slopeRe: 0, slopeIm: 0 };
const theSlope: Functional = { valueRe: 0, valueIm: 0, slopeRe: 1, slopeIm: 0 };

/** The mismatch of a sweep of which the squared magnitude itself was modelled. */
export function scalarMismatch(model: PiecewiseModel): Mismatch {
  const ofMagnitude = (frequencyHz: number, squareU95: number | null) => {
    if (squareU95 === null) return null;
    const square = Math.max(0, valueAt(model, frequencyHz).re);
    return Math.sqrt(square + squareU95) - Math.sqrt(square);
  };
  return {
    at(frequencyHz) {
      const v = valueAt(model, frequencyHz);
      return { square: Math.max(0, v.re), slope: v.slopeRe, curvature: v.curvatureRe };
    },
    magnitudeU95: (frequencyHz) =>
      ofMagnitude(frequencyHz, halfWidthAt(model, frequencyHz, theValue)),
    magnitudeNoiseU95: (frequencyHz) =>
      ofMagnitude(frequencyHz, noiseHalfWidthAt(model, frequencyHz, theValue)),
    slopeU95: (frequencyHz) => halfWidthAt(model, frequencyHz, theSlope),
  };
}

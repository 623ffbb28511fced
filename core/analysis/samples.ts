import { type FrequencyScale, frequencyScale, scaledSquare } from './rational-basis.ts';

/** Samples of a function of frequency; `im` is all zero for a real one. */
export interface Samples {
  readonly frequencyHz: Float64Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Samples made ready for fits: each with its weight, and its place on the scale of the basis. */
export interface WeightedSamples extends Samples {
  readonly weight: Float64Array;
  readonly scale: FrequencyScale;
  readonly w: Float64Array;
  readonly y: Float64Array;
}

/** Puts samples on the scale between two frequencies. */
export function weighSamples(
  samples: Samples,
  weight: Float64Array,
  lowHz: number,
  highHz: number,
): WeightedSamples {
  const scale = frequencyScale(lowHz, highHz);
  const { frequencyHz, re, im } = samples;
  return {
    frequencyHz,
    re,
    im,
    weight,
    scale,
    w: frequencyHz.map((f) => f / scale.centreHz),
    y: frequencyHz.map((f) => scaledSquare(scale, f)),
  };
}

import { type FrequencyScale, frequencyScale, scaledSquare } from './rational-basis.ts';

/** Samples of a function of frequency; `im` is all zero for a real one. */
export interface Samples {
  readonly frequencyHz: Float64Array;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Samples with weights, and what many fits to them share. */
export interface WeightedSamples extends Samples {
  readonly weight: Float64Array;
  readonly scale: FrequencyScale;
  /** Frequency over the scale's centre. */
  readonly w: Float64Array;
  /** T_m(y) of every sample, m after m. */
  readonly chebyshev: Float64Array;
  /** Room for eleven numbers a sample, used anew by each pass. */
  readonly scratch: Float64Array;
}

/** Puts samples on the scale between two frequencies, with so many Chebyshev polynomials. */
export function weighSamples(
  samples: Samples,
  weight: Float64Array,
  lowHz: number,
  highHz: number,
  polynomials: number,
): WeightedSamples {
  const scale = frequencyScale(lowHz, highHz);
  const { frequencyHz, re, im } = samples;
  const count = frequencyHz.length;
  return {
    frequencyHz,
    re,
    im,
    weight,
    scale,
    w: frequencyHz.map((f) => f / scale.centreHz),
    chebyshev: chebyshevColumns(frequencyHz, scale, polynomials),
    scratch: new Float64Array(11 * count),
  };
}

function chebyshevColumns(
  frequencyHz: Float64Array,
  scale: FrequencyScale,
  polynomials: number,
): Float64Array {
  const count = frequencyHz.length;
  const columns = new Float64Array(count * polynomials);
  for (let i = 0; i < count; i++) {
    const y = scaledSquare(scale, frequencyHz[i]);
    columns[i] = 1;
    if (polynomials > 1) columns[count + i] = y;
    for (let m = 2; m < polynomials; m++) {
      const at = m * count + i;
      columns[at] = 2 * y * columns[at - count] - columns[at - 2 * count];
    }
  }
  return columns;
}

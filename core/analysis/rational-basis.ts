/**
 * `reflection`: what a network of real elements has, N(jω)/D(jω) with real coefficients: each series
 * is E(y) + jw O(y), E and O real. `square`: a real function of ω², so that there is no O.
 */
export type RationalForm = 'reflection' | 'square';

/** Frequencies scaled for a basis: w = f/centre, y = w² moved and scaled to [-1, 1]. */
export interface FrequencyScale {
  readonly centreHz: number;
  /** Of 2u + u², u = f/centre - 1, which is w² - 1 without its loss of digits. */
  readonly middle: number;
  readonly half: number;
}

/** A series of Chebyshev polynomials in y: E(y) + jw O(y). */
export interface Series {
  readonly even: Float64Array;
  readonly odd: Float64Array;
}

/** The scale for a sweep between two frequencies. */
export function frequencyScale(lowHz: number, highHz: number): FrequencyScale {
  const centreHz = (lowHz + highHz) / 2 || 1;
  const low = squareLessOne(lowHz, centreHz);
  const high = squareLessOne(highHz, centreHz);
  return { centreHz, middle: (low + high) / 2, half: (high - low) / 2 || 1 };
}

function squareLessOne(frequencyHz: number, centreHz: number): number {
  const u = (frequencyHz - centreHz) / centreHz;
  return u * (2 + u);
}

/** The variable of the Chebyshev polynomials at a frequency. */
export function scaledSquare(scale: FrequencyScale, frequencyHz: number): number {
  return (squareLessOne(frequencyHz, scale.centreHz) - scale.middle) / scale.half;
}

/** Number of even terms of a series of some degree. */
export function evenTerms(form: RationalForm, degree: number): number {
  return form === 'square' ? degree + 1 : (degree >> 1) + 1;
}

/** Number of odd terms of a series of some degree. */
export function oddTerms(form: RationalForm, degree: number): number {
  return form === 'square' ? 0 : (degree + 1) >> 1;
}

/** Number of real unknowns of a quotient of two series. */
export function unknownsOf(degree: number): number {
  return 2 * degree + 1;
}

/** Number of real measured numbers in so many samples. */
export function numbersIn(form: RationalForm, samples: number): number {
  return form === 'square' ? samples : 2 * samples;
}

/**
 * `reflection`: what a network of real elements has, N(jω)/D(jω) with real coefficients, so that the
 * terms are turn by turn T_k(y) and jw T_k(y). `square`: a real function of ω², with terms T_k(y).
 */
export type RationalForm = 'reflection' | 'square';

/** Frequencies scaled for a basis: w = f/centre, y = w² moved and scaled to [-1, 1]. */
export interface FrequencyScale {
  readonly centreHz: number;
  /** Of 2u + u², u = f/centre - 1, which is w² - 1 without its loss of digits. */
  readonly middle: number;
  readonly half: number;
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

/** Number of Chebyshev polynomials in the terms up to a degree. */
export function polynomialsOf(form: RationalForm, degree: number): number {
  return form === 'square' ? degree + 1 : (degree >> 1) + 1;
}

/** T_k(y) of every frequency, k after k. */
export function chebyshevColumns(
  frequencyHz: Float64Array,
  scale: FrequencyScale,
  polynomials: number,
): Float64Array {
  const rows = frequencyHz.length;
  const columns = new Float64Array(rows * polynomials);
  for (let i = 0; i < rows; i++) {
    const y = scaledSquare(scale, frequencyHz[i]);
    columns[i] = 1;
    if (polynomials > 1) columns[rows + i] = y;
    for (let k = 2; k < polynomials; k++) {
      columns[k * rows + i] = 2 * y * columns[(k - 1) * rows + i] - columns[(k - 2) * rows + i];
    }
  }
  return columns;
}

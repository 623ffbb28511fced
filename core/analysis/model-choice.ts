import { studentQuantile } from '../record/statistics/distributions.ts';
import { fitRational, type RationalFit, type Samples, unknownsOf } from './rational-fit.ts';

/** A fit with what is known of the noise around it. */
export interface ChosenFit {
  readonly fit: RationalFit;
  /** Standard deviation of one component of the samples about the fit; null if it can't be told. */
  readonly noise: number | null;
  /** Student's factor for a 95 % interval. */
  readonly factor95: number;
  /** Neighbouring residuals do not hang together: the fit explains all but noise. */
  readonly isWhite: boolean;
}

const highestOrder = 10;
const fewestSamples = 5;
/** Residuals below this are rounding of the arithmetic, whatever their pattern. */
const arithmeticFloor = 1e-11;
/** Orders that may fail to help before the search ends. */
const patience = 2;

/**
 * Chooses the order of a rational fit by Akaike's criterion with the small-sample correction
 * (C. M. Hurvich, C.-L. Tsai, Biometrika 76(2), 1989). `isReal`: the samples have no imaginary
 * part, so each carries one number and not two. Null for fewer than five samples.
 */
export function chooseFit(samples: Samples, isReal: boolean): ChosenFit | null {
  const count = samples.re.length;
  if (count < fewestSamples) return null;
  const numbersEach = isReal ? 1 : 2;
  const numbers = numbersEach * count;
  let best: RationalFit | null = null;
  let bestScore = Number.POSITIVE_INFINITY;
  let failures = 0;
  for (let order = 1; order <= highestOrder && failures < patience; order++) {
    const unknowns = numbersEach * unknownsOf(order);
    if (unknowns + 2 * numbersEach > numbers) break;
    const fit = fitRational(samples, order);
    if (fit === null) break;
    const squares = Math.max(fit.squares, numbers * arithmeticFloor ** 2);
    const score =
      numbers * Math.log(squares / numbers) +
      2 * unknowns +
      (2 * unknowns * (unknowns + 1)) / Math.max(1, numbers - unknowns - 1);
    if (score < bestScore && fit.factor !== null) {
      best = fit;
      bestScore = score;
      failures = 0;
    } else failures += 1;
    if (fit.squares < numbers * arithmeticFloor ** 2) break;
  }
  return best === null ? null : judged(best, numbersEach, count);
}

function judged(fit: RationalFit, numbersEach: number, count: number): ChosenFit {
  const freedom = numbersEach * (count - unknownsOf(fit.order));
  const noise = freedom > 0 ? Math.sqrt(fit.squares / freedom) : null;
  const factor95 = freedom > 0 ? studentQuantile(0.975, freedom) : Number.NaN;
  const correlation = neighbourCorrelation(fit);
  const scatter = 3 / Math.sqrt(numbersEach * count);
  const isTiny = fit.squares < numbersEach * count * arithmeticFloor ** 2;
  return { fit, noise, factor95, isWhite: isTiny || correlation < scatter };
}

/** Correlation of each residual with the next. */
function neighbourCorrelation({ residualRe, residualIm, squares }: RationalFit): number {
  let sum = 0;
  for (let i = 1; i < residualRe.length; i++) {
    sum += residualRe[i - 1] * residualRe[i] + residualIm[i - 1] * residualIm[i];
  }
  return squares > 0 ? sum / squares : 0;
}

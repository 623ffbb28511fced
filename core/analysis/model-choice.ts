import { studentQuantile } from '../record/statistics/distributions.ts';
import type { RationalForm } from './rational-basis.ts';
import {
  fitRational,
  numbersIn,
  type RationalFit,
  type Samples,
  unknownsOf,
} from './rational-fit.ts';
import { sharpestPole } from './rational-value.ts';

/** One of the fits that stand for the samples, with its share; the shares add up to 1. */
export interface WeightedFit {
  readonly fit: RationalFit;
  readonly weight: number;
}

/** The fits that stand for some samples, with what is known of the noise around them. */
export interface ChosenFits {
  readonly members: readonly WeightedFit[];
  /** Standard deviation of one number about the best fit; null if it can't be told. */
  readonly noise: number | null;
  /** Student's factor for a 95 % interval. */
  readonly factor95: number;
  /** Neighbouring residuals do not hang together: the fit explains all but noise. */
  readonly isWhite: boolean;
}

const highestDegree = 16;
const fewestSamples = 5;
/** Residuals below this are rounding of the arithmetic, whatever their pattern. */
const arithmeticFloor = 1e-12;
/** Degrees that may fail to help before the search ends. */
const patience = 3;
/** Fits whose weight beside the best one's is less than this are left out. */
const leastWeight = 0.02;
const sharpPolePenalty = 40;

interface Scored {
  readonly fit: RationalFit;
  readonly score: number;
}

/**
 * Fits of rising degree, weighted by the Bayesian information criterion (G. Schwarz, Annals of
 * Statistics 6(2), 1978; averaging as in S. T. Buckland et al., Biometrics 53(2), 1997). Null for
 * fewer than five samples.
 */
export function chooseFits(samples: Samples, form: RationalForm): ChosenFits | null {
  const count = samples.re.length;
  if (count < fewestSamples) return null;
  const numbers = numbersIn(form, count);
  const scored: Scored[] = [];
  let best = Number.POSITIVE_INFINITY;
  let failures = 0;
  for (let degree = 0; degree <= highestDegree && failures < patience; degree++) {
    if (unknownsOf(degree) + 2 > numbers) break;
    const fit = fitRational(samples, form, degree);
    if (fit === null || fit.triangle === null) {
      failures += 1;
      continue;
    }
    const score = scoreOf(fit, numbers) + pairPenalty(fit, samples);
    scored.push({ fit, score });
    failures = score < best ? 0 : failures + 1;
    best = Math.min(best, score);
    if (fit.squares < numbers * arithmeticFloor ** 2) break;
  }
  return scored.length === 0 ? null : judged(scored, best, numbers);
}

function scoreOf(fit: RationalFit, numbers: number): number {
  const squares = Math.max(fit.squares, numbers * arithmeticFloor ** 2);
  return numbers * Math.log(squares / numbers) + unknownsOf(fit.degree) * Math.log(numbers);
}

/** A pole nearer than a step may stand for one noisy point: it must explain far more than noise. */
function pairPenalty(fit: RationalFit, { frequencyHz }: Samples): number {
  return sharpestPole(fit, frequencyHz) > 1 ? sharpPolePenalty : 0;
}

function judged(scored: readonly Scored[], best: number, numbers: number): ChosenFits {
  const shares = scored
    .map(({ fit, score }) => ({ fit, weight: Math.exp((best - score) / 2) }))
    .filter(({ weight }) => weight > leastWeight);
  const total = shares.reduce((sum, { weight }) => sum + weight, 0);
  const members = shares.map(({ fit, weight }) => ({ fit, weight: weight / total }));
  const { fit } = members.reduce((a, b) => (b.weight > a.weight ? b : a));
  const freedom = numbers - unknownsOf(fit.degree);
  const correlation = neighbourCorrelation(fit);
  const isTiny = fit.squares < numbers * (10 * arithmeticFloor) ** 2;
  return {
    members,
    noise: Math.sqrt(fit.squares / freedom),
    factor95: studentQuantile(0.975, freedom),
    isWhite: isTiny || correlation < 3 / Math.sqrt(numbers),
  };
}

/** Correlation of each residual with the next. */
function neighbourCorrelation({ residualRe, residualIm, squares }: RationalFit): number {
  let sum = 0;
  for (let i = 1; i < residualRe.length; i++) {
    sum += residualRe[i - 1] * residualRe[i] + residualIm[i - 1] * residualIm[i];
  }
  return squares > 0 ? sum / squares : 0;
}

import { studentQuantile } from '../record/statistics/distributions.ts';
import { compress, leastNoise, long } from './compress.ts';
import { differenceNoise } from './difference-noise.ts';
import { momentsFor } from './normal-equations.ts';
import { numbersIn, type RationalForm, unknownsOf } from './rational-basis.ts';
import { fitRational, type RationalFit } from './rational-fit.ts';
import { fitValueAt, sharpestPole } from './rational-value.ts';
import { type Samples, type WeightedSamples, weighSamples } from './samples.ts';

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
  /**
   * Student's factor for a 95 % interval; larger where neighbouring residuals hang together, as a mean
   * of such numbers scatters more (first-order autoregression).
   */
  readonly factor95: number;
  /** Neighbouring residuals do not hang together: the fit explains all but noise. */
  readonly isWhite: boolean;
  /** The best degree is as high as any that was tried, so that a higher one might do better. */
  readonly isCapped: boolean;
  /** The residuals are not much larger than the noise between neighbouring samples. */
  readonly isExplained: boolean;
}

const highestDegree = 16;
const fewestSamples = 5;
/** Residuals below this are rounding of the arithmetic, whatever their pattern. */
const arithmeticFloor = 1e-12;
/** A fit whose residuals exceed the roughly known noise by this factor leaves something unexplained. */
const explainedWithin = 3;
/** One whose residuals exceed it, or this noise, by this factor is not worth perfecting. */
const hopefulWithin = 30;
const leastHopefulNoise = 1e-6;
/** Below this a fit counts as exact: no file and no instrument knows better. */
const exactBelow = 1e-9;
/** Residuals above this, if they hang together, are no fit, however much neighbouring samples differ. */
export const hopeless = 0.05;
/** Degrees that may fail to help before the search ends. */
const patience = 3;
/**
 * Difference of the criterion over which a weight falls by e. The criterion itself would have 2; degrees
 * next to each other differ so little that 8 was measured to give intervals that hold.
 */
const weightFall = 8;
/** A fit that will not come within so much of the best one's criterion is not worth perfecting. */
const worthPerfecting = 8;
/** Fits whose weight beside the best one's is less than this are left out. */
const leastWeight = 0.02;
/** A pole nearer than a step may stand for one noisy point: it must explain so much more than noise. */
const sharpPolePenalty = 40;

interface Scored {
  readonly fit: RationalFit;
  readonly score: number;
  /** Sum of the squared residuals of all samples. */
  readonly squares: number;
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
  const { frequencyHz } = samples;
  const roughNoise = differenceNoise(samples.re, samples.im);
  const compressed = compress(samples, roughNoise);
  const weighed = weighSamples(
    compressed,
    compressed.weight,
    frequencyHz[0],
    frequencyHz[count - 1],
    momentsFor(form, highestDegree),
  );
  const stepHz = (frequencyHz[count - 1] - frequencyHz[0]) / (count - 1);
  const hopeful = numbers * (hopefulWithin * Math.max(roughNoise, leastHopefulNoise)) ** 2;
  const scored: Scored[] = [];
  let best = Number.POSITIVE_INFINITY;
  let failures = 0;
  let before: RationalFit | null = null;
  for (let degree = 0; degree <= highestDegree && failures < patience; degree++) {
    if (unknownsOf(degree) + 2 > numbers) break;
    const wanted = Number.isFinite(best)
      ? squaresFor(best + worthPerfecting, degree, numbers)
      : Number.POSITIVE_INFINITY;
    const fit = fitRational(
      weighed,
      form,
      degree,
      before?.denominator ?? null,
      Math.min(wanted, hopeful) - compressed.squaresInside,
    );
    if (fit === null) {
      failures += 1;
      continue;
    }
    before = fit;
    const squares = fit.squares + compressed.squaresInside;
    let score = scoreOf(squares, degree, numbers);
    if (
      score < best + weightFall * Math.log(1 / leastWeight) &&
      sharpestPole(fit, weighed.frequencyHz, stepHz) > 1
    )
      score += sharpPolePenalty;
    scored.push({ fit, score, squares });
    const isHopeless = squares > numbers * hopeless ** 2;
    failures = score < best || isHopeless ? 0 : failures + 1;
    best = Math.min(best, score);
    if (squares < numbers * arithmeticFloor ** 2) break;
  }
  return scored.length === 0 ? null : judged(scored, best, numbers, weighed, roughNoise);
}

function scoreOf(squares: number, degree: number, numbers: number): number {
  const floor = numbers * arithmeticFloor ** 2;
  return (
    numbers * Math.log(Math.max(squares, floor) / numbers) + unknownsOf(degree) * Math.log(numbers)
  );
}

/** The squares with which a degree would have a score. */
function squaresFor(score: number, degree: number, numbers: number): number {
  return numbers * Math.exp((score - unknownsOf(degree) * Math.log(numbers)) / numbers);
}

function judged(
  scored: readonly Scored[],
  best: number,
  numbers: number,
  samples: WeightedSamples,
  roughNoise: number,
): ChosenFits {
  const shares = scored
    .map(({ fit, score, squares }) => ({
      fit,
      squares,
      weight: Math.exp((best - score) / weightFall),
    }))
    .filter(({ weight }) => weight > leastWeight);
  const total = shares.reduce((sum, { weight }) => sum + weight, 0);
  const members = shares.map(({ fit, weight }) => ({ fit, weight: weight / total }));
  const { fit, squares } = shares.reduce((a, b) => (b.weight > a.weight ? b : a));
  const freedom = numbers - unknownsOf(fit.degree);
  const isTiny = squares < numbers * exactBelowFor(numbers, fit.form) ** 2;
  const correlation = isTiny ? 0 : neighbourCorrelation(fit, samples);
  const isWhite = correlation < 3 / Math.sqrt(numbersIn(fit.form, samples.re.length));
  const student = studentQuantile(0.975, freedom);
  return {
    members,
    noise: Math.sqrt(squares / freedom),
    factor95: isWhite ? student : student * Math.sqrt((1 + correlation) / (1 - correlation)),
    isWhite,
    isCapped: fit.degree >= highestDegree - 1,
    isExplained: squares < explainedWithin ** 2 * roughNoise ** 2 * numbers,
  };
}

/** The residuals of a long sweep hold what its compression neglected. */
function exactBelowFor(numbers: number, form: RationalForm): number {
  return numbers < numbersIn(form, long) ? exactBelow : 3 * leastNoise;
}

/** Correlation of each residual with the next, at most 0.9. */
function neighbourCorrelation(
  fit: RationalFit,
  { frequencyHz, re, im, weight }: WeightedSamples,
): number {
  let products = 0;
  let squares = 0;
  let [beforeRe, beforeIm] = [0, 0];
  for (let i = 0; i < re.length; i++) {
    const value = fitValueAt(fit, frequencyHz[i]);
    const root = Math.sqrt(weight[i]);
    const errorRe = root * (value.re - re[i]);
    const errorIm = root * (value.im - im[i]);
    products += beforeRe * errorRe + beforeIm * errorIm;
    squares += errorRe ** 2 + errorIm ** 2;
    [beforeRe, beforeIm] = [errorRe, errorIm];
  }
  return squares === 0 ? 0 : Math.min(0.9, products / squares);
}

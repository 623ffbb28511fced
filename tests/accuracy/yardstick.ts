import type { BenchCase } from './cases.ts';
import type { ModelFit } from './model-fit.ts';
import {
  type ImpedanceCurve,
  mismatchAtSwr,
  mismatchOf,
  reactanceOf,
  rootNear,
  slopeOf,
  swrAtMismatch,
} from './true-answers.ts';

/** What the fit of the true form makes of one quantity, and how far off it expects to be. */
export interface Yardstick {
  /** Null where the fitted curve has no such crossing nearby. */
  readonly fitted: number | null;
  readonly deviation: number;
}

const NUDGE = 1e-5;
const REACH_STEPS = 200;

type FrequencyFunction = (curve: ImpedanceCurve) => (frequencyHz: number) => number;

/** Of a zero of the reactance at a frequency. */
export function resonanceYardstick(bench: BenchCase, fit: ModelFit, trueHz: number): Yardstick {
  return rootYardstick(bench, fit, trueHz, reactanceOf);
}

/** Of a passage of the SWR through a limit. */
export function edgeYardstick(
  bench: BenchCase,
  fit: ModelFit,
  trueHz: number,
  maxSwr: number,
): Yardstick {
  const level = mismatchAtSwr(maxSwr);
  return rootYardstick(bench, fit, trueHz, (curve) => {
    const mismatch = mismatchOf(curve, bench.referenceOhm);
    return (frequencyHz) => mismatch(frequencyHz) - level;
  });
}

/** Of the frequency of a local minimum of SWR. */
export function minimumYardstick(bench: BenchCase, fit: ModelFit, trueHz: number): Yardstick {
  const h = differenceStep(bench);
  return rootYardstick(bench, fit, trueHz, (curve) =>
    slopeOf(mismatchOf(curve, bench.referenceOhm), h),
  );
}

/** Of the SWR at a local minimum: to first order it moves as the SWR at the true frequency does. */
export function minimumSwrYardstick(
  bench: BenchCase,
  fit: ModelFit,
  trueHz: number,
  fittedHz: number | null,
): Yardstick {
  const swrAt = (parameters: readonly number[], frequencyHz: number) =>
    swrAtMismatch(mismatchOf(curveWith(bench, parameters), bench.referenceOhm)(frequencyHz));
  const gradient = gradientOf(bench, fit, (parameters) => swrAt(parameters, trueHz));
  return {
    fitted: fittedHz === null ? null : swrAt(fit.parameters, fittedHz),
    deviation: fit.deviation(gradient),
  };
}

/** Spacing of the differences that stand for a slope. */
function differenceStep(bench: BenchCase): number {
  return (bench.stepHz * bench.clean.length) / 4000;
}

function rootYardstick(
  bench: BenchCase,
  fit: ModelFit,
  trueHz: number,
  of: FrequencyFunction,
): Yardstick {
  const truth = bench.antenna.parameters;
  const atTruth = of(curveWith(bench, truth));
  const near = bench.stepHz / 50;
  const slope = (atTruth(trueHz + near) - atTruth(trueHz - near)) / (2 * near);
  const gradient = gradientOf(
    bench,
    fit,
    (parameters) => -of(curveWith(bench, parameters))(trueHz) / slope,
  );
  return {
    fitted: rootNear(
      of(curveWith(bench, fit.parameters)),
      trueHz,
      bench.stepHz / 200,
      Math.min(REACH_STEPS * bench.stepHz, trueHz / 4),
    ),
    deviation: fit.deviation(gradient),
  };
}

function curveWith(bench: BenchCase, parameters: readonly number[]): ImpedanceCurve {
  return (frequencyHz) => bench.antenna.family.impedance(frequencyHz, parameters);
}

/** Gradient of a quantity with respect to the parameters in units of their scales, at the truth. */
function gradientOf(
  bench: BenchCase,
  fit: ModelFit,
  quantity: (parameters: readonly number[]) => number,
): number[] {
  const truth = bench.antenna.parameters;
  return fit.scales.map((scale, j) => {
    const nudged = (by: number) => truth.map((value, k) => (k === j ? value + by * scale : value));
    return (quantity(nudged(NUDGE)) - quantity(nudged(-NUDGE))) / (2 * NUDGE);
  });
}

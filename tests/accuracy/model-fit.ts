import { reflectionOf } from '../../server/demo/models/lumped.ts';
import type { BenchCase } from './cases.ts';

/** A fit of the true model's own form to one case's sweep. */
export interface ModelFit {
  readonly parameters: readonly number[];
  /**
   * Standard deviation that the fit's linear error propagation gives to a quantity whose gradient
   * with respect to the parameters (in units of their scales) is given.
   */
  deviation(gradient: readonly number[]): number;
  readonly scales: readonly number[];
}

const DIFFERENCE = 1e-5;
const RIDGE = 1e-11;
const MOST_STEPS = 25;

/**
 * Least squares by Levenberg (1944) and Marquardt (SIAM J. Appl. Math. 11(2), 1963) from the true
 * parameters: the estimator that knows what nobody at a bench knows, the form of the antenna. Its
 * errors are the yardstick for an estimator that does not.
 */
export function fitModel(bench: BenchCase): ModelFit {
  const truth = bench.antenna.parameters;
  const scales = bench.antenna.family.scales(truth);
  const jacobian = jacobianAt(bench, truth, scales);
  const covariance = factorOf(normalMatrix(jacobian), 0);
  let parameters = truth;
  let residual = residualAt(bench, parameters);
  let cost = sumOfSquares(residual);
  let current = jacobian;
  let damping = 1e-3;
  for (let step = 0; step < MOST_STEPS; step++) {
    const gradient = current.map((column) => dot(column, residual));
    const change = solve(factorOf(normalMatrix(current), damping), gradient);
    const next = parameters.map((value, j) => value - change[j] * scales[j]);
    const nextResidual = residualAt(bench, next);
    const nextCost = sumOfSquares(nextResidual);
    if (!(nextCost <= cost)) {
      damping *= 8;
      if (damping > 1e8) break;
      continue;
    }
    const gain = cost - nextCost;
    parameters = next;
    residual = nextResidual;
    cost = nextCost;
    damping = Math.max(damping / 8, 1e-9);
    if (gain <= (1e-7 * cost) / residual.length) break;
    current = jacobianAt(bench, parameters, scales);
  }
  return {
    parameters,
    scales,
    deviation: (gradient) =>
      bench.sigma * Math.sqrt(Math.max(0, dot(gradient, solve(covariance, gradient)))),
  };
}

function residualAt(bench: BenchCase, parameters: readonly number[]): Float64Array {
  const { frequencyHz, reflectionRe, reflectionIm } = bench.sweep;
  const modelled = reflections(bench, parameters);
  const points = frequencyHz.length;
  for (let i = 0; i < points; i++) {
    modelled[i] -= reflectionRe[i];
    modelled[points + i] -= reflectionIm[i];
  }
  return modelled;
}

/** All real parts, then all imaginary parts. */
function reflections(bench: BenchCase, parameters: readonly number[]): Float64Array {
  const { frequencyHz } = bench.sweep;
  const { family } = bench.antenna;
  const points = frequencyHz.length;
  const values = new Float64Array(2 * points);
  for (let i = 0; i < points; i++) {
    const { re, im } = reflectionOf(
      family.impedance(frequencyHz[i], parameters),
      bench.referenceOhm,
    );
    values[i] = re;
    values[points + i] = im;
  }
  return values;
}

function jacobianAt(
  bench: BenchCase,
  parameters: readonly number[],
  scales: readonly number[],
): Float64Array[] {
  return scales.map((scale, j) => {
    const nudge = (by: number) => parameters.map((value, k) => (k === j ? value + by : value));
    const above = reflections(bench, nudge(DIFFERENCE * scale));
    const below = reflections(bench, nudge(-DIFFERENCE * scale));
    return above.map((value, i) => (value - below[i]) / (2 * DIFFERENCE));
  });
}

function normalMatrix(jacobian: readonly Float64Array[]): number[][] {
  return jacobian.map((row) => jacobian.map((column) => dot(row, column)));
}

interface Factor {
  /** Lower triangle of the Cholesky factor of the matrix scaled to a unit diagonal. */
  readonly lower: number[][];
  readonly diagonal: number[];
}

/** Cholesky factor of the scaled matrix plus damping; a small ridge keeps nearly unseen directions still. */
function factorOf(matrix: readonly (readonly number[])[], damping: number): Factor {
  const diagonal = matrix.map((row, i) => Math.sqrt(row[i]) || 1);
  const lower = matrix.map((row) => row.map(() => 0));
  for (let i = 0; i < matrix.length; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i][j] / (diagonal[i] * diagonal[j]) + (i === j ? damping + RIDGE : 0);
      for (let k = 0; k < j; k++) sum -= lower[i][k] * lower[j][k];
      lower[i][j] = i === j ? Math.sqrt(Math.max(sum, RIDGE)) : sum / lower[j][j];
    }
  }
  return { lower, diagonal };
}

function solve({ lower, diagonal }: Factor, right: readonly number[]): number[] {
  const solution = right.map((value, i) => value / diagonal[i]);
  for (let i = 0; i < solution.length; i++) {
    for (let k = 0; k < i; k++) solution[i] -= lower[i][k] * solution[k];
    solution[i] /= lower[i][i];
  }
  for (let i = solution.length - 1; i >= 0; i--) {
    for (let k = i + 1; k < solution.length; k++) solution[i] -= lower[k][i] * solution[k];
    solution[i] /= lower[i][i];
  }
  return solution.map((value, i) => value / diagonal[i]);
}

function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

function sumOfSquares(values: Float64Array): number {
  return dot(values, values);
}

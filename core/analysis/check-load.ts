import { renormaliseSweep } from '../network/renormalise.ts';
import { fail, ok, type Result } from '../result.ts';
import type { Sweep } from '../sweep.ts';
import type { InstrumentError } from './instrument-error.ts';

/** A sweep of a load whose resistance is known: 0 for a short, Infinity for an open. */
export interface LoadCheck {
  readonly nominalOhm: number;
  readonly sweep: Sweep;
}

export interface LoadCheckError {
  readonly code: 'no_check' | 'check_without_phase' | 'checks_on_different_frequencies';
  readonly detail: string;
}

/** The part of the frequencies at which an error may be larger than what is answered. */
const partAbove = 0.05;

/**
 * The residual error of an analyzer from sweeps of known loads. At each frequency the errors of the
 * reflection are solved for D + T Γ + M Γ² (one-port error model, EURAMET cg-12) by least squares, with
 * as many of the three, in this order, as there are different loads; each magnitude answered is
 * exceeded at one frequency in twenty. What so few loads cannot tell is null: one load alone tells
 * the directivity if it is near the reference, and else its whole error is taken for directivity.
 * The loads count as exact; all sweeps must have the same frequencies.
 */
export function residualError(
  checks: readonly LoadCheck[],
): Result<InstrumentError, LoadCheckError> {
  if (checks.length === 0) {
    return fail({ code: 'no_check', detail: 'There is no sweep of a known load to judge by.' });
  }
  const [{ sweep: first }] = checks;
  const { frequencyHz, referenceOhm } = first;
  const errors: {
    readonly nominal: number;
    readonly re: Float64Array;
    readonly im: Float64Array;
  }[] = [];
  for (const { nominalOhm, sweep } of checks) {
    const moved = renormaliseSweep(sweep, referenceOhm);
    if (moved.phase !== 'signed') {
      const detail = 'A check needs sweeps with the sign of the reactance; one has it not.';
      return fail({ code: 'check_without_phase', detail });
    }
    if (!sameFrequencies(frequencyHz, moved.frequencyHz)) {
      const detail = 'The sweeps of the known loads must all have the same frequencies.';
      return fail({ code: 'checks_on_different_frequencies', detail });
    }
    const nominal =
      nominalOhm === Number.POSITIVE_INFINITY
        ? 1
        : (nominalOhm - referenceOhm) / (nominalOhm + referenceOhm);
    const re = moved.reflectionRe.map((value) => value - nominal);
    errors.push({ nominal, re, im: moved.reflectionIm });
  }
  const powers = Math.min(3, new Set(errors.map(({ nominal }) => nominal)).size);
  const solver = polynomialSolver(
    errors.map(({ nominal }) => nominal),
    powers,
  );
  const parts = solver.map((weights) => {
    const sizes = frequencyHz.map((_, i) => {
      const sum = (part: 're' | 'im') =>
        errors.reduce((total, error, k) => total + weights[k] * error[part][i], 0);
      return Math.hypot(sum('re'), sum('im'));
    });
    return upperPart(sizes);
  });
  const [directivity = null, tracking = null, sourceMatch = null] = parts;
  return ok({ directivity, tracking, sourceMatch });
}

function sameFrequencies(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((f, i) => f === b[i]);
}

/** The value that one in twenty exceeds. */
function upperPart(values: Float64Array): number {
  const sorted = values.slice().sort();
  return sorted[Math.min(sorted.length - 1, Math.ceil((1 - partAbove) * sorted.length) - 1)];
}

/** For each coefficient of a least-squares polynomial in x, its weights on the values at the x. */
function polynomialSolver(x: readonly number[], powers: number): number[][] {
  // Orthogonal polynomials on the points, each kept by its coefficients.
  const basis: { readonly coefficients: number[]; readonly values: number[] }[] = [];
  for (let p = 0; p < powers; p++) {
    let coefficients: number[] = Array.from({ length: powers }, (_, k) => Number(k === p));
    let values = x.map((at) => at ** p);
    for (const earlier of basis) {
      const share = dot(values, earlier.values);
      values = values.map((value, i) => value - share * earlier.values[i]);
      coefficients = coefficients.map((c, k) => c - share * earlier.coefficients[k]);
    }
    const length = Math.sqrt(dot(values, values));
    basis.push({
      coefficients: coefficients.map((c) => c / length),
      values: values.map((value) => value / length),
    });
  }
  return Array.from({ length: powers }, (_, k) =>
    x.map((_at, i) => basis.reduce((sum, b) => sum + b.coefficients[k] * b.values[i], 0)),
  );
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, value, i) => sum + value * b[i], 0);
}

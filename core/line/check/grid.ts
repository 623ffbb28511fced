import { fail, ok, type Result } from '../../result.ts';
import type { ComplexSweep, Sweep } from '../../sweep.ts';
import { LIGHT_M_PER_S } from '../propagation.ts';

export type LineCheckErrorCode =
  | 'phase_needed'
  | 'sweep_too_few_points'
  | 'sweep_steps_uneven'
  | 'sweep_too_narrow'
  | 'sweep_too_coarse'
  | 'velocity_factor_out_of_range'
  | 'line_length_invalid'
  | 'no_end_found';

export interface LineCheckError {
  readonly code: LineCheckErrorCode;
  readonly detail: string;
}

/** What an evenly stepped sweep can see. Distances are in metres along the line. */
export interface ReflectometryGrid {
  readonly sweep: ComplexSweep;
  readonly stepHz: number;
  readonly spanHz: number;
  /** c VF/(2 step): what lies further folds back into the trace. */
  readonly aliasFreeM: number;
  /** c VF/(2 span): the Rayleigh resolution, before the window widens it. */
  readonly resolutionM: number;
}

const FEWEST_POINTS = 16;
/** A point may lie this fraction of a step off the even grid (rounding in files). */
const STEP_TOLERANCE = 0.02;
/** A line must be this many resolutions long to stand apart from its near end. */
export const FEWEST_RESOLUTIONS = 2;

/**
 * Checks that a sweep can serve for reflectometry on a line of `lengthM` (null: not known), and
 * says what it can see. Refuses without phase, below 16 points, with uneven steps, and where the
 * length asked is too short for the span or too long for the step.
 */
export function reflectometryGrid(
  sweep: Sweep,
  velocityFactor: number,
  lengthM: number | null,
): Result<ReflectometryGrid, LineCheckError> {
  if (sweep.phase !== 'signed') {
    return fail({
      code: 'phase_needed',
      detail: 'A line check needs the full complex reflection, with the sign of the reactance.',
    });
  }
  if (!(velocityFactor > 0 && velocityFactor <= 1)) {
    return fail({
      code: 'velocity_factor_out_of_range',
      detail: `A velocity factor lies above 0 and up to 1; ${velocityFactor} does not.`,
    });
  }
  if (lengthM !== null && !(lengthM > 0 && Number.isFinite(lengthM))) {
    return fail({
      code: 'line_length_invalid',
      detail: 'A length is a positive number of metres.',
    });
  }
  const f = sweep.frequencyHz;
  const points = f.length;
  if (points < FEWEST_POINTS) {
    return fail({
      code: 'sweep_too_few_points',
      detail: `A line check needs at least ${FEWEST_POINTS} points; the sweep has ${points}.`,
    });
  }
  const spanHz = f[points - 1] - f[0];
  const stepHz = spanHz / (points - 1);
  const uneven = f.findIndex(
    (each, i) => Math.abs(each - f[0] - i * stepHz) > STEP_TOLERANCE * stepHz,
  );
  if (uneven >= 0) {
    return fail({
      code: 'sweep_steps_uneven',
      detail: `A line check needs even steps; point ${uneven + 1} lies off them. Sweep linearly, in one piece.`,
    });
  }
  const halfSpeed = (LIGHT_M_PER_S * velocityFactor) / 2;
  const grid: ReflectometryGrid = {
    sweep,
    stepHz,
    spanHz,
    aliasFreeM: halfSpeed / stepHz,
    resolutionM: halfSpeed / spanHz,
  };
  const error = lengthM === null ? null : outOfReach(grid, lengthM);
  return error === null ? ok(grid) : fail(error);
}

function outOfReach(grid: ReflectometryGrid, lengthM: number): LineCheckError | null {
  const { aliasFreeM, resolutionM, spanHz, stepHz } = grid;
  if (lengthM < FEWEST_RESOLUTIONS * resolutionM) {
    const needed = (spanHz * FEWEST_RESOLUTIONS * resolutionM) / lengthM;
    return {
      code: 'sweep_too_narrow',
      detail: `The sweep resolves ${metres(resolutionM)}; a line of ${metres(lengthM)} needs ${FEWEST_RESOLUTIONS} such. Sweep at least ${megahertz(needed)} wide.`,
    };
  }
  if (lengthM >= aliasFreeM) {
    const needed = (stepHz * aliasFreeM) / lengthM;
    return {
      code: 'sweep_too_coarse',
      detail: `Beyond ${metres(aliasFreeM)} echoes fold back into the trace; a line of ${metres(lengthM)} needs steps below ${megahertz(needed)}.`,
    };
  }
  return null;
}

function metres(value: number): string {
  return `${value.toPrecision(3)} m`;
}

function megahertz(hz: number): string {
  return `${(hz / 1e6).toPrecision(3)} MHz`;
}

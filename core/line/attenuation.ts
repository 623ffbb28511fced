import { fail, ok, type Result } from '../result.ts';

/** Matched loss of a cable at one frequency. */
export interface AttenuationPoint {
  readonly frequencyHz: number;
  readonly lossDbPer100M: number;
}

/**
 * Matched loss as k1 sqrt(f) + k2 f, the skin effect of the conductors and the loss of the
 * dielectric. Both constants are the part's loss at 1 MHz, dB per 100 m.
 */
export interface Attenuation {
  readonly conductorDbPer100M: number;
  readonly dielectricDbPer100M: number;
  /** Between these the points lie that were fitted; outside them the law is extrapolated. */
  readonly lowHz: number;
  readonly highHz: number;
  /** Root mean square of fitted / given - 1; null where two points leave nothing to judge by. */
  readonly residualRms: number | null;
  /** Largest |fitted / given - 1|; null as `residualRms`. */
  readonly residualLargest: number | null;
}

export type AttenuationErrorCode =
  | 'cable_points_too_few'
  | 'cable_points_too_many'
  | 'cable_point_not_positive'
  | 'cable_loss_not_rising'
  | 'cable_fit_poor';

export interface AttenuationError {
  readonly code: AttenuationErrorCode;
  readonly detail: string;
  /** Zero-based index of the point at fault in the given order, where one point is. */
  readonly index?: number;
}

const MEGAHERTZ = 1e6;
const MOST_POINTS = 1000;
/** Printed tables are rounded: a loss this much below the one at a lower frequency is let pass. */
const FALL_TOLERANCE = 0.03;
const POOR_FIT = 0.15;

/** Loss at a frequency, dB per 100 m. */
export function attenuationDbPer100M(attenuation: Attenuation, frequencyHz: number): number {
  const f = frequencyHz / MEGAHERTZ;
  return attenuation.conductorDbPer100M * Math.sqrt(f) + attenuation.dielectricDbPer100M * f;
}

/**
 * Fits k1 sqrt(f) + k2 f by least squares of the relative misfit (catalogue losses are uncertain in
 * per cent), neither constant below zero.
 * Refuses fewer than two frequencies, values that are not positive and finite, a loss that falls
 * with frequency, and points that the law misses by more than 15 %.
 */
export function fitAttenuation(
  points: readonly AttenuationPoint[],
): Result<Attenuation, AttenuationError> {
  const error = refusal(points);
  if (error !== null) return fail(error);
  const fitted = leastSquares(points);
  if (fitted.residualLargest !== null && fitted.residualLargest > POOR_FIT) {
    return fail({
      code: 'cable_fit_poor',
      detail: `The points lie up to ${percent(fitted.residualLargest)} off the law k1 sqrt(f) + k2 f that cables follow; check their units and that they belong to one cable.`,
    });
  }
  return ok(fitted);
}

/** The fit alone, for data that are kept whatever their misfit. Points must be positive. */
export function leastSquares(points: readonly AttenuationPoint[]): Attenuation {
  let ss = 0;
  let sf = 0;
  let ff = 0;
  let s = 0;
  let g = 0;
  for (const { frequencyHz, lossDbPer100M } of points) {
    const f = frequencyHz / MEGAHERTZ;
    const root = Math.sqrt(f) / lossDbPer100M;
    const linear = f / lossDbPer100M;
    ss += root * root;
    sf += root * linear;
    ff += linear * linear;
    s += root;
    g += linear;
  }
  const determinant = ss * ff - sf * sf;
  let conductor = (s * ff - g * sf) / determinant;
  let dielectric = (g * ss - s * sf) / determinant;
  if (dielectric < 0) [conductor, dielectric] = [s / ss, 0];
  else if (conductor < 0) [conductor, dielectric] = [0, g / ff];
  return withResidual(points, conductor, dielectric);
}

function withResidual(
  points: readonly AttenuationPoint[],
  conductorDbPer100M: number,
  dielectricDbPer100M: number,
): Attenuation {
  const frequencies = points.map((point) => point.frequencyHz);
  const law: Attenuation = {
    conductorDbPer100M,
    dielectricDbPer100M,
    lowHz: Math.min(...frequencies),
    highHz: Math.max(...frequencies),
    residualRms: null,
    residualLargest: null,
  };
  const misfits = points.map(
    (point) => attenuationDbPer100M(law, point.frequencyHz) / point.lossDbPer100M - 1,
  );
  const largest = Math.max(...misfits.map(Math.abs));
  if (points.length <= 2 && largest < 1e-9) return law;
  const rms = Math.sqrt(misfits.reduce((sum, misfit) => sum + misfit * misfit, 0) / points.length);
  return { ...law, residualRms: rms, residualLargest: largest };
}

function refusal(points: readonly AttenuationPoint[]): AttenuationError | null {
  if (points.length > MOST_POINTS) {
    return { code: 'cable_points_too_many', detail: `At most ${MOST_POINTS} points are read.` };
  }
  const index = points.findIndex(
    (point) => !(isPositive(point.frequencyHz) && isPositive(point.lossDbPer100M)),
  );
  if (index >= 0) {
    return {
      code: 'cable_point_not_positive',
      detail: `Point ${index + 1} needs a positive frequency and a positive loss.`,
      index,
    };
  }
  if (new Set(points.map((point) => point.frequencyHz)).size < 2) {
    return {
      code: 'cable_points_too_few',
      detail: 'Two different frequencies at least are needed, three or more to judge the fit.',
    };
  }
  return fallingLoss(points);
}

function fallingLoss(points: readonly AttenuationPoint[]): AttenuationError | null {
  const order = points
    .map((point, index) => ({ ...point, index }))
    .sort((a, b) => a.frequencyHz - b.frequencyHz);
  let highest = 0;
  for (const { frequencyHz, lossDbPer100M, index } of order) {
    if (lossDbPer100M < highest * (1 - FALL_TOLERANCE)) {
      return {
        code: 'cable_loss_not_rising',
        detail: `At ${frequencyHz} Hz the loss is ${lossDbPer100M} dB per 100 m, less than at a lower frequency; a cable's loss rises.`,
        index,
      };
    }
    highest = Math.max(highest, lossDbPer100M);
  }
  return null;
}

function isPositive(value: number): boolean {
  return value > 0 && Number.isFinite(value);
}

function percent(fraction: number): string {
  return `${(100 * fraction).toFixed(0)} %`;
}

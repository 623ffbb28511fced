import type { LineCheck, LineUnderTest } from './checked-line.ts';
import type { Discontinuity, FoundDiscontinuities } from './discontinuities.ts';
import { fitEnd } from './end-fit.ts';
import type { ReflectometryGrid } from './grid.ts';

/** Radians: above this the phase is not that of one reflection. */
const CLEAR_PHASE = 0.5;

/** A length as the delay to the end gives it. */
export interface MeasuredLength {
  readonly electricalM: number;
  readonly electricalU95M: number;
  readonly method: 'phase' | 'peak';
}

/** From the phase of an end that reflects all, else from its peak; null where no end can be told. */
export function lengthOf(
  grid: ReflectometryGrid,
  test: LineUnderTest,
  places: FoundDiscontinuities,
  end: Discontinuity | null,
  velocityFactor: number,
): MeasuredLength | null {
  if (end === null || (test.farEnd === 'loaded' && test.lengthM === null)) return null;
  const fromPeak: MeasuredLength = {
    electricalM: end.distanceM / velocityFactor,
    electricalU95M: places.separableM / 2 / velocityFactor,
    method: 'peak',
  };
  if (test.farEnd === 'loaded') return fromPeak;
  const fit = fitEnd(grid.sweep, fromPeak.electricalM);
  if (fit.phaseRms > CLEAR_PHASE) return fromPeak;
  return { electricalM: fit.electricalM, electricalU95M: fit.electricalU95M, method: 'phase' };
}

type LengthFields = Pick<
  LineCheck,
  | 'electricalLengthM'
  | 'electricalLengthU95M'
  | 'lengthM'
  | 'lengthU95M'
  | 'lengthMethod'
  | 'measuredVelocityFactor'
  | 'measuredVelocityFactorU95'
>;

/** The length with a velocity factor, and the velocity factor of a stated length. */
export function lengths(
  length: MeasuredLength | null,
  velocityFactor: number,
  velocityFactorU95: number,
  test: LineUnderTest,
): LengthFields {
  if (length === null) {
    return {
      electricalLengthM: null,
      electricalLengthU95M: null,
      lengthM: null,
      lengthU95M: null,
      lengthMethod: null,
      measuredVelocityFactor: null,
      measuredVelocityFactorU95: null,
    };
  }
  const { electricalM, electricalU95M, method } = length;
  const ownFraction = electricalU95M / electricalM;
  const lengthM = electricalM * velocityFactor;
  const known = test.lengthM;
  const measured = known === null ? null : known / electricalM;
  const knownU95M = test.lengthU95M;
  return {
    electricalLengthM: electricalM,
    electricalLengthU95M: electricalU95M,
    lengthM,
    lengthU95M: lengthM * Math.hypot(ownFraction, velocityFactorU95 / velocityFactor),
    lengthMethod: method,
    measuredVelocityFactor: measured,
    measuredVelocityFactorU95:
      known === null || measured === null || knownU95M === null
        ? null
        : measured * Math.hypot(ownFraction, knownU95M / known),
  };
}

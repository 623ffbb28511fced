import type { Caution } from '../analysis/summary.ts';
import type { Assumption } from '../formats/read-types.ts';
import { LIGHT_M_PER_S } from '../line/propagation.ts';
import { fail, ok, type Result } from '../result.ts';
import { powerCautions } from './power.ts';
import {
  compareResistance,
  type ExpectedResistance,
  expectedResistance,
  isMonopole,
  type RadiatorKind,
  type ResistanceComparison,
  usualArm,
} from './radiator.ts';

export interface HotSpotRequest {
  readonly radiator: RadiatorKind;
  readonly frequencyHz: number;
  /** Net power into the feed point. */
  readonly powerW: number;
  /** Measured at the feed point; null: the middle of what theory expects. */
  readonly feedResistanceOhm: number | null;
  /** One arm of a dipole, or the vertical, metres; null: the usual one of its kind. */
  readonly armM: number | null;
  /** Of the conductor; null: 1 mm for a wire, 10 mm for a vertical. */
  readonly radiusM: number | null;
}

/** A place on the radiator, measured from the feed along one arm (both arms alike). */
export interface HotSpot {
  readonly distanceM: number;
  readonly what: 'high_current' | 'high_voltage';
  readonly place: 'feed' | 'end' | 'along';
  /** Rms. */
  readonly currentA: number;
  /** Against the surroundings, rms: an estimate of its order, not a rating. */
  readonly voltageV: number;
}

export interface HotSpots {
  readonly radiator: RadiatorKind;
  readonly armM: number;
  /** Along one arm from the feed. */
  readonly distanceM: Float64Array;
  readonly currentA: Float64Array;
  readonly voltageV: Float64Array;
  readonly spots: readonly HotSpot[];
  readonly expected: ExpectedResistance;
  readonly measuredResistanceOhm: number | null;
  /** Measured beside expected; null where nothing was measured at the feed point. */
  readonly comparison: ResistanceComparison | null;
  readonly source: string;
  readonly assumptions: readonly Assumption[];
  readonly cautions: readonly Caution[];
}

export type HotSpotErrorCode = 'request_not_positive' | 'arm_out_of_range';

export interface HotSpotError {
  readonly code: HotSpotErrorCode;
  readonly detail: string;
}

const POINTS = 101;
const WIRE_RADIUS_M = 0.001;
const TUBE_RADIUS_M = 0.01;
/** Sinusoidal theory says little of arms longer than this, in wavelengths. */
const LONGEST_ARM = 0.7;

/**
 * Where current and voltage are high on a radiator at a given power: sinusoidal current
 * I(z) = Im sin k(h - z) from the feed to the end (C. A. Balanis, Antenna Theory, sec. 4.5), and the
 * voltage of a line of the arm's mean impedance, V(z) = Zm Im cos k(h - z), Zm = 60 [ln(2h/a) - 1]
 * (S. A. Schelkunoff's average characteristic impedance; value from memory).
 */
export function hotSpots(request: HotSpotRequest): Result<HotSpots, HotSpotError> {
  const { radiator, frequencyHz, powerW, feedResistanceOhm } = request;
  const given = [frequencyHz, powerW, feedResistanceOhm, request.armM, request.radiusM];
  if (given.some((value) => value !== null && !(value > 0 && Number.isFinite(value)))) {
    return fail({
      code: 'request_not_positive',
      detail: 'Frequency, power, resistance, length and radius are positive numbers.',
    });
  }
  const wavelengthM = LIGHT_M_PER_S / frequencyHz;
  const armM = request.armM ?? usualArm(radiator) * wavelengthM;
  const radiusM = request.radiusM ?? usualRadiusM(radiator);
  if (armM > LONGEST_ARM * wavelengthM || armM < 10 * radiusM) {
    return fail({
      code: 'arm_out_of_range',
      detail: `An arm of ${armM.toPrecision(3)} m is too long for the theory (${LONGEST_ARM} wavelengths) or too short for its thickness.`,
    });
  }
  const expected = expectedResistance(radiator, armM / wavelengthM);
  const resistanceOhm = feedResistanceOhm ?? (expected.lowOhm + expected.highOhm) / 2;
  const k = (2 * Math.PI) / wavelengthM;
  const arm = armOf(armM, k, Math.sqrt(powerW / resistanceOhm), radiusM);
  const distanceM = Float64Array.from({ length: POINTS }, (_, i) => (armM * i) / (POINTS - 1));
  return ok({
    radiator,
    armM,
    distanceM,
    currentA: distanceM.map(arm.currentA),
    voltageV: distanceM.map(arm.voltageV),
    spots: spots(armM, wavelengthM, arm),
    expected,
    measuredResistanceOhm: feedResistanceOhm,
    comparison:
      feedResistanceOhm === null ? null : compareResistance(radiator, expected, feedResistanceOhm),
    source:
      'sinusoidal current distribution of thin antennas (C. A. Balanis, Antenna Theory, sec. 4.5)',
    assumptions: assumptions(request, armM, radiusM, resistanceOhm),
    cautions: cautions(radiator),
  });
}

interface Arm {
  readonly currentA: (distanceM: number) => number;
  readonly voltageV: (distanceM: number) => number;
}

/** Near a current node at the feed the sinusoid has no finite scale; the feed current is its floor. */
function armOf(armM: number, k: number, feedCurrentA: number, radiusM: number): Arm {
  const largestA = feedCurrentA / Math.max(Math.abs(Math.sin(k * armM)), 0.1);
  const meanOhm = 60 * (Math.log((2 * armM) / radiusM) - 1);
  return {
    currentA: (distanceM) => largestA * share(Math.sin(k * (armM - distanceM))),
    voltageV: (distanceM) => meanOhm * largestA * share(Math.cos(k * (armM - distanceM))),
  };
}

/** A node of the sinusoid is zero, not what the arithmetic leaves of it. */
function share(value: number): number {
  return Math.abs(value) < 1e-12 ? 0 : Math.abs(value);
}

/** Current is highest a quarter wave from the end (or at the feed), voltage at the end and a half wave from it. */
function spots(armM: number, wavelengthM: number, arm: Arm): readonly HotSpot[] {
  const quarterM = wavelengthM / 4;
  const at = (distanceM: number, what: HotSpot['what'], place: HotSpot['place']): HotSpot => ({
    distanceM,
    what,
    place,
    currentA: arm.currentA(distanceM),
    voltageV: arm.voltageV(distanceM),
  });
  const tolerance = 0.02 * wavelengthM;
  const currentM = armM - quarterM;
  const found: HotSpot[] = [
    currentM > tolerance ? at(currentM, 'high_current', 'along') : at(0, 'high_current', 'feed'),
    at(armM, 'high_voltage', 'end'),
  ];
  const nodeM = armM - 2 * quarterM;
  if (nodeM > tolerance) found.push(at(nodeM, 'high_voltage', 'along'));
  return found.sort((a, b) => a.distanceM - b.distanceM);
}

function usualRadiusM(radiator: RadiatorKind): number {
  return isMonopole(radiator) || radiator === 'half_wave_vertical' ? TUBE_RADIUS_M : WIRE_RADIUS_M;
}

function assumptions(
  request: HotSpotRequest,
  armM: number,
  radiusM: number,
  resistanceOhm: number,
): readonly Assumption[] {
  const assumed: Assumption[] = [];
  if (request.armM === null) {
    assumed.push({
      code: 'arm_length_assumed',
      detail: `No length is recorded; an arm of ${armM.toFixed(2)} m is taken, the usual one for this kind and frequency.`,
    });
  }
  if (request.radiusM === null) {
    assumed.push({
      code: 'radius_assumed',
      detail: `The conductor is taken to have a radius of ${(1000 * radiusM).toFixed(0)} mm; voltages depend on it weakly.`,
    });
  }
  if (request.feedResistanceOhm === null) {
    assumed.push({
      code: 'feed_resistance_assumed',
      detail: `No resistance was measured at the feed point; ${resistanceOhm.toFixed(0)} ohm is taken from theory.`,
    });
  }
  if (request.radiator === 'half_wave_vertical') {
    assumed.push({
      code: 'vertical_taken_as_half_wave',
      detail: 'A vertical without radials is taken for a half-wave dipole stood upright.',
    });
  }
  if (request.radiator === 'loaded_short_dipole') {
    assumed.push({
      code: 'loaded_at_centre',
      detail:
        'The loading is taken to be at the feed; coils in the arms keep the current up as far as they reach, and the highest voltage begins at their outer ends.',
    });
  }
  return assumed;
}

function cautions(radiator: RadiatorKind): readonly Caution[] {
  const ends: Caution = {
    code: 'ends_burn_and_arc',
    detail:
      'The ends of a radiator burn and arc at any power: keep them and everything marked as high voltage out of reach of people, animals, trees and buildings. The voltages are estimates of their order, not ratings.',
  };
  if (!isMonopole(radiator)) return [ends, ...powerCautions];
  return [
    ends,
    {
      code: 'radials_carry_current',
      detail:
        'Radials carry the same current as the foot of the vertical, and raised ones have high voltage at their ends.',
    },
    ...powerCautions,
  ];
}

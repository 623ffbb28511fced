import type { Absence } from '../../analysis/summary.ts';
import type { Assumption } from '../../formats/read-types.ts';
import { fail, ok, type Result } from '../../result.ts';
import type { ComplexSweep, Sweep } from '../../sweep.ts';
import type { Cable } from '../cable.ts';
import { LIGHT_M_PER_S } from '../propagation.ts';
import type { LineCheck, LineUnderTest } from './checked-line.ts';
import { findDiscontinuities } from './discontinuities.ts';
import { type EndLoss, endLoss } from './end-loss.ts';
import { lineCheckFindings } from './findings.ts';
import {
  FEWEST_RESOLUTIONS,
  type LineCheckError,
  type ReflectometryGrid,
  reflectometryGrid,
} from './grid.ts';
import { lengthOf, lengths, type MeasuredLength } from './measured-length.ts';
import { referredToCable } from './on-line.ts';
import { endPlace, located } from './places.ts';
import { reflectionTrace } from './trace.ts';
import { windows } from './windows.ts';

/** Assumed where a velocity factor is stated without one. */
const VELOCITY_SPREAD = 0.02;

/**
 * Length, loss and faults of a line from one sweep into it, by frequency-domain reflectometry.
 * Refuses a sweep that is too narrow or too coarse for the length asked; see `reflectometryGrid`.
 */
export function checkLine(measured: Sweep, test: LineUnderTest): Result<LineCheck, LineCheckError> {
  const velocityFactor = test.velocityFactor ?? test.cable?.velocityFactor ?? Number.NaN;
  const reach = reflectometryGrid(measured, velocityFactor, test.lengthM);
  if (!reach.ok) return reach;
  const onLine = referred(reach.value.sweep, test.cable);
  const grid: ReflectometryGrid = { ...reach.value, sweep: onLine };
  const window = windows[test.window];
  const raw = reflectionTrace(grid, window, null);
  const places = findDiscontinuities(raw, onLine.frequencyHz.length);
  const end = endPlace(places, test.lengthM);
  if (end === null && test.farEnd !== 'loaded') {
    return fail({
      code: 'no_end_found',
      detail: `No reflection stands out beyond ${places.separableM.toPrecision(3)} m: is the far end ${test.farEnd}, is the line lossy, or is it too short for this span (${FEWEST_RESOLUTIONS} resolutions of ${grid.resolutionM.toPrecision(3)} m are needed)?`,
    });
  }
  const velocityFactorU95 =
    test.velocityFactorU95 ??
    (test.velocityFactor === null ? test.cable?.velocityFactorU95 : undefined) ??
    VELOCITY_SPREAD * velocityFactor;
  const length = lengthOf(grid, test, places, end, velocityFactor);
  const loss = lossOf(grid, test, length, velocityFactor);
  const check = {
    farEnd: test.farEnd,
    velocityFactor,
    velocityFactorU95,
    ...lengths(length, velocityFactor, velocityFactorU95, test),
    loss,
    trace:
      test.compensateLoss && test.cable !== null ? reflectionTrace(grid, window, test.cable) : raw,
    discontinuities: located(places, end, grid, test.cable, velocityFactorU95 / velocityFactor),
    reflectionFloor: places.floor,
    separableM: places.separableM,
    absent: absences(test, length),
    assumptions: assumptions(test, grid),
  };
  return ok({ ...check, findings: lineCheckFindings(check, test) });
}

function referred(sweep: ComplexSweep, cable: Cable | null): ComplexSweep {
  return cable === null ? sweep : referredToCable(sweep, cable);
}

function lossOf(
  grid: ReflectometryGrid,
  test: LineUnderTest,
  length: MeasuredLength | null,
  velocityFactor: number,
): EndLoss | null {
  if (length === null || length.method !== 'phase') return null;
  const turns = (2 * length.electricalM * grid.spanHz) / LIGHT_M_PER_S;
  const lengthM = test.lengthM ?? length.electricalM * velocityFactor;
  return endLoss(grid.sweep, turns, test.cable, lengthM);
}

function absences(test: LineUnderTest, length: MeasuredLength | null): readonly Absence[] {
  const absent: Absence[] = [];
  if (length === null) {
    absent.push({
      field: 'length',
      code: 'end_hidden',
      detail:
        'With a load at the far end its reflection cannot be told from that of a fault. Leave the end open or short it, or state the length.',
    });
  }
  if (length?.method !== 'phase') {
    absent.push({
      field: 'loss',
      code: 'end_not_total',
      detail:
        'Loss is read from an end that reflects all and outweighs every fault; here it does not.',
    });
  }
  if (test.lengthM === null) {
    absent.push({
      field: 'measured_velocity_factor',
      code: 'line_length_unknown',
      detail: 'A velocity factor can be measured only on a line of known length.',
    });
  }
  return absent;
}

function assumptions(test: LineUnderTest, grid: ReflectometryGrid): readonly Assumption[] {
  const assumed: Assumption[] = [
    {
      code: 'within_alias_free_range',
      detail: `The line is taken to end within ${grid.aliasFreeM.toFixed(1)} m; a longer one folds back into the trace.`,
    },
  ];
  if (test.cable !== null) {
    assumed.push({
      code: 'referred_to_cable_impedance',
      detail: `The reflection is referred to the ${test.cable.characteristicOhm} ohm of ${test.cable.name} with the loss of its data, so that only departures from it show.`,
    });
  }
  if (test.velocityFactor !== null && test.velocityFactorU95 === null) {
    assumed.push({
      code: 'velocity_factor_half_width_assumed',
      detail: 'The velocity factor was stated without a half-width; 2 % is assumed.',
    });
  }
  return assumed;
}

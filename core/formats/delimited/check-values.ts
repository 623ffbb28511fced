import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import type { PlacedColumn } from './frame.ts';
import type { NumberColumns } from './number-columns.ts';
import { factsOf } from './quantities.ts';

/** Printed dB this far beyond zero may be rounding or noise; more is a matter of sign. */
const dbSlack = 0.2;
/** An SWR printed this much below one is one. */
const swrSlack = 0.005;
/** Noise can push a passive impedance a little beyond 90 degrees, not this far. */
const widestImpedanceAngle = 100;

type Checked = Result<readonly Assumption[], ReadError>;

const nothing: Checked = ok([]);

/**
 * Checks what each quantity promises and brings columns to one form, in place: angles to radians,
 * return loss positive, SWR not below one. NaN is passed over. Errors: `frequency_negative`,
 * `magnitude_negative`, `swr_below_one`, `return_loss_sign`, `reflection_db_sign`,
 * `angle_not_of_impedance`, `angle_not_in_radians`.
 */
export function checkValues(columns: readonly PlacedColumn[], rows: NumberColumns): Checked {
  const assumptions: Assumption[] = [];
  for (const [slot, column] of columns.entries()) {
    const values = rows.values[slot].subarray(0, rows.count);
    const checked = checkColumn(column, values, rows.line);
    if (!checked.ok) return checked;
    assumptions.push(...checked.value);
  }
  return ok(assumptions);
}

function checkColumn(
  { quantity, unit }: PlacedColumn,
  values: Float64Array,
  line: Int32Array,
): Checked {
  if (quantity === 'frequency') return checkFrequency(values, line);
  if (quantity === 'return_loss') return checkReturnLoss(values, line);
  if (quantity === 'reflection_db') return checkReflectionDb(values, line);
  if (quantity === 'swr') return checkSwr(values, line);
  if (factsOf(quantity).isMagnitude) {
    const at = values.findIndex((value) => value < 0);
    if (at >= 0) return negative(quantity, values[at], line[at]);
  }
  if (unit !== 'deg' && unit !== 'rad') return nothing;
  const widest = quantity.startsWith('impedance') ? widestImpedanceAngle : Number.POSITIVE_INFINITY;
  return checkAngle(quantity, unit, widest, values, line);
}

function checkFrequency(values: Float64Array, line: Int32Array): Checked {
  for (let i = 0; i < values.length; i++) {
    if (!(values[i] < 0)) continue;
    const detail = `Line ${line[i]} has the negative frequency ${values[i]} Hz.`;
    return refuse('frequency_negative', detail, 'Correct the frequency.', { line: line[i] });
  }
  return nothing;
}

/** Positive for a passive antenna (T. S. Bird, IEEE Antennas and Propagation Magazine 51(2), 2009). */
function checkReturnLoss(values: Float64Array, line: Int32Array): Checked {
  const below = values.findIndex((value) => value < -dbSlack);
  if (below < 0) return nothing;
  const above = values.findIndex((value) => value > dbSlack);
  if (above >= 0) {
    const detail = `Return loss is positive on line ${line[above]} and negative on line ${line[below]}.`;
    const remedy =
      'It cannot be both for a passive antenna. Check the column; a reflection in dB is `reflection_db`.';
    return refuse('return_loss_sign', detail, remedy, { line: line[Math.max(above, below)] });
  }
  for (let i = 0; i < values.length; i++) values[i] = -values[i];
  const detail =
    'The return loss is written negative throughout; its sign was turned, as it is positive for a passive antenna.';
  return ok([{ code: 'return_loss_sign_turned', detail, line: line[below] }]);
}

function checkReflectionDb(values: Float64Array, line: Int32Array): Checked {
  const above = values.findIndex((value) => value > dbSlack);
  if (above < 0 || values.some((value) => value < 0)) return nothing;
  const detail = `The reflection is above 0 dB throughout (line ${line[above]}: ${values[above]} dB).`;
  const remedy = 'If the column is a return loss, map it as `return_loss`.';
  return refuse('reflection_db_sign', detail, remedy, { line: line[above] });
}

function checkSwr(values: Float64Array, line: Int32Array): Checked {
  let raised = -1;
  for (let i = 0; i < values.length; i++) {
    if (!(values[i] < 1)) continue;
    if (values[i] < 1 - swrSlack) {
      const detail = `Line ${line[i]} has the SWR ${values[i]}, but no SWR is below 1.`;
      const remedy =
        'Remove the row if the instrument writes such a number for "not measured"; else check the mapping.';
      return refuse('swr_below_one', detail, remedy, { line: line[i] });
    }
    if (raised < 0) raised = i;
    values[i] = 1;
  }
  if (raised < 0) return nothing;
  const detail = 'An SWR a little below 1 was read as 1.';
  return ok([{ code: 'swr_raised_to_one', detail, line: line[raised] }]);
}

function checkAngle(
  quantity: string,
  unit: 'deg' | 'rad',
  widest: number,
  values: Float64Array,
  line: Int32Array,
): Checked {
  const perUnit = unit === 'deg' ? 1 : 180 / Math.PI;
  for (let i = 0; i < values.length; i++) {
    const degrees = Math.abs(values[i]) * perUnit;
    const at = { line: line[i] };
    if (unit === 'rad' && degrees > 361) {
      const detail = `Line ${line[i]} has the angle ${values[i]}, more than a full turn of radians.`;
      return refuse('angle_not_in_radians', detail, `Map it as \`${quantity}:deg\`.`, at);
    }
    if (degrees > widest) {
      const detail = `Line ${line[i]} has an angle of ${values[i]} ${unit}: beyond 90 degrees it cannot be that of a passive impedance.`;
      const remedy = `If it is the angle of the reflection, map it as \`reflection_angle:${unit}\`.`;
      return refuse('angle_not_of_impedance', detail, remedy, at);
    }
  }
  if (unit === 'deg')
    for (let i = 0; i < values.length; i++) values[i] = (values[i] * Math.PI) / 180;
  return nothing;
}

function negative(quantity: string, value: number, line: number): Checked {
  const signed: Readonly<Record<string, string>> = {
    reactance_magnitude: 'If the column has its sign, map it as `reactance`.',
    reflection_im_magnitude: 'If the column has its sign, map it as `reflection_im`.',
    impedance_angle_magnitude: 'If the column has its sign, map it as `impedance_angle`.',
    reflection_angle_magnitude: 'If the column has its sign, map it as `reflection_angle`.',
  };
  const detail = `Line ${line} has ${value} for \`${quantity}\`, which is never negative.`;
  const remedy = signed[quantity] ?? 'Correct the number, or check what the column holds.';
  return refuse('magnitude_negative', detail, remedy, { line });
}

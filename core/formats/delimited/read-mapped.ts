import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { Recomputation } from './agreement.ts';
import { checkValues } from './check-values.ts';
import { confirmColumns } from './confirm-columns.ts';
import { convertRows } from './convert-rows.ts';
import { type PlacedColumn, type PlacedFrame, slotOf } from './frame.ts';
import type { NumberColumns } from './number-columns.ts';
import { factsOf, type Quantity } from './quantities.ts';
import { readRows } from './read-rows.ts';
import { type ChosenRecipe, chooseRecipe } from './recipes.ts';
import { type SweepOfPoints, sweepOfPoints } from './sweep-of-points.ts';
import type { TableText } from './table-text.ts';

const assumedReferenceOhm = 50;

/**
 * Reads the rows that a mapping speaks of into a sweep; redundant columns must agree with what is
 * computed. `referenceOhm` null: 50 ohm, told as an assumption where it matters.
 */
export function readMapped(
  table: TableText,
  frame: PlacedFrame,
  referenceOhm: number | null,
  maxPoints: number,
): Result<SweepOfPoints, ReadError> {
  const { columns } = frame;
  const chosen = chooseRecipe(columns.map(({ quantity }) => quantity));
  if (!chosen.ok) return chosen;
  const read = readRows(table, frame, columns, maxPoints);
  if (!read.ok) return read;
  const { rows } = read.value;
  const checked = checkValues(columns, rows);
  if (!checked.ok) return checked;
  const left = leaveOut(rows, columns, chosen.value.recipe.from, frame.line);
  if (!left.ok) return left;
  const recomputation = new Recomputation(table.text, columns, rows, chosen.value.recipe);
  const reference = referenceOhm ?? assumedReferenceOhm;
  const confirmed = confirmColumns(recomputation, chosen.value, rows, reference);
  if (!confirmed.ok) return confirmed;
  const converted = convertRows(recomputation, chosen.value, columns, rows, reference);
  if (!converted.ok) return converted;
  const { phase } = chosen.value.recipe;
  const made = sweepOfPoints(converted.value.points, phase, reference);
  if (!made.ok) return made;
  const isFixed = mixesSides(chosen.value) && chosen.value.redundant.length > 0;
  const assumptions = [
    ...read.value.assumptions,
    ...checked.value,
    ...left.value,
    ...(referenceOhm === null && !isFixed ? assumeReference(chosen.value, frame.line) : []),
    ...confirmed.value,
    ...converted.value.assumptions,
    ...made.value.assumptions,
  ];
  return ok({ sweep: made.value.sweep, assumptions });
}

/** Whether reflection and impedance stand side by side, which fixes the reference. */
function mixesSides({ recipe, redundant }: ChosenRecipe): boolean {
  const sides = [...recipe.from, ...redundant].map((quantity) => factsOf(quantity).side);
  return sides.includes('reflection') && sides.includes('impedance');
}

function assumeReference({ recipe, redundant }: ChosenRecipe, line: number): Assumption[] {
  const used = [...recipe.from, ...redundant];
  if (!used.some((quantity) => factsOf(quantity).side === 'reflection')) return [];
  const detail = `Nothing says against which resistance the reflection holds: ${assumedReferenceOhm} ohm was assumed. If it is another, say so by \`reference=\` in \`columns\`.`;
  return [{ code: 'reference_assumed', detail, line }];
}

/** Leaves out the rows in which a number that the sweep is made of is missing. */
function leaveOut(
  rows: NumberColumns,
  columns: readonly PlacedColumn[],
  from: readonly Quantity[],
  firstLine: number,
): Result<readonly Assumption[], ReadError> {
  const needed = from.map((quantity) => rows.values[slotOf(columns, quantity)]);
  const isMissing = (row: number) => needed.some((values) => Number.isNaN(values[row]));
  if (!needed.some((values) => hasNaN(values, rows.count))) return ok([]);
  const lines: number[] = [];
  for (let row = 0; row < rows.count; row++) if (isMissing(row)) lines.push(rows.line[row]);
  if (lines.length === rows.count) {
    const detail = `No row has a number for ${from.map((one) => `\`${one}\``).join(' and ')}.`;
    return refuse('no_points', detail, 'Check the mapping, or sweep again.', { line: firstLine });
  }
  rows.filter((row) => !isMissing(row));
  const shown = lines.slice(0, 5).join(', ');
  const more = lines.length > 5 ? ` and ${lines.length - 5} more` : '';
  const detail = `${lines.length} rows have no number (undefined or out of the instrument's range) and were left out: line ${shown}${more}. There the antenna counts as not swept.`;
  return ok([{ code: 'points_left_out', detail, line: lines[0] }]);
}

function hasNaN(values: Float64Array, count: number): boolean {
  for (let row = 0; row < count; row++) if (Number.isNaN(values[row])) return true;
  return false;
}

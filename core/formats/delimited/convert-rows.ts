import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import type { Reflections } from '../touchstone/reflections.ts';
import type { Recomputation } from './agreement.ts';
import { type PlacedColumn, slotOf } from './frame.ts';
import type { NumberColumns } from './number-columns.ts';
import type { Quantity } from './quantities.ts';
import type { ChosenRecipe, Recipe } from './recipes.ts';
import { converterOf } from './to-reflection.ts';

export interface ConvertedRows {
  /** Where no phase is known the real part is the magnitude, the imaginary part zero. */
  readonly points: Reflections;
  readonly assumptions: readonly Assumption[];
}

/**
 * Computes the reflections of all rows. Errors: `columns_contradict` where two magnitudes fit no
 * impedance, `reflection_not_finite`.
 */
export function convertRows(
  recomputation: Recomputation,
  { recipe }: ChosenRecipe,
  columns: readonly PlacedColumn[],
  rows: NumberColumns,
  referenceOhm: number,
): Result<ConvertedRows, ReadError> {
  const { count } = rows;
  const frequencyHz = rows.values[slotOf(columns, 'frequency')].slice(0, count);
  const line = rows.line.slice(0, count);
  const [first, second = first] = recipe.from.map((one) =>
    rows.values[slotOf(columns, one)].subarray(0, count),
  );
  if (recipe.kind === 'reflection_parts') {
    const points = { frequencyHz, reflectionRe: first.slice(), reflectionIm: second.slice(), line };
    return ok({ points, assumptions: [] });
  }
  const toReflection = converterOf(recipe);
  const reflectionRe = new Float64Array(count);
  const reflectionIm = new Float64Array(count);
  const out = new Float64Array(2);
  let rounded = 0;
  let roundedLine = 0;
  for (let row = 0; row < count; row++) {
    toReflection(first[row], second[row], referenceOhm, out);
    if (Number.isNaN(out[1]) && Number.isFinite(out[0])) {
      if (!recomputation.isRounding(row, referenceOhm)) return impossible(recipe.from, rows, row);
      if (rounded === 0) roundedLine = rows.line[row];
      rounded += 1;
      out[1] = 0;
    }
    if (!(Number.isFinite(out[0]) && Number.isFinite(out[1]))) return notFinite(rows, row);
    reflectionRe[row] = out[0];
    reflectionIm[row] = out[1];
  }
  const assumptions = derivedAssumptions(recipe, line[0]);
  if (rounded > 0) {
    const detail = `In ${rounded} rows the two columns fit each other only within their rounding: the reactance there was taken as 0.`;
    assumptions.push({ code: 'reactance_within_rounding', detail, line: roundedLine });
  }
  return ok({ points: { frequencyHz, reflectionRe, reflectionIm, line }, assumptions });
}

function derivedAssumptions({ kind, from }: Recipe, line: number): Assumption[] {
  const isDerived = kind.startsWith('resistance_and') || kind === 'impedance_and_match';
  if (!isDerived) return [];
  const detail = `The magnitude of the reactance was computed from ${from.map((one) => `\`${one}\``).join(' and ')}; where it is small it is uncertain.`;
  return [{ code: 'reactance_computed', detail, line }];
}

function impossible(
  from: readonly Quantity[],
  rows: NumberColumns,
  row: number,
): Result<never, ReadError> {
  const line = rows.line[row];
  const detail = `On line ${line} no impedance has this ${from.map((one) => `\`${one}\``).join(' with this ')}.`;
  const remedy = 'Check what the columns hold, and the reference.';
  return refuse('columns_contradict', detail, remedy, { line });
}

function notFinite(rows: NumberColumns, row: number): Result<never, ReadError> {
  const line = rows.line[row];
  const detail = `Line ${line} gives no finite reflection.`;
  const remedy = 'Check the numbers of that line and the mapping, or remove it.';
  return refuse('reflection_not_finite', detail, remedy, { line });
}

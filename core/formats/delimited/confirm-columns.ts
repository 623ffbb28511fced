import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { type Agreement, agrees, type Recomputation } from './agreement.ts';
import type { NumberColumns } from './number-columns.ts';
import type { Quantity } from './quantities.ts';
import type { ChosenRecipe } from './recipes.ts';

/** References to try where columns contradict each other or fix one. */
export const usualReferencesOhm: readonly number[] = [50, 75, 100, 200, 300, 450, 600, 25];

/**
 * Holds the redundant columns against the others. Error: `columns_contradict`, with the reference at
 * which they would agree, if a usual one is.
 */
export function confirmColumns(
  recomputation: Recomputation,
  { recipe, redundant }: ChosenRecipe,
  rows: NumberColumns,
  referenceOhm: number,
): Result<readonly Assumption[], ReadError> {
  const assumptions: Assumption[] = [];
  for (const quantity of redundant) {
    const agreement = recomputation.compare(quantity, referenceOhm);
    const { disagreeing, compared, firstRow } = agreement;
    if (!agrees(agreement)) {
      return contradict(recomputation, agreement, recipe.from, rows, referenceOhm);
    }
    if (disagreeing === 0) continue;
    const detail = `\`${quantity}\` differs from what the other columns give in ${disagreeing} of ${compared} rows; it was not used.`;
    assumptions.push({ code: 'columns_differ_in_places', detail, line: rows.line[firstRow] });
  }
  return ok(assumptions);
}

function contradict(
  recomputation: Recomputation,
  { quantity, expected, firstRow, disagreeing, compared }: Agreement,
  from: readonly Quantity[],
  rows: NumberColumns,
  referenceOhm: number,
): Result<never, ReadError> {
  const line = rows.line[firstRow];
  const sources = from.map((one) => `\`${one}\``).join(' and ');
  const detail = `\`${quantity}\` contradicts ${sources} in ${disagreeing} of ${compared} rows, first on line ${line}, where it should be near ${expected.toPrecision(4)} (in ohm, siemens, radians, dB or fractions).`;
  const fitting = usualReferencesOhm.find((ohms) => {
    return ohms !== referenceOhm && agrees(recomputation.compare(quantity, ohms));
  });
  const remedy =
    fitting === undefined
      ? 'Check what the columns hold, their units and the reference, or leave one out (by order: `skip`).'
      : `The columns would agree at \`reference=${fitting}\`: add that to \`columns\` if it holds.`;
  return refuse('columns_contradict', detail, remedy, { line });
}

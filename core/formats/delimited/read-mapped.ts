import { ok, type Result } from '../../result.ts';
import { makeSweep, type Sweep } from '../../sweep.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { inOrder } from '../touchstone/ascending.ts';
import { refuse } from '../touchstone/faults.ts';
import { type Agreement, agrees, Recomputation } from './agreement.ts';
import { checkValues } from './check-values.ts';
import type { PlacedColumn, PlacedFrame } from './frame.ts';
import type { NumberColumns } from './number-columns.ts';
import { factsOf, type Quantity } from './quantities.ts';
import { readRows } from './read-rows.ts';
import { type ChosenRecipe, chooseRecipe } from './recipes.ts';
import type { TableText } from './table-text.ts';
import { converterOf } from './to-reflection.ts';

const assumedReferenceOhm = 50;
/** References to try when columns contradict each other, for the remedy. */
export const usualReferencesOhm: readonly number[] = [50, 75, 100, 200, 300, 450, 600, 25];

export interface ReadMapped {
  readonly sweep: Sweep;
  readonly assumptions: readonly Assumption[];
}

/**
 * Reads the rows that a mapping speaks of into a sweep; redundant columns must agree with what is
 * computed. `referenceOhm` null: 50 ohm, told as an assumption where it matters.
 */
export function readMapped(
  table: TableText,
  frame: PlacedFrame,
  referenceOhm: number | null,
  maxPoints: number,
): Result<ReadMapped, ReadError> {
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
  const confirmed = confirm(recomputation, chosen.value, rows, reference);
  if (!confirmed.ok) return confirmed;
  const converted = convert(recomputation, chosen.value, columns, rows, reference);
  if (!converted.ok) return converted;
  const isFixed = mixesSides(chosen.value) && chosen.value.redundant.length > 0;
  return toSweep(converted.value, rows, chosen.value, reference, [
    ...read.value.assumptions,
    ...checked.value,
    ...left.value,
    ...(referenceOhm === null && !isFixed ? assumeReference(chosen.value, frame.line) : []),
    ...confirmed.value,
    ...converted.value.assumptions,
  ]);
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

/** Holds the redundant columns against the others. */
function confirm(
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

interface Converted {
  /** Frequency, then the parts of the reflection, or its magnitude alone. */
  readonly arrays: readonly Float64Array[];
  readonly assumptions: readonly Assumption[];
}

function convert(
  recomputation: Recomputation,
  { recipe }: ChosenRecipe,
  columns: readonly PlacedColumn[],
  rows: NumberColumns,
  referenceOhm: number,
): Result<Converted, ReadError> {
  const { count } = rows;
  const frequency = rows.values[slotOf(columns, 'frequency')].slice(0, count);
  const [first, second = first] = recipe.from.map((one) =>
    rows.values[slotOf(columns, one)].subarray(0, count),
  );
  if (recipe.kind === 'reflection_parts') {
    return ok({ arrays: [frequency, first.slice(), second.slice()], assumptions: [] });
  }
  const toReflection = converterOf(recipe);
  const re = new Float64Array(count);
  const im = new Float64Array(count);
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
    re[row] = out[0];
    im[row] = out[1];
  }
  const arrays = recipe.phase === 'none' ? [frequency, re] : [frequency, re, im];
  const assumptions = derivedAssumptions(recipe.from, recipe.kind, rows.line[0]);
  if (rounded > 0) {
    const detail = `In ${rounded} rows the two columns fit each other only within their rounding: the reactance there was taken as 0.`;
    assumptions.push({ code: 'reactance_within_rounding', detail, line: roundedLine });
  }
  return ok({ arrays, assumptions });
}

function derivedAssumptions(
  from: readonly Quantity[],
  kind: ChosenRecipe['recipe']['kind'],
  line: number,
): Assumption[] {
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

function toSweep(
  { arrays }: Converted,
  rows: NumberColumns,
  { recipe }: ChosenRecipe,
  referenceOhm: number,
  assumptions: readonly Assumption[],
): Result<ReadMapped, ReadError> {
  const line = rows.line.subarray(0, rows.count);
  const turned = turnIfDescending(arrays, line);
  const ordered = inOrder(arrays, line, false);
  if (!ordered.ok) return ordered;
  const [frequencyHz, first, second] = ordered.value.arrays;
  const sweep = makeSweep(
    recipe.phase === 'none'
      ? { phase: 'none', frequencyHz, referenceOhm, reflectionMagnitude: first }
      : {
          phase: recipe.phase,
          frequencyHz,
          referenceOhm,
          reflectionRe: first,
          reflectionIm: second,
        },
  );
  if (!sweep.ok) {
    const { code, detail } = sweep.error;
    return refuse(code, detail, 'Check the file and the mapping.', { line: line[0] });
  }
  return ok({
    sweep: sweep.value,
    assumptions: [
      ...assumptions,
      ...turned,
      ...ordered.value.assumptions,
      ...suspectFrequencies(frequencyHz, line[0]),
    ],
  });
}

function turnIfDescending(arrays: readonly Float64Array[], line: Int32Array): Assumption[] {
  const [frequency] = arrays;
  if (frequency.length < 2) return [];
  for (let i = 1; i < frequency.length; i++) if (!(frequency[i] < frequency[i - 1])) return [];
  const firstLine = line[0];
  for (const array of arrays) array.reverse();
  line.reverse();
  const detail = 'The points stood in descending frequency; they were turned round.';
  return [{ code: 'points_reversed', detail, line: firstLine }];
}

function suspectFrequencies(frequencyHz: Float64Array, line: number): Assumption[] {
  const assumptions: Assumption[] = [];
  const lowest = frequencyHz[0];
  const highest = frequencyHz[frequencyHz.length - 1];
  if (lowest === 0) {
    const detail = 'The point at 0 Hz was kept; nothing is said of wavelengths there.';
    assumptions.push({ code: 'zero_frequency', detail, line });
  }
  if (lowest > 10e9 || highest < 1000) {
    const detail = `All frequencies lie ${highest < 1000 ? 'below 1 kHz' : 'above 10 GHz'}: check the unit of the frequency.`;
    assumptions.push({ code: 'unit_suspect', detail, line });
  }
  return assumptions;
}

function slotOf(columns: readonly PlacedColumn[], quantity: Quantity): number {
  return columns.findIndex((column) => column.quantity === quantity);
}

import type { PlacedColumn } from './frame.ts';
import { fromReflection } from './from-reflection.ts';
import type { NumberColumns } from './number-columns.ts';
import { decimalShift, type Quantity } from './quantities.ts';
import type { Recipe } from './recipes.ts';
import { printedSteps } from './resolution.ts';
import { converterOf } from './to-reflection.ts';

/** How a column compares with what the other columns say it must be. */
export interface Agreement {
  readonly quantity: Quantity;
  /** Rows in which both could be had. */
  readonly compared: number;
  readonly disagreeing: number;
  /** The first row that disagrees, and what was expected there. */
  readonly firstRow: number;
  readonly expected: number;
  /** Whether the column varies by more than rounding leaves open, so that agreeing means something. */
  readonly isTelling: boolean;
}

/** Rows that may disagree (a slip of the instrument) before the columns contradict each other. */
const mostDisagreeing = 0.05;

/** Whether the columns say the same, print rounding allowed for. */
export function agrees({ compared, disagreeing }: Agreement): boolean {
  return disagreeing <= mostDisagreeing * compared;
}

/** Recomputes redundant columns from those that a sweep is made of. */
export class Recomputation {
  private readonly columns: readonly PlacedColumn[];
  private readonly rows: NumberColumns;
  private readonly recipe: Recipe;
  private readonly text: string;

  constructor(text: string, columns: readonly PlacedColumn[], rows: NumberColumns, recipe: Recipe) {
    this.text = text;
    this.columns = columns;
    this.rows = rows;
    this.recipe = recipe;
  }

  /** Compares one column against a reference. */
  compare(quantity: Quantity, referenceOhm: number): Agreement {
    const { rows } = this;
    const values = this.valuesOf(quantity);
    const steps = this.stepsOf(quantity);
    const spread = this.spreadOf(quantity, referenceOhm);
    const cap = quantity === 'swr' ? repeatedMaximum(values, rows.count) : Number.NaN;
    const isAngle = quantity.includes('angle');
    const tally = { compared: 0, disagreeing: 0, firstRow: -1, expected: Number.NaN };
    let lowest = Number.POSITIVE_INFINITY;
    let highest = Number.NEGATIVE_INFINITY;
    let openness = 0;
    for (let row = 0; row < rows.count; row++) {
      const value = values[row];
      const { centre, low, high } = spread(row);
      if (Number.isNaN(value) || Number.isNaN(centre)) continue;
      if (value === cap && centre >= value) continue;
      const width = high - low;
      if (isAngle && width > Math.PI) continue;
      const off = isAngle ? turned(value - centre) : value - centre;
      const slack = finiteOr(width / 2, 0) + 1.01 * steps[row] + 1e-9 * Math.abs(value);
      tally.compared += 1;
      lowest = Math.min(lowest, value);
      highest = Math.max(highest, value);
      openness += finiteOr(width, 0) + 2 * slack;
      if (off >= low - centre - slack && off <= high - centre + slack) continue;
      tally.disagreeing += 1;
      if (tally.firstRow < 0) {
        tally.firstRow = row;
        tally.expected = centre;
      }
    }
    const isTelling = highest - lowest > (2 * openness) / tally.compared;
    return { quantity, ...tally, isTelling };
  }

  /** Whether a step of the last digit (numbers may be cut off) explains a contradiction in a row. */
  isRounding(row: number, referenceOhm: number): boolean {
    const convert = converterOf(this.recipe);
    const out = new Float64Array(2);
    for (const [first, second] of this.cornersOf(1)(row)) {
      convert(first, second, referenceOhm, out);
      if (!Number.isNaN(out[1])) return true;
    }
    return false;
  }

  /** Least, middle and greatest value of a quantity, given the rounding of what it is made of. */
  private spreadOf(quantity: Quantity, referenceOhm: number) {
    const convert = converterOf(this.recipe);
    const corners = this.cornersOf(0.5);
    const out = new Float64Array(2);
    const isAngle = quantity.includes('angle');
    return (row: number): { centre: number; low: number; high: number } => {
      let centre = Number.NaN;
      let low = Number.POSITIVE_INFINITY;
      let high = Number.NEGATIVE_INFINITY;
      for (const [first, second] of corners(row)) {
        convert(first, second, referenceOhm, out);
        const im = Number.isNaN(out[1]) ? 0 : out[1];
        const value = fromReflection(quantity, out[0], im, referenceOhm);
        if (Number.isNaN(centre)) centre = value;
        const near = isAngle ? centre + turned(value - centre) : value;
        low = Math.min(low, near);
        high = Math.max(high, near);
      }
      return { centre, low, high };
    };
  }

  /** The values of the recipe's columns in a row: as printed first, then some steps to each side. */
  private cornersOf(steps: number): (row: number) => readonly (readonly [number, number])[] {
    const { from } = this.recipe;
    const [first, second] = from.map((quantity) => this.valuesOf(quantity));
    const [firstStep, secondStep] = from.map((quantity) => this.stepsOf(quantity));
    if (second === undefined) {
      return (row) => [0, -1, 1].map((side) => [first[row] + side * steps * firstStep[row], 0]);
    }
    return (row) =>
      sides.map(([a, b]) => [
        first[row] + a * steps * firstStep[row],
        second[row] + b * steps * secondStep[row],
      ]);
  }

  private valuesOf(quantity: Quantity): Float64Array {
    return this.rows.values[this.slotOf(quantity)];
  }

  private slotOf(quantity: Quantity): number {
    return this.columns.findIndex((column) => column.quantity === quantity);
  }

  /** What the last printed digit is worth, in the units of the values. */
  private stepsOf(quantity: Quantity): Float64Array {
    const slot = this.slotOf(quantity);
    const { unit } = this.columns[slot];
    const scale = (unit === 'deg' ? Math.PI / 180 : 1) * 10 ** decimalShift(unit);
    const steps = printedSteps(this.text, this.rows.cellStart[slot], this.rows.count);
    return steps.map((step) => step * scale);
  }
}

const sides: readonly (readonly [number, number])[] = [
  [0, 0],
  [-1, -1],
  [-1, 1],
  [1, -1],
  [1, 1],
];

/** The greatest value of a column if it stands there twice or more: then it may be a stop. */
function repeatedMaximum(values: Float64Array, count: number): number {
  let highest = Number.NEGATIVE_INFINITY;
  let times = 0;
  for (let row = 0; row < count; row++) {
    if (values[row] > highest) {
      highest = values[row];
      times = 0;
    }
    if (values[row] === highest) times += 1;
  }
  return times > 1 ? highest : Number.NaN;
}

/** An angle brought to half a turn either way. */
function turned(angle: number): number {
  return angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI));
}

function finiteOr(value: number, fallback: number): number {
  return Number.isFinite(value) ? value : fallback;
}

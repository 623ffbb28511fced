import { ok, type Result } from '../../result.ts';
import { parseDecimal } from '../decimal.ts';
import type { ReadError } from '../read-types.ts';
import { type Place, refuse } from '../touchstone/faults.ts';
import { isFortranNumber, ratioIn, saysNoNumber } from './cells.ts';
import type { PlacedColumn } from './frame.ts';
import { decimalShift } from './quantities.ts';

const number = String.raw`[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?`;
const withUnit = new RegExp(`^${number} ?(?:[a-zA-Z\u00b5\u03a9\u2126]{1,5}|%|\u00b0)$`);
const complex = new RegExp(
  `^\\(?(?:${number} ?[+-] ?(?:[ij](?:\\d[\\d.eE+-]*)?|\\d[\\d.eE+-]*[ij])|${number}, ?${number}\\))\\)?$`,
);
const grouped = /^[+-]?\d{1,3}(?:['\u2019 \u00a0\u202f]\d{3})+(?:\.\d*)?$/;
const longestCell = 64;

/** What a cell that is no plain number holds: a number after all, NaN for none, or a refusal. */
export interface OddCell {
  readonly value: number;
  /** Whether it was a number with an exponent behind D. */
  readonly isFortran: boolean;
}

/** Reads a cell that is no plain number. `shown` is the cell as it stands in the file. */
export function readOddCell(
  cell: string,
  shown: string,
  { quantity, unit }: PlacedColumn,
  place: Place,
): Result<OddCell, ReadError> {
  if (quantity === 'swr') {
    const swr = ratioIn(cell);
    if (!Number.isNaN(swr)) return ok({ value: swr, isFortran: false });
  }
  if (quantity === 'return_loss' && /^\+?(?:inf|infinity|\u221e)$/i.test(cell)) {
    return ok({ value: Number.POSITIVE_INFINITY, isFortran: false });
  }
  if (quantity === 'reflection_db' && /^-(?:inf|infinity|\u221e)$/i.test(cell)) {
    return ok({ value: Number.NEGATIVE_INFINITY, isFortran: false });
  }
  if (quantity !== 'frequency' && saysNoNumber(cell))
    return ok({ value: Number.NaN, isFortran: false });
  if (isFortranNumber(cell)) {
    const value = parseDecimal(cell.replace(/[dD]/, 'e'), decimalShift(unit));
    if (!Number.isNaN(value)) return ok({ value, isFortran: true });
  }
  return refuseCell(cell, shown, quantity, place);
}

function refuseCell(
  cell: string,
  shown: string,
  quantity: string,
  place: Place,
): Result<never, ReadError> {
  const start = shown.length > 24 ? `${shown.slice(0, 24)}…` : shown;
  const where = `Line ${place.line}${place.column === undefined ? '' : `, column ${place.column}`}`;
  const detail = `${where}: \`${start}\` is not a number (${quantity}).`;
  if (cell === '') {
    const empty = `${where}: the frequency is missing.`;
    return refuse('frequency_missing', empty, 'Fill it in, or remove the row.', place);
  }
  if (cell.length > longestCell) {
    return refuse('not_a_number', detail, 'Check the delimiter and the mapping.', place);
  }
  if (withUnit.test(cell)) {
    const remedy = 'Remove the units from the cells and name the unit in `columns`.';
    return refuse('unit_in_cell', detail, remedy, place);
  }
  if (complex.test(cell)) {
    const remedy = 'Put real and imaginary part in two columns.';
    return refuse('complex_in_cell', detail, remedy, place);
  }
  if (grouped.test(cell)) {
    return refuse('digits_grouped', detail, 'Remove the marks between thousands.', place);
  }
  if (/^[+-]?\d*,\d+$/.test(cell)) {
    const remedy = 'If the comma is the decimal mark, add `decimal=comma` to `columns`.';
    return refuse('not_a_number', detail, remedy, place);
  }
  const remedy =
    'Correct the cell or remove the row; if the column holds something else, map it as `skip`.';
  return refuse('not_a_number', detail, remedy, place);
}

import { parseDecimal } from '../decimal.ts';
import type { Delimiter } from './mapping.ts';

export const delimiterChars: Readonly<Record<Delimiter, string>> = {
  comma: ',',
  semicolon: ';',
  tab: '\t',
  blanks: ' ',
};

/** The cells of a line without quotes, blanks around them removed. */
export function cellsOf(line: string, delimiter: Delimiter): string[] {
  if (delimiter !== 'blanks') return line.split(delimiterChars[delimiter]).map(trimBlanks);
  const bare = trimBlanks(line);
  return bare === '' ? [''] : bare.split(/[ \t]+/);
}

/** Whether a line is a comment: it begins with `#`, `!`, `%`, `//`, or `;` where that is no delimiter. */
export function isCommentAt(text: string, ink: number, delimiter: Delimiter | null): boolean {
  const code = text.charCodeAt(ink);
  if (code === 35 || code === 33 || code === 37) return true;
  if (code === 59) return delimiter !== 'semicolon';
  return code === 47 && text.charCodeAt(ink + 1) === 47;
}

/** Blanks and tabs only: other white space in a table is a defect to be shown, not passed over. */
export function trimBlanks(text: string): string {
  let start = 0;
  let end = text.length;
  while (start < end && isBlank(text.charCodeAt(start))) start += 1;
  while (end > start && isBlank(text.charCodeAt(end - 1))) end -= 1;
  return text.slice(start, end);
}

function isBlank(code: number): boolean {
  return code === 32 || code === 9;
}

const noNumber =
  /^(?:-{1,6}|\u2013|\u2014|[+-]?(?:nan|inf|infinity|\u221e)|n\/a|null|[+-]?1.#(?:ind|inf|qnan|snan)\d{0,4})$/i;
const censored = /^[<>\u2264\u2265]=? ?[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?(?: ?: ?1)?$/i;

/**
 * Whether a cell says that there is no number: empty, NaN, infinite, dashes, or a bound such as
 * `>10`. Decimals are written with a point.
 */
export function saysNoNumber(cell: string): boolean {
  if (cell === '') return true;
  return cell.length <= 32 && (noNumber.test(cell) || censored.test(cell));
}

const ratio = /^([^:]{1,24}?) ?: ?([^:]{1,24})$/;

/** The SWR in a cell such as `1.5:1` or `1:1.5`; NaN if it is not written so. */
export function ratioIn(cell: string): number {
  const parts = ratio.exec(cell);
  if (parts === null) return Number.NaN;
  const first = parseDecimal(parts[1]);
  const second = parseDecimal(parts[2]);
  if (second === 1) return first;
  return first === 1 ? second : Number.NaN;
}

/** Whether a cell is a number whose exponent stands behind D. */
export function isFortranNumber(cell: string): boolean {
  return cell.length <= 64 && /^[+-]?(?:\d+\.?\d*|\.\d+)[dD][+-]?\d+$/.test(cell);
}

/** Whether a cell could stand in a column of numbers. */
export function looksNumeric(cell: string): boolean {
  return !Number.isNaN(parseDecimal(cell)) || !Number.isNaN(ratioIn(cell)) || isFortranNumber(cell);
}

/** Whether a cell sets out to be a number, even if it fails. */
export function beginsNumeric(cell: string): boolean {
  return /^[+-]?\.?\d/.test(cell);
}

/**
 * Writes decimal commas as points, and points as a character that no number has: a file has one
 * decimal mark, and a second one in it is a fault to be found. Places do not change.
 */
export function commasToPoints(text: string): string {
  return text.replaceAll('.', '\u0001').replaceAll(',', '.');
}

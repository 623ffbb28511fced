import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { commasToPoints } from './cells.ts';
import type { Dialect } from './dialect.ts';
import type { Delimiter } from './mapping.ts';
import { unquote } from './unquoted.ts';

/** A delimited text made ready for reading numbers: no quotes, decimals written with a point. */
export interface TableText {
  readonly text: string;
  /** The same, character by character, with decimals as they were written. */
  readonly shown: string;
  readonly delimiter: Delimiter;
  /** Whether places in the text are places in the file. */
  readonly isInPlace: boolean;
}

/** Brings a text into that form. */
export function tableText(text: string, dialect: Dialect): Result<TableText, ReadError> {
  const { delimiter, decimal, hasQuotes } = dialect;
  const unquoted = hasQuotes ? unquote(text, delimiter) : ok(text);
  if (!unquoted.ok) return unquoted;
  const shown = unquoted.value;
  return ok({
    text: decimal === 'comma' ? commasToPoints(shown) : shown,
    shown,
    delimiter: hasQuotes ? 'tab' : delimiter,
    isInPlace: !hasQuotes,
  });
}

/**
 * Tells that commas were taken for decimal marks where nobody said so. `14,000` everywhere might as
 * well be fourteen thousand: that is refused. `from` is where the rows begin.
 */
export function assumeDecimalComma(
  { shown }: TableText,
  from: number,
  line: number,
): Result<readonly Assumption[], ReadError> {
  if (mayGroupThousands(shown, from)) {
    return refuse(
      'decimal_ambiguous',
      'Every comma in the rows has exactly three digits behind it: it may be a decimal mark or part thousands.',
      'If it is the decimal mark, add `decimal=comma` to `columns`; else export without marks between thousands.',
      { line },
    );
  }
  const detail = 'Commas inside cells were read as decimal marks.';
  return ok([{ code: 'decimal_comma', detail, line }]);
}

function mayGroupThousands(text: string, from: number): boolean {
  let at = text.indexOf(',', from);
  const hasComma = at >= 0;
  while (at >= 0) {
    const before = digitsBefore(text, at);
    const isLeadingZero = before === 1 && text.charCodeAt(at - 1) === 48;
    if (before === 0 || before > 3 || isLeadingZero || digitsAfter(text, at) !== 3) return false;
    at = text.indexOf(',', at + 1);
  }
  return hasComma;
}

/** Counted to four at most: more makes no difference. */
function digitsBefore(text: string, at: number): number {
  let count = 0;
  while (count < 4 && isDigit(text.charCodeAt(at - 1 - count))) count += 1;
  return count;
}

function digitsAfter(text: string, at: number): number {
  let count = 0;
  while (count < 4 && isDigit(text.charCodeAt(at + 1 + count))) count += 1;
  return count;
}

function isDigit(code: number): boolean {
  return code >= 48 && code <= 57;
}

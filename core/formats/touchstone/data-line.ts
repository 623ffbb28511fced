import { ok, type Result } from '../../result.ts';
import { DecimalScanner, parseDecimal } from '../decimal.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from './faults.ts';
import type { NumberTable } from './number-table.ts';

const space = 32;
const tab = 9;
const exclamation = 33;

/** What was tolerated in the numbers of a file, with the first line it was met in. */
export interface Tolerated {
  fortranLine: number | null;
  commaLine: number | null;
}

/** Nothing tolerated yet. */
export function nothingTolerated(): Tolerated {
  return { fortranLine: null, commaLine: null };
}

/** Reads the numbers of lines into a table; the first of each is scaled by `frequencyShift`. */
export class DataLineReader {
  private readonly scanner: DecimalScanner;
  private readonly table: NumberTable;
  private readonly frequencyShift: number;
  readonly tolerated: Tolerated = nothingTolerated();

  constructor(text: string, table: NumberTable, frequencyShift: number) {
    this.scanner = new DecimalScanner(text);
    this.table = table;
    this.frequencyShift = frequencyShift;
  }

  /** Reads text[start, end) as one row; null on success. */
  read(start: number, end: number, line: number): Result<never, ReadError> | null {
    const { scanner, table } = this;
    const { text } = scanner;
    table.startRow(line, start);
    let shift = this.frequencyShift;
    let at = start;
    while (at < end) {
      const code = text.charCodeAt(at);
      if (code === space || code === tab) {
        at += 1;
        continue;
      }
      if (code === exclamation) break;
      const value = scanner.read(at, shift);
      const after = scanner.end < end ? text.charCodeAt(scanner.end) : space;
      if (!Number.isNaN(value) && (after === space || after === tab || after === exclamation)) {
        table.push(value);
        at = scanner.end;
      } else {
        const tokenEnd = endOfToken(text, at, end);
        const odd = this.readOddToken(text.slice(at, tokenEnd), shift, line, at - start + 1);
        if (!odd.ok) return odd;
        table.push(odd.value);
        at = tokenEnd;
      }
      shift = 0;
    }
    return null;
  }

  /** A token that is no plain number: what is meant beyond doubt is taken, all else refused. */
  private readOddToken(
    token: string,
    shift: number,
    line: number,
    column: number,
  ): Result<number, ReadError> {
    const { tolerated } = this;
    const place = { line, column };
    if (/^[+-]?(?:\d+(?:\.\d*)?|\.\d+)[dD][+-]?\d+$/.test(token)) {
      tolerated.fortranLine ??= line;
      return ok(parseDecimal(token.replace(/[dD]/, 'e'), shift));
    }
    if (/^[+-]?\d*,\d+(?:[eE][+-]?\d+)?$/.test(token)) {
      tolerated.commaLine ??= line;
      return ok(parseDecimal(token.replace(',', '.'), shift));
    }
    if (/^[+-]?(?:nan|inf(?:inity)?|1\.#(?:ind|inf|qnan|snan)\d*)$/i.test(token)) {
      if (shift === 0 && /^-inf/i.test(token)) return ok(Number.NEGATIVE_INFINITY);
      return ok(Number.NaN);
    }
    if (/[,;]/.test(token)) {
      const detail = `Line ${line} separates its numbers by \`${token.includes(';') ? ';' : ','}\`, which Touchstone does not.`;
      const remedy =
        'If this is delimited text, remove its option line and send it with a column mapping.';
      return refuse('separator_not_blank', detail, remedy, place);
    }
    const shown = token.length > 24 ? `${token.slice(0, 24)}…` : token;
    const detail = `Line ${line}, column ${column}: \`${shown}\` is not a number.`;
    return refuse('not_a_number', detail, 'Correct the number, or export the file again.', place);
  }
}

function endOfToken(text: string, start: number, end: number): number {
  let at = start;
  while (at < end) {
    const code = text.charCodeAt(at);
    if (code === space || code === tab || code === exclamation) break;
    at += 1;
  }
  return at;
}

/** What was tolerated in the numbers, told once for each kind. */
export function toleratedAssumptions(tolerated: Tolerated): Assumption[] {
  const assumptions: Assumption[] = [];
  const { fortranLine, commaLine } = tolerated;
  if (fortranLine !== null) {
    const detail = 'Exponents written with D were read as exponents.';
    assumptions.push({ code: 'fortran_exponent', detail, line: fortranLine });
  }
  if (commaLine !== null) {
    const detail = 'Commas inside numbers were read as decimal points: no number has a point.';
    assumptions.push({ code: 'decimal_comma', detail, line: commaLine });
  }
  return assumptions;
}

import { ok, type Result } from '../../result.ts';
import { type DecimalScanner, parseDecimal } from '../decimal.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { type Place, refuse } from './faults.ts';
import type { NumberTable } from './number-table.ts';

const tab = 9;
const lineFeed = 10;
const carriageReturn = 13;
const space = 32;
const exclamation = 33;

/** What was tolerated in the numbers of a file, with the first line it was met in. */
export interface Tolerated {
  fortranLine: number | null;
  commaLine: number | null;
  /** A comma was met that cannot part thousands. */
  isCommaSure: boolean;
}

/** Nothing tolerated yet. */
export function nothingTolerated(): Tolerated {
  return { fortranLine: null, commaLine: null, isCommaSure: false };
}

/** Reads the numbers of lines into a table; the first of each is scaled by `frequencyShift`. */
export class DataLineReader {
  private readonly scanner: DecimalScanner;
  private readonly table: NumberTable;
  private readonly frequencyShift: number;
  readonly tolerated: Tolerated = nothingTolerated();
  /** Where the first line that was not read begins, and how many lines lie before it. */
  next = 0;
  linesBefore = 0;

  constructor(scanner: DecimalScanner, table: NumberTable, frequencyShift: number) {
    this.scanner = scanner;
    this.table = table;
    this.frequencyShift = frequencyShift;
  }

  /**
   * Reads the line that begins at `start` as one row, and so the lines behind it as long as they
   * begin with a number; sets `next` and `linesBefore`. Null on success.
   */
  read(start: number, firstLine: number): Result<never, ReadError> | null {
    const { table } = this;
    const { codes } = this.scanner;
    let line = firstLine;
    let lineStart = start;
    do {
      table.startRow(line, lineStart);
      const fault = this.readRow(lineStart, line);
      if (fault !== null) return fault;
      lineStart = this.next;
      line += 1;
    } while (beginsNumber(codes[lineStart]));
    this.linesBefore = line - 1;
    return null;
  }

  private readRow(start: number, line: number): Result<never, ReadError> | null {
    const { scanner, table } = this;
    const { codes } = scanner;
    let shift = this.frequencyShift;
    let at = start;
    for (;;) {
      const code = codes[at];
      if (code === space || code === tab) {
        at += 1;
        continue;
      }
      if (endsToken(code)) break;
      const value = scanner.read(at, shift);
      if (Number.isNaN(value) || !endsToken(codes[scanner.end])) {
        const odd = this.readOddToken(at, shift, { line, column: at - start + 1 });
        if (!odd.ok) return odd;
        table.push(odd.value);
      } else {
        table.push(value);
      }
      at = scanner.end;
      shift = 0;
    }
    this.next = behindLine(codes, at);
    return null;
  }

  /** A token that is no plain number: what is meant beyond doubt is taken, all else refused. */
  private readOddToken(
    start: number,
    shift: number,
    place: Required<Place>,
  ): Result<number, ReadError> {
    const { tolerated, scanner } = this;
    const { line, column } = place;
    scanner.end = endOfToken(scanner.codes, start);
    const token = scanner.text.slice(start, scanner.end);
    if (/^[+-]?(?:\d+(?:\.\d*)?|\.\d+)[dD][+-]?\d+$/.test(token)) {
      tolerated.fortranLine ??= line;
      return ok(parseDecimal(token.replace(/[dD]/, 'e'), shift));
    }
    if (/^[+-]?\d*,\d+(?:[eE][+-]?\d+)?$/.test(token)) {
      tolerated.commaLine ??= line;
      tolerated.isCommaSure ||= !/^[+-]?[1-9]\d{0,2},\d{3}$/.test(token);
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

/** Blanks, line ends and the mark of a comment. */
function endsToken(code: number): boolean {
  return (
    code <= exclamation &&
    (code === space ||
      code === lineFeed ||
      code === carriageReturn ||
      code === tab ||
      code === exclamation)
  );
}

/** A digit, a sign or a point. */
function beginsNumber(code: number): boolean {
  return (code >= 48 && code <= 57) || code === 45 || code === 46 || code === 43;
}

/** Where the line behind that of `at` begins. */
function behindLine(codes: Uint8Array, start: number): number {
  let at = start;
  while (codes[at] !== lineFeed && codes[at] !== carriageReturn) at += 1;
  return at + (codes[at] === carriageReturn && codes[at + 1] === lineFeed ? 2 : 1);
}

function endOfToken(codes: Uint8Array, start: number): number {
  let at = start;
  while (!endsToken(codes[at])) at += 1;
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

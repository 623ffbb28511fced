import { ok, type Result } from '../../result.ts';
import { DecimalScanner } from '../decimal.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { delimiterChars, isCommentAt, trimBlanks } from './cells.ts';
import type { Frame, PlacedColumn } from './frame.ts';
import { NumberColumns } from './number-columns.ts';
import { readOddCell } from './odd-cell.ts';
import { decimalShift } from './quantities.ts';
import type { TableText } from './table-text.ts';

const space = 32;
const tab = 9;
const lineFeed = 10;
const carriageReturn = 13;

export interface ReadRows {
  readonly rows: NumberColumns;
  readonly assumptions: readonly Assumption[];
}

/**
 * Reads the numbers of the mapped columns, scaled to Hz, ohm, siemens and fractions; NaN where a
 * cell says that there is none. Errors: `row_width`, `not_a_number` and its kin, `too_many_points`.
 */
export function readRows(
  table: TableText,
  frame: Frame,
  columns: readonly PlacedColumn[],
  maxPoints: number,
): Result<ReadRows, ReadError> {
  return new RowReader(table, frame, columns, maxPoints).read();
}

type Fault = Result<never, ReadError> | null;

class RowReader {
  private readonly table: TableText;
  private readonly text: string;
  private readonly scanner: DecimalScanner;
  private readonly columns: readonly PlacedColumn[];
  private readonly width: number;
  private readonly maxPoints: number;
  private readonly delimiter: number;
  private readonly isBlanks: boolean;
  /** For each column of a row: which mapped column it is (-1: none), and its decimal shift. */
  private readonly slotOf: Int32Array;
  private readonly shiftOf: Int32Array;
  private readonly rows: NumberColumns;
  private at: number;
  private lineStart: number;
  private line: number;
  private fortranLine = 0;

  constructor(table: TableText, frame: Frame, columns: readonly PlacedColumn[], maxPoints: number) {
    this.table = table;
    this.text = table.text;
    this.scanner = new DecimalScanner(table.text);
    this.columns = columns;
    this.width = frame.width;
    this.maxPoints = maxPoints;
    this.delimiter = delimiterChars[table.delimiter].charCodeAt(0);
    this.isBlanks = table.delimiter === 'blanks';
    this.slotOf = new Int32Array(frame.width).fill(-1);
    this.shiftOf = new Int32Array(frame.width);
    for (const [slot, { address, unit }] of columns.entries()) {
      this.slotOf[address - 1] = slot;
      this.shiftOf[address - 1] = decimalShift(unit);
    }
    const firstRow = Math.max(4, this.scanner.codes.indexOf(lineFeed, frame.start) - frame.start);
    const expected = Math.ceil((1.1 * (table.text.length - frame.start)) / firstRow) + 8;
    this.rows = new NumberColumns(columns.length, Math.min(expected, maxPoints + 1));
    this.at = frame.start;
    this.lineStart = frame.start;
    this.line = frame.line;
  }

  read(): Result<ReadRows, ReadError> {
    const { text, table } = this;
    while (this.at < text.length) {
      this.readPlainRows();
      if (this.at >= text.length) break;
      this.skipBlanks();
      const code = text.charCodeAt(this.at);
      if (this.at < text.length && code !== lineFeed && code !== carriageReturn) {
        const fault = isCommentAt(text, this.at, table.delimiter)
          ? this.skipLine()
          : this.readRow();
        if (fault !== null) return fault;
      }
      this.endLine();
    }
    const detail = 'Exponents written with D were read as powers of ten.';
    const assumptions =
      this.fortranLine === 0 ? [] : [{ code: 'fortran_exponent', detail, line: this.fortranLine }];
    return ok({ rows: this.rows, assumptions });
  }

  /**
   * The fast way through rows that are as wide as they should be, all their mapped cells plain
   * numbers. Stops at the start of the first line that is anything else.
   */
  private readPlainRows(): void {
    const { scanner, text, width, slotOf, shiftOf, delimiter, isBlanks, rows } = this;
    // Behind the text stand line feeds, so that every line has an end.
    const { codes } = scanner;
    let at = this.at;
    while (at < text.length && rows.count < this.maxPoints) {
      rows.makeRoom();
      const { values, cellStart, count } = rows;
      for (let column = 0; column < width; column++) {
        const slot = slotOf[column];
        while (codes[at] === space) at += 1;
        if (slot >= 0) {
          const value = scanner.read(at, shiftOf[column]);
          if (Number.isNaN(value)) return;
          values[slot][count] = value;
          cellStart[slot][count] = at;
          at = scanner.end;
          if (!isBlanks) while (codes[at] === space) at += 1;
        } else {
          while (codes[at] !== delimiter && !isLineEnd(codes[at])) {
            if (isBlanks && codes[at] === tab) break;
            at += 1;
          }
        }
        if (column === width - 1) {
          if (!isLineEnd(codes[at])) return;
        } else if (codes[at] === delimiter) at += 1;
        else return;
      }
      rows.line[count] = this.line;
      rows.count = count + 1;
      at += codes[at] === carriageReturn && codes[at + 1] === lineFeed ? 2 : 1;
      this.at = at;
      this.lineStart = at;
      this.line += 1;
    }
  }

  private skipBlanks(): void {
    const { text, delimiter } = this;
    let code = text.charCodeAt(this.at);
    while (code === space || (code === tab && delimiter !== tab)) {
      code = text.charCodeAt(++this.at);
    }
  }

  private skipLine(): null {
    this.at = this.endOfLine();
    return null;
  }

  private endOfLine(): number {
    const { text } = this;
    let at = this.at;
    while (at < text.length) {
      const code = text.charCodeAt(at);
      if (code === lineFeed || code === carriageReturn) break;
      at += 1;
    }
    return at;
  }

  private endLine(): void {
    const { text } = this;
    if (text.charCodeAt(this.at) === carriageReturn && text.charCodeAt(this.at + 1) === lineFeed) {
      this.at += 1;
    }
    this.at += 1;
    this.lineStart = this.at;
    this.line += 1;
  }

  /** Reads the cells of one row, from the first that is no blank to the end of its line. */
  private readRow(): Fault {
    const { rows, text, isBlanks, width } = this;
    if (rows.count === this.maxPoints) return this.tooMany();
    rows.makeRoom();
    rows.line[rows.count] = this.line;
    let column = 0;
    for (;;) {
      const slot = column < width ? this.slotOf[column] : -1;
      if (slot < 0) this.skipCell();
      else {
        const fault = this.readCell(slot, this.shiftOf[column]);
        if (fault !== null) return fault;
      }
      column += 1;
      const code = text.charCodeAt(this.at);
      const isEnd = this.at >= text.length || code === lineFeed || code === carriageReturn;
      if (isEnd) break;
      if (!isBlanks) {
        this.at += 1;
        this.skipBlanks();
      }
    }
    const isTrailing = column === width + 1 && this.endsInDelimiter();
    if (column !== width && !isTrailing) return this.wrongWidth(column);
    rows.count += 1;
    return null;
  }

  /** Moves to what ends the cell: a delimiter, the next cell (between blanks) or the line's end. */
  private skipCell(): void {
    const { text, delimiter, isBlanks } = this;
    let at = this.at;
    while (at < text.length) {
      const code = text.charCodeAt(at);
      if (code === delimiter || code === lineFeed || code === carriageReturn) break;
      if (isBlanks && code === tab) break;
      at += 1;
    }
    this.at = at;
    if (isBlanks) this.skipBlanks();
  }

  private readCell(slot: number, shift: number): Fault {
    const { scanner, text, rows, delimiter } = this;
    const start = this.at;
    const value = scanner.read(start, shift);
    let end = scanner.end;
    let code = text.charCodeAt(end);
    const isBlankAfter = code === space || code === tab;
    while (code === space || (code === tab && delimiter !== tab)) code = text.charCodeAt(++end);
    rows.cellStart[slot][rows.count] = start;
    const isEnded =
      code === delimiter ||
      code === lineFeed ||
      code === carriageReturn ||
      (this.isBlanks && isBlankAfter) ||
      end >= text.length;
    if (isEnded && !Number.isNaN(value)) {
      rows.values[slot][rows.count] = value;
      this.at = end;
      return null;
    }
    return this.readOdd(slot, start);
  }

  private readOdd(slot: number, start: number): Fault {
    this.skipCell();
    const { table, rows, line } = this;
    const cell = trimBlanks(this.text.slice(start, this.at));
    const shown = table.shown.slice(start, start + cell.length);
    const place = table.isInPlace ? { line, column: start - this.lineStart + 1 } : { line };
    const odd = readOddCell(cell, shown, this.columns[slot], place);
    if (!odd.ok) return odd;
    rows.values[slot][rows.count] = odd.value.value;
    if (odd.value.isFortran && this.fortranLine === 0) this.fortranLine = line;
    return null;
  }

  /** Whether the last cell of the row is empty. */
  private endsInDelimiter(): boolean {
    const { text } = this;
    let at = this.at - 1;
    while (text.charCodeAt(at) === space) at -= 1;
    return text.charCodeAt(at) === this.delimiter;
  }

  private wrongWidth(found: number): Fault {
    const { line, width } = this;
    const detail = `Line ${line} has ${found} cells where the rows before have ${width}.`;
    const remedy =
      'Complete or remove the line: rows of numbers must be alike, and nothing may stand behind them.';
    return refuse('row_width', detail, remedy, { line });
  }

  private tooMany(): Fault {
    const { line, maxPoints } = this;
    const detail = `The file has more than ${maxPoints} points.`;
    return refuse('too_many_points', detail, 'Sweep with fewer points.', { line });
  }
}

function isLineEnd(code: number): boolean {
  return code === lineFeed || code === carriageReturn;
}

import { ok, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { LineWalker } from '../touchstone/file-lines.ts';
import { beginsNumeric, cellsOf, isCommentAt, looksNumeric, saysNoNumber } from './cells.ts';
import type { ColumnMapping, MappedColumn } from './mapping.ts';
import type { Quantity } from './quantities.ts';
import type { TableText } from './table-text.ts';

/** A line before the rows of numbers. */
export interface HeadLine {
  readonly cells: readonly string[];
  readonly line: number;
  /** Whether it stood behind a comment mark, which is removed. */
  readonly isComment: boolean;
}

/** Where the rows of numbers begin, how wide they are, and what stands before. */
export interface Frame {
  readonly head: readonly HeadLine[];
  /** Place in the text and one-based line of the first row. */
  readonly start: number;
  readonly line: number;
  readonly width: number;
}

/** A mapping whose header texts were found: every address is a column number. */
export interface PlacedColumn extends MappedColumn {
  readonly address: number;
}

/** Which of the columns holds a quantity. */
export function slotOf(columns: readonly PlacedColumn[], quantity: Quantity): number {
  return columns.findIndex((column) => column.quantity === quantity);
}

export interface PlacedFrame extends Frame {
  readonly columns: readonly PlacedColumn[];
}

/** A line of names may be followed by one of units and some comments. */
const mostHeadersLooked = 5;

/** Lines kept from before the rows: enough for every header, and an end to hostile text. */
const mostHeadLines = 1000;

/** Goes through the lines before the rows until one is a row. */
class HeadReader {
  readonly head: HeadLine[] = [];
  readonly walker: LineWalker;
  private readonly table: TableText;
  private readonly text: string;

  constructor(table: TableText) {
    this.table = table;
    this.text = table.text;
    this.walker = new LineWalker(table.text);
  }

  /** The cells of the next line with ink, numbers in plain form; null behind the last. */
  next(): readonly string[] | null {
    const { walker, text, table } = this;
    while (walker.advance()) {
      const ink = walker.firstInk();
      if (ink === walker.end) continue;
      if (!isCommentAt(text, ink, table.delimiter)) {
        return cellsOf(text.slice(walker.start, walker.end), table.delimiter);
      }
      const bare = table.shown.slice(ink, walker.end).replace(/^(?:[#!%;]+|\/\/)/, '');
      this.keep(bare, true);
    }
    return null;
  }

  /** Keeps the line just given as one before the rows. */
  pass(): void {
    const { walker, table } = this;
    this.keep(table.shown.slice(walker.start, walker.end), false);
  }

  frame(width: number): Frame {
    const { walker, head } = this;
    return { head, start: walker.start, line: walker.number, width };
  }

  private keep(line: string, isComment: boolean): void {
    if (this.head.length >= mostHeadLines) return;
    const cells = cellsOf(line, this.table.delimiter);
    this.head.push({ cells, line: this.walker.number, isComment });
  }
}

/**
 * Finds the rows that a mapping speaks of: header texts first, then the first line whose frequency
 * cell is a number. Errors: `header_not_found`, `header_twice`, `row_width`, `no_points`.
 */
export function frameByMapping(
  table: TableText,
  mapping: ColumnMapping,
): Result<PlacedFrame, ReadError> {
  const reader = new HeadReader(table);
  let columns = placeByNumber(mapping);
  for (let cells = reader.next(); cells !== null; cells = reader.next()) {
    const at = { line: reader.walker.number };
    if (columns === null) {
      const placed = placeByHeader(mapping, reader.head);
      if (!placed.ok) return placed;
      columns = placed.value;
    }
    if (columns === null) {
      if (isAllNumbers(cells)) return headerNotFound(mapping, reader.head, at.line);
      reader.pass();
      continue;
    }
    const width = widthFor(mapping, columns, cells);
    if (width !== null && isRow(cells, columns)) return ok({ ...reader.frame(width), columns });
    if (isAllNumbers(cells)) return wrongWidth(mapping, columns, cells.length, at.line);
    reader.pass();
  }
  if (columns === null) return headerNotFound(mapping, reader.head, 1);
  const detail = 'No line has a number where the mapping says that the frequency stands.';
  const remedy = 'Check the column of the frequency in `columns`, and the delimiter.';
  return refuse('no_points', detail, remedy, { line: Math.max(1, reader.walker.number) });
}

function placeByNumber({ columns }: ColumnMapping): readonly PlacedColumn[] | null {
  const placed: PlacedColumn[] = [];
  for (const column of columns) {
    const { address } = column;
    if (typeof address === 'string') return null;
    placed.push({ ...column, address });
  }
  return placed;
}

/** Places the header texts in the last line of the head; null if not all of them stand there. */
function placeByHeader(
  { columns }: ColumnMapping,
  head: readonly HeadLine[],
): Result<readonly PlacedColumn[] | null, ReadError> {
  for (const { cells, line } of head.slice(-mostHeadersLooked)) {
    const placed: PlacedColumn[] = [];
    for (const column of columns) {
      const { address } = column;
      if (typeof address === 'number') {
        placed.push({ ...column, address });
        continue;
      }
      const at = cells.indexOf(address);
      if (at < 0) break;
      if (cells.indexOf(address, at + 1) >= 0) return headerTwice(address, line);
      placed.push({ ...column, address: at + 1 });
    }
    if (placed.length === columns.length) return clash(placed, line) ?? ok(placed);
  }
  return ok(null);
}

function clash(placed: readonly PlacedColumn[], line: number): Result<never, ReadError> | null {
  const numbers = placed.map(({ address }) => address);
  const twice = numbers.find((number, i) => numbers.indexOf(number) !== i);
  if (twice === undefined) return null;
  const detail = `Column ${twice} is mapped by its number and by its header.`;
  return refuse('columns_twice', detail, 'Give each column once.', { line });
}

function headerTwice(header: string, line: number): Result<never, ReadError> {
  const detail = `The header \`${header}\` stands more than once on line ${line}.`;
  return refuse('header_twice', detail, 'Address that column by its number.', { line });
}

function headerNotFound(
  { columns }: ColumnMapping,
  head: readonly HeadLine[],
  line: number,
): Result<never, ReadError> {
  const wanted = columns.flatMap(({ address }) => (typeof address === 'string' ? [address] : []));
  const last = head.at(-1)?.cells.join(' | ').slice(0, 200);
  const found = last === undefined ? 'no line of text' : `\`${last}\``;
  const detail = `No line before the rows has the headers ${wanted.map((text) => `\`${text}\``).join(', ')}; the last line of text found is ${found}.`;
  const remedy = 'Write the headers exactly as in the file, or address the columns by number.';
  return refuse('header_not_found', detail, remedy, { line });
}

/** The width of rows if a line has a fitting one, a trailing delimiter not counted. */
function widthFor(
  { width }: ColumnMapping,
  columns: readonly PlacedColumn[],
  cells: readonly string[],
): number | null {
  if (width === null) {
    return columns.every(({ address }) => address <= cells.length) ? cells.length : null;
  }
  const isTrailing = cells.length === width + 1 && cells[width] === '';
  return cells.length === width || isTrailing ? width : null;
}

/**
 * Whether a line is a row: its frequency is a number, or sets out to be one, or is missing beside
 * numbers. A faulty first row must be refused, not taken for a line of names.
 */
function isRow(cells: readonly string[], columns: readonly PlacedColumn[]): boolean {
  const [frequency = ''] = columns.flatMap(({ quantity, address }) =>
    quantity === 'frequency' ? [cells[address - 1]] : [],
  );
  if (beginsNumeric(frequency)) return true;
  return saysNoNumber(frequency) && columns.some(({ address }) => looksNumeric(cells[address - 1]));
}

function isAllNumbers(cells: readonly string[]): boolean {
  return cells.length > 1 && cells.every(looksNumeric);
}

function wrongWidth(
  { width }: ColumnMapping,
  columns: readonly PlacedColumn[],
  found: number,
  line: number,
): Result<never, ReadError> {
  const wanted = width ?? Math.max(...columns.map(({ address }) => address));
  const detail = `Line ${line} has ${found} cells; the mapping ${width === null ? 'reaches to column' : 'lists'} ${wanted}.`;
  const remedy =
    found > wanted
      ? 'List every column, with `skip` for those that are not to be read; or name the delimiter.'
      : 'List as many columns as the rows have; or name the delimiter and the decimal mark.';
  return refuse('row_width', detail, remedy, { line });
}

/**
 * Finds the rows without a mapping: lines of the commonest width of the sampled rows, numbers where
 * those have numbers.
 */
export function frameByNumbers(
  table: TableText,
  sample: readonly (readonly string[])[],
): Frame | null {
  const rows = sample.filter((cells) => cells.filter(looksNumeric).length >= 2);
  const width = commonestWidth(rows);
  const fitting = rows.filter((cells) => cells.length === width);
  const numeric = Array.from({ length: width }, (_, i) => i).filter((i) => {
    const numbers = fitting.filter((cells) => isNumberOrNothing(cells[i])).length;
    return numbers >= 0.9 * fitting.length;
  });
  const reader = new HeadReader(table);
  for (let cells = reader.next(); cells !== null; cells = reader.next()) {
    if (cells.length === width && isRowAmong(cells, numeric)) {
      const isTrailing = cells[width - 1] === '' && fitting.every((one) => one[width - 1] === '');
      return reader.frame(isTrailing ? width - 1 : width);
    }
    reader.pass();
  }
  return null;
}

/** Whether a line has numbers in most of the columns that have them, or sets out with one. */
function isRowAmong(cells: readonly string[], numeric: readonly number[]): boolean {
  if (!cells.some(looksNumeric)) return false;
  const numbers = numeric.filter((i) => isNumberOrNothing(cells[i])).length;
  return numbers > numeric.length / 2 || beginsNumeric(cells[numeric[0]]);
}

function isNumberOrNothing(cell: string): boolean {
  return looksNumeric(cell) || saysNoNumber(cell);
}

function commonestWidth(rows: readonly (readonly string[])[]): number {
  const counts = new Map<number, number>();
  for (const { length } of rows) counts.set(length, (counts.get(length) ?? 0) + 1);
  return [...counts].reduce((best, one) => (one[1] > best[1] ? one : best), [0, 0])[0];
}

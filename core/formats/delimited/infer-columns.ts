import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { cellsOf } from './cells.ts';
import { type ColumnGuess, guessColumn, likelyFrequencyUnits } from './column-guess.ts';
import { confirmGuesses } from './confirm-guesses.ts';
import { type Dialect, findDialect, sampleRows } from './dialect.ts';
import { formatColumns } from './format-columns.ts';
import { type Frame, frameByNumbers, type HeadLine, type PlacedColumn } from './frame.ts';
import { isUnitRow, readHeader } from './header-words.ts';
import type { ColumnMapping } from './mapping.ts';
import type { NumberColumns } from './number-columns.ts';
import { readRows } from './read-rows.ts';
import { assumeDecimalComma, type TableText, tableText } from './table-text.ts';

export interface Inference {
  readonly mapping: ColumnMapping;
  readonly assumptions: readonly Assumption[];
}

/** A table without a mapping, framed, with the header that stands over it. */
interface Unmapped {
  readonly table: TableText;
  readonly dialect: Dialect;
  readonly frame: Frame;
  readonly header: Header;
}

interface Header {
  readonly names: readonly string[];
  readonly units: readonly string[];
  /** One-based line; null if there is no header. */
  readonly line: number | null;
}

/**
 * Takes the meaning of the columns from the header, where every column that is used has quantity
 * and unit written there or confirmed by recomputing one column from others. Anything less is the
 * error `columns_to_confirm`, with a proposal, the evidence and the first rows.
 */
export function inferColumns(text: string, maxPoints: number): Result<Inference, ReadError> {
  const unmapped = frameUnmapped(text);
  if (!unmapped.ok) return unmapped;
  const { table, frame, header } = unmapped.value;
  const named = columnsByName(header);
  const read = readRows(table, frame, named, maxPoints);
  if (!read.ok) return read;
  const { rows } = read.value;
  const guesses = withoutTwins(
    header.names.map((name, i) => {
      const slot = named.findIndex(({ address }) => address === i + 1);
      const values = slot < 0 ? new Float64Array(0) : rows.values[slot].slice(0, rows.count);
      return guessColumn(name, header.units[i], values);
    }),
  );
  const confirmed = confirmGuesses(table, frame, guesses, maxPoints);
  const { columns, referenceOhm, evidence, isCertain } = confirmed;
  const base = { width: frame.width, referenceOhm, delimiter: null };
  if (isCertain && header.line !== null) {
    const mapping = { ...base, columns, decimal: null };
    return ok({ mapping, assumptions: inferredAssumptions(mapping, evidence, header.line) });
  }
  const decimal = unmapped.value.dialect.decimal === 'comma' ? 'comma' : null;
  const proposal: ColumnMapping = {
    ...base,
    columns: withFrequency(columns, unmapped.value, maxPoints),
    decimal,
  };
  return toConfirm(proposal, [...headerEvidence(header), ...evidence], unmapped.value);
}

function frameUnmapped(text: string): Result<Unmapped, ReadError> {
  const dialect = findDialect(text, { delimiter: null, decimal: null });
  if (!dialect.ok) return dialect;
  const table = tableText(text, dialect.value);
  if (!table.ok) return table;
  const frame = frameByNumbers(table.value, sampleRows(text, dialect.value));
  if (frame === null) {
    const detail = 'No line is a row of a frequency and other numbers.';
    const remedy = 'Send one row for each frequency, and say by `columns` what the columns hold.';
    return refuse('no_points', detail, remedy, { line: 1 });
  }
  if (dialect.value.decimal === 'comma') {
    const commas = assumeDecimalComma(table.value, frame.start, frame.line);
    if (!commas.ok) return commas;
  }
  const header = headerOf(frame);
  return ok({ table: table.value, dialect: dialect.value, frame, header });
}

/** The last line of names as wide as the rows, with a row of units under it if there is one. */
function headerOf({ head, width }: Frame): Header {
  const wide = head.flatMap((line) => {
    const cells = fittedCells(line, width);
    return cells === null ? [] : [{ ...line, cells }];
  });
  const last = wide.at(-1);
  const before = wide.at(-2);
  const blank = new Array<string>(width).fill('');
  if (last === undefined) return { names: blank, units: blank, line: null };
  const isUnits = before !== undefined && isUnitRow(last.cells) && !isUnitRow(before.cells);
  if (isUnits) return { names: before.cells, units: last.cells, line: before.line };
  return { names: last.cells, units: blank, line: last.line };
}

function fittedCells({ cells }: HeadLine, width: number): readonly string[] | null {
  const isTrailing = cells.length === width + 1 && cells[width] === '';
  return cells.length === width || isTrailing ? cells.slice(0, width) : null;
}

/** The columns whose names are known, units left aside. */
function columnsByName({ names, units }: Header): PlacedColumn[] {
  return names.flatMap((name, i) => {
    const quantity = name === '' ? null : readHeader(name, units[i]).quantity;
    return quantity === null ? [] : [{ address: i + 1, quantity, unit: null }];
  });
}

/** Of two columns for one quantity the second is not read, and neither is certain. */
function withoutTwins(guesses: readonly ColumnGuess[]): ColumnGuess[] {
  return guesses.map((guess, i) => {
    const twin = guesses.findIndex(
      (one, j) => j !== i && one.quantity !== null && one.quantity === guess.quantity,
    );
    if (twin < 0) return guess;
    const doubt = { kind: 'other' as const, why: `column ${twin + 1} seems to hold the same` };
    const doubts = [...guess.doubts, doubt];
    return { ...guess, doubts, quantity: twin < i ? null : guess.quantity };
  });
}

function inferredAssumptions(
  mapping: ColumnMapping,
  evidence: readonly string[],
  line: number,
): Assumption[] {
  const detail = `No mapping was given: the columns were read as \`${formatColumns(mapping)}\`. ${evidence.join(' ')}`;
  return [{ code: 'columns_inferred', detail, line }];
}

function headerEvidence({ line }: Header): string[] {
  return [
    line === null ? 'No line of names stands over the rows.' : `The names stand on line ${line}.`,
  ];
}

/** A proposal must have a frequency: failing a name, the first column that rises or falls. */
function withFrequency(
  columns: readonly PlacedColumn[],
  { table, frame }: Unmapped,
  maxPoints: number,
): readonly PlacedColumn[] {
  if (columns.some(({ quantity }) => quantity === 'frequency')) return columns;
  const taken = columns.map(({ address }) => address);
  const first = Array.from({ length: frame.width }, (_, i) => i + 1).find(
    (address) => !taken.includes(address),
  );
  const address = first ?? 1;
  const read = readRows(table, frame, [{ address, quantity: 'frequency', unit: null }], maxPoints);
  const unit = read.ok ? likelyFrequencyUnits(valuesOf(read.value.rows))[0] : undefined;
  const others = columns.filter((column) => column.address !== address);
  return [{ address, quantity: 'frequency', unit: unit ?? 'MHz' }, ...others];
}

function valuesOf(rows: NumberColumns): Float64Array {
  return rows.values[0].subarray(0, rows.count);
}

const shownRows = 5;

function toConfirm(
  proposal: ColumnMapping,
  evidence: readonly string[],
  { table, frame, header }: Unmapped,
): Result<never, ReadError> {
  const rest = table.shown.slice(frame.start, frame.start + 20_000);
  const lines = rest.split(/\r\n|\r|\n/).filter((line) => line.trim() !== '');
  const firstRows = lines
    .slice(0, shownRows)
    .map((line) => cellsOf(line, table.delimiter).slice(0, frame.width));
  return {
    ok: false,
    error: {
      code: 'columns_to_confirm',
      detail: 'What the columns hold is not certain.',
      remedy:
        'Look at the proposal, put right what is wrong (`skip` is a column that is not read), and send it as `columns` with the file.',
      line: header.line ?? frame.line,
      proposal: { columns: formatColumns(proposal), evidence, firstRows },
    },
  };
}

import { ok, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { LineWalker } from '../touchstone/file-lines.ts';
import { cellsOf, commasToPoints, isCommentAt, looksNumeric, saysNoNumber } from './cells.ts';
import type { DecimalMark, Delimiter } from './mapping.ts';
import { unquote } from './unquoted.ts';

/** How a delimited text is written. */
export interface Dialect {
  readonly delimiter: Delimiter;
  readonly decimal: DecimalMark;
  readonly hasQuotes: boolean;
}

type Told = { readonly [Part in 'delimiter' | 'decimal']: Dialect[Part] | null };

/** A text of this length is looked at as a whole, of a longer one parts from its middle and end. */
const wholeLength = 4000;
const partLength = 1000;

const delimiters: readonly Delimiter[] = ['semicolon', 'tab', 'comma', 'blanks'];

/** A runner-up with more than this share of the winner's score leaves the choice open. */
const tooClose = 0.8;

/**
 * Finds delimiter and decimal mark together: the pair under which the sampled rows are rows of
 * numbers. What was told is not doubted. A tie is `dialect_ambiguous`, never a guess; no row of
 * numbers under any pair is `no_points`.
 */
export function findDialect(text: string, told: Told): Result<Dialect, ReadError> {
  const hasQuotes = text.includes('"');
  const delimiter = told.delimiter ?? announcedDelimiter(text);
  if (delimiter !== null && told.decimal !== null) {
    return ok({ delimiter, decimal: told.decimal, hasQuotes });
  }
  const sample = sampleOf(text);
  const possible = candidates(sample, { delimiter, decimal: told.decimal }, hasQuotes);
  const [only] = possible;
  if (only !== undefined && possible.length === 1) return ok(settled(only, sample, text, told));
  const scored = possible
    .map((dialect) => ({ dialect, score: scoreOf(sample, dialect) }))
    .filter(({ score }) => score > 0)
    .sort((a, b) => b.score - a.score);
  const [best] = scored;
  if (best === undefined) return noRows();
  const rival = scored.find(
    ({ dialect, score }) =>
      dialect.delimiter !== best.dialect.delimiter && score > tooClose * best.score,
  );
  if (rival !== undefined) return ambiguous(best.dialect, rival.dialect);
  return ok(settled(best.dialect, sample, text, told));
}

/** Where no sampled number has a fraction the rest of the text decides; if none has, none matters. */
function settled(
  dialect: Dialect,
  sample: readonly string[],
  text: string,
  { decimal }: Told,
): Dialect {
  const isOpen = decimal === null && dialect.delimiter !== 'comma';
  if (!isOpen || sample.some((line) => /\d[.,]\d/.test(line))) return dialect;
  return { ...dialect, decimal: text.includes(',') && !/\d\.\d/.test(text) ? 'comma' : 'point' };
}

/** A first line `sep=;`, which spreadsheets write and obey. */
function announcedDelimiter(text: string): Delimiter | null {
  const announced = /^"?sep=([,;\t])"?[ \t]*(?:\r|\n|$)/i.exec(text.slice(0, 20))?.[1];
  if (announced === undefined) return null;
  if (announced === ',') return 'comma';
  return announced === ';' ? 'semicolon' : 'tab';
}

/** Lines without comments, from where the rows must be: the middle and the end of the text. */
function sampleOf(text: string): string[] {
  if (text.length <= wholeLength) return linesOf(text);
  const middle = (text.length - partLength) >> 1;
  return [
    ...wholeLinesOf(text, middle, middle + partLength),
    ...wholeLinesOf(text, text.length - partLength, text.length),
  ];
}

/** Lines that lie wholly in a part of the text; the part itself where it lies in one long line. */
function wholeLinesOf(text: string, start: number, end: number): string[] {
  const part = text.slice(start, end);
  const first = part.search(/[\r\n]/);
  if (first < 0) return [part];
  const last = Math.max(part.lastIndexOf('\n'), part.lastIndexOf('\r'));
  return linesOf(part.slice(first, end === text.length ? undefined : last));
}

function linesOf(text: string): string[] {
  const walker = new LineWalker(text);
  const lines: string[] = [];
  while (walker.advance()) {
    const ink = walker.firstInk();
    if (ink === walker.end || isCommentAt(text, ink, null)) continue;
    lines.push(text.slice(walker.start, walker.end));
  }
  return lines;
}

function candidates(sample: readonly string[], told: Told, hasQuotes: boolean): Dialect[] {
  const found: Dialect[] = [];
  const hasTab = sample.some((line) => line.includes('\t'));
  const isPresent: Readonly<Record<Delimiter, boolean>> = {
    semicolon: sample.some((line) => line.includes(';')),
    tab: hasTab,
    comma: sample.some((line) => line.includes(',')),
    blanks: sample.some((line) => /\S[ \t]/.test(line.trimEnd())),
  };
  for (const delimiter of delimiters) {
    if (told.delimiter === null ? !isPresent[delimiter] : told.delimiter !== delimiter) continue;
    for (const decimal of ['point', 'comma'] as const) {
      if (told.decimal !== null && told.decimal !== decimal) continue;
      if (decimal === 'comma' && delimiter === 'comma' && !hasQuotes) continue;
      if (decimal === 'comma' && !isPresent.comma && told.decimal === null) continue;
      found.push({ delimiter, decimal, hasQuotes });
    }
  }
  return withoutBlanksBesideTabs(sample, found);
}

/** Tabs are blanks too: where they part the numbers as well, single blanks are not asked. */
function withoutBlanksBesideTabs(sample: readonly string[], found: Dialect[]): Dialect[] {
  const bestOf = (delimiter: Delimiter) =>
    found
      .filter((dialect) => dialect.delimiter === delimiter)
      .reduce((best, dialect) => Math.max(best, scoreOf(sample, dialect)), 0);
  const isMixed = ['tab', 'blanks'].every((one) =>
    found.some(({ delimiter }) => delimiter === one),
  );
  if (!isMixed || bestOf('tab') < bestOf('blanks')) return found;
  return found.filter(({ delimiter }) => delimiter !== 'blanks');
}

/** A row of numbers alone counts one; a row with other cells counts half the share of numbers. */
function scoreOf(sample: readonly string[], dialect: Dialect): number {
  let score = 0;
  for (const cells of rowsOf(sample, dialect)) {
    if (cells.length < 2) continue;
    let numbers = 0;
    let nothings = 0;
    for (const cell of cells) {
      if (looksNumeric(cell)) numbers += 1;
      else if (saysNoNumber(cell)) nothings += 1;
    }
    if (numbers === 0) continue;
    score += numbers + nothings === cells.length ? 1 : numbers / cells.length / 2;
  }
  return score;
}

/** The cells of a sample of the lines of a text. */
export function sampleRows(text: string, dialect: Dialect): readonly string[][] {
  return rowsOf(sampleOf(text), dialect);
}

/** The cells of lines under a dialect, decimals written with a point. */
function rowsOf(lines: readonly string[], dialect: Dialect): readonly string[][] {
  const { delimiter, decimal, hasQuotes } = dialect;
  const isQuoted = hasQuotes && lines.some((line) => line.includes('"'));
  const unquoted = isQuoted ? unquote(lines.join('\n'), delimiter) : null;
  // A sample may end inside a quoted cell: then the quotes are passed over.
  const cells =
    unquoted?.ok === true
      ? unquoted.value.split('\n').map((line) => cellsOf(line, 'tab'))
      : lines.map((line) => cellsOf(line.replaceAll('"', ''), delimiter));
  if (decimal === 'point') return cells;
  return cells.map((row) => row.map(commasToPoints));
}

function noRows(): Result<never, ReadError> {
  return refuse(
    'no_points',
    'The text has no row with a frequency and a value under any delimiter.',
    'Send one row for each frequency, its numbers parted by commas, semicolons, tabs or blanks.',
    { line: 1 },
  );
}

function ambiguous(one: Dialect, other: Dialect): Result<never, ReadError> {
  const written = ({ delimiter, decimal }: Dialect) => `${delimiter} with decimal ${decimal}`;
  return refuse(
    'dialect_ambiguous',
    `The rows can be read as delimited by ${written(one)} or by ${written(other)}.`,
    `Say which by \`columns\`: add \`delimiter=${one.delimiter},decimal=${one.decimal}\` or \`delimiter=${other.delimiter},decimal=${other.decimal}\`.`,
    { line: 1 },
  );
}

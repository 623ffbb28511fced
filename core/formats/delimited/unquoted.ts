import { parse } from 'csv-parse/browser/esm/sync';
import { fail, ok, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';
import { refuse } from '../touchstone/faults.ts';
import { cellsOf, delimiterChars, isCommentAt, trimBlanks } from './cells.ts';
import type { Delimiter } from './mapping.ts';

/** The parser of quoted text is careful and slow: it gets this many characters at most. */
const mostQuoted = 4 * 1024 * 1024;

/**
 * Rewrites a text in which cells are quoted (RFC 4180: quotes around, a quote inside doubled) as
 * one without quotes, its cells parted by tabs, each on its own line number. A quote inside an
 * unquoted cell is a character like any other.
 */
export function unquote(text: string, delimiter: Delimiter): Result<string, ReadError> {
  const lines = text.split(/\r\n|\r|\n/);
  const quoted = quotedLines(lines, delimiter);
  const passed = quoted.map((index) => lines[index]).join('\n');
  if (passed.length > mostQuoted) {
    const detail = `The file has ${passed.length} characters in lines with quotes; at most ${mostQuoted} are read.`;
    return refuse('too_much_quoted', detail, 'Export the file without quotes around numbers.');
  }
  const records = recordsOf(passed, delimiter);
  if (!records.ok) {
    const line = (quoted[records.error - 1] ?? 0) + 1;
    const detail = `A quoted cell is not closed before the end of the file (line ${line}).`;
    return refuse('quote_not_closed', detail, 'Close it by a double quote, or remove the quotes.', {
      line,
    });
  }
  const plain = lines.map((line) => cellsOf(line, delimiter).join('\t'));
  for (const index of quoted) plain[index] = '';
  for (const { cells, line } of records.value)
    plain[quoted[line - 1]] = cells.map(inOneCell).join('\t');
  return ok(plain.join('\n'));
}

/** Indexes of the lines that quotes reach: those that have one, and those inside a quoted cell. */
function quotedLines(lines: readonly string[], delimiter: Delimiter): number[] {
  const indexes: number[] = [];
  let isOpen = false;
  for (const [index, line] of lines.entries()) {
    const hasQuote = line.includes('"');
    if (!isOpen && (!hasQuote || isCommentAt(line, line.search(/[^ \t]/), delimiter))) continue;
    indexes.push(index);
    if (hasQuote && (line.split('"').length - 1) % 2 === 1) isOpen = !isOpen;
  }
  return indexes;
}

function inOneCell(cell: string): string {
  return trimBlanks(cell.replace(/[\t\r\n]+/g, ' '));
}

interface QuotedRecord {
  readonly cells: readonly string[];
  /** One-based line on which it ends. */
  readonly line: number;
}

/** The records, or the one-based line at fault. */
function recordsOf(text: string, delimiter: Delimiter): Result<readonly QuotedRecord[], number> {
  const isBlanks = delimiter === 'blanks';
  try {
    const records: unknown[] = parse(text, {
      delimiter: isBlanks ? [' ', '\t'] : delimiterChars[delimiter],
      record_delimiter: '\n',
      relax_column_count: true,
      relax_quotes: true,
      trim: !isBlanks,
      info: true,
    });
    return ok(records.map((one) => recordOf(one, isBlanks)));
  } catch (error) {
    return fail(error instanceof Error && 'lines' in error ? Number(error.lines) : 1);
  }
}

/** With `info` the parser gives each record together with where it stands. */
function recordOf(one: unknown, isBlanks: boolean): QuotedRecord {
  const { record, info } = one as { record: string[]; info: { lines: number } };
  return { cells: isBlanks ? record.filter((cell) => cell !== '') : record, line: info.lines };
}

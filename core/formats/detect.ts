import { fail, ok, type Result } from '../result.ts';
import { parseDecimal } from './decimal.ts';
import { saysNoNumber } from './delimited/cells.ts';
import type { FileFormat, ReadError } from './read-types.ts';
import { LineWalker } from './touchstone/file-lines.ts';

/** The first bytes of kinds of file that people send by mistake. */
const signatures: readonly (readonly [kind: string, start: readonly number[]])[] = [
  ['a ZIP archive or a spreadsheet', [0x50, 0x4b, 0x03, 0x04]],
  ['a gzip archive', [0x1f, 0x8b]],
  ['a 7z archive', [0x37, 0x7a, 0xbc, 0xaf]],
  ['a PDF document', [0x25, 0x50, 0x44, 0x46, 0x2d]],
  ['a PNG picture', [0x89, 0x50, 0x4e, 0x47]],
  ['a JPEG picture', [0xff, 0xd8, 0xff]],
  ['a GIF picture', [0x47, 0x49, 0x46, 0x38]],
  ['an old office document', [0xd0, 0xcf, 0x11, 0xe0]],
  ['a rich text document', [0x7b, 0x5c, 0x72, 0x74, 0x66]],
];

const remedy =
  'Export the sweep as Touchstone or as delimited text (CSV) and send that file, not packed.';

/** Refuses what the first bytes show to be no text: `unknown_kind`. Null if nothing is known. */
export function foreignKind(bytes: Uint8Array): ReadError | null {
  const found = signatures.find(([, start]) => start.every((byte, i) => bytes[i] === byte));
  return found === undefined ? null : unknownKind(`The file is ${found[0]}.`);
}

function unknownKind(detail: string): ReadError {
  return { code: 'unknown_kind', detail, remedy, line: 1, column: 1 };
}

/** How far into a text control characters are looked for. */
const inspected = 1024;

/**
 * Tells the kind of a decoded text from its content alone: Touchstone by its option line or
 * `[Version]`, JSON by its brace, delimited text by rows of numbers. Anything else is the error
 * `unknown_kind`. Numbers without an option line are delimited text, whose columns must be told.
 */
export function detect(text: string): Result<FileFormat, ReadError> {
  if (hasControls(text))
    return fail(unknownKind('The file is not text: it has control characters.'));
  const ink = text.search(/\S/);
  if (ink < 0) {
    return fail({
      code: 'empty_file',
      detail: 'The file has nothing but blanks.',
      remedy: 'Export the sweep again and check its size before sending.',
      line: 1,
    });
  }
  const first = text[ink];
  if (first === '<') return fail(unknownKind('The file is markup (HTML, XML or SVG), no sweep.'));
  if (first === '{' || /^\[\s*["{[\d\]]/.test(text.slice(ink, ink + 200))) return ok('json');
  const touchstone = touchstoneKind(text);
  if (touchstone !== null) return ok(touchstone);
  if (hasRowOfNumbers(text)) return ok('delimited');
  return fail(unknownKind('No line of the text has a frequency and a value.'));
}

function hasControls(text: string): boolean {
  const end = Math.min(text.length, inspected);
  for (let i = 0; i < end; i++) {
    const code = text.charCodeAt(i);
    if (code < 32 && code !== 9 && code !== 10 && code !== 13 && code !== 12) return true;
  }
  return false;
}

/**
 * Looks at the lines before the first number. A bare `#` is an option line (all defaults) only if
 * no other `#` line is there: else it decorates comments.
 */
function touchstoneKind(text: string): 'touchstone-1' | 'touchstone-2' | null {
  const walker = new LineWalker(text);
  let hashLines = 0;
  let hasBare = false;
  while (walker.advance()) {
    const at = walker.firstInk();
    const code = text.charCodeAt(at);
    if (at === walker.end || code === exclamation) continue;
    const line = text.slice(at, Math.min(walker.end, at + longestOptionLine));
    if (/^\[version\]/i.test(line)) return 'touchstone-2';
    if (code !== hash)
      return hasBare && hashLines === 1 && isBlankRow(line) ? 'touchstone-1' : null;
    if (isOptionLine(line)) return 'touchstone-1';
    hashLines += 1;
    hasBare ||= line.replace(/!.*$/, '').trim() === '#';
  }
  return null;
}

const hash = 35;
const exclamation = 33;
const longestOptionLine = 400;

/** A row of numbers with blanks between, as Touchstone writes it. */
function isBlankRow(line: string): boolean {
  const cells = line
    .replace(/!.*$/, '')
    .trim()
    .split(/[ \t]+/);
  return cells.length >= 3 && cells.every((cell) => !Number.isNaN(parseDecimal(cell)));
}

/**
 * Whether a `#` line is an option line: all of its words are ones, or at least two of different
 * kinds are. A `#` that opens a comment or the header of a table does not have that.
 */
function isOptionLine(line: string): boolean {
  const words = line
    .slice(1)
    .replace(/!.*$/, '')
    .trim()
    .split(/[ \t]+/);
  const kinds = new Set<string>();
  let known = 0;
  for (const [i, word] of words.entries()) {
    const kind = optionKind(word, words[i - 1]);
    if (kind === null) continue;
    kinds.add(kind);
    known += 1;
  }
  return kinds.size >= 2 || (known > 0 && known === words.length);
}

function optionKind(word: string, before: string | undefined): string | null {
  if (/^[kmg]?hz$/i.test(word)) return 'unit';
  if (/^[syzhg]$/i.test(word)) return 'parameter';
  if (/^(?:ri|ma|db)$/i.test(word)) return 'format';
  if (/^r(?:=?\d.*)?$/i.test(word)) return 'reference';
  return before !== undefined && /^r$/i.test(before) && /^[(\d]/.test(word) ? 'reference' : null;
}

const longestRow = 2000;

function hasRowOfNumbers(text: string): boolean {
  const walker = new LineWalker(text);
  while (walker.advance()) {
    const at = walker.firstInk();
    if (at === walker.end) continue;
    const line = text.slice(at, Math.min(walker.end, at + longestRow));
    if (/\d/.test(line) && isRowOfNumbers(line)) return true;
  }
  return false;
}

/** Whether a line has a number and another beside it, or a word for the lack of one. */
function isRowOfNumbers(line: string): boolean {
  const cells = line.replaceAll('"', ' ').split(/[;,:\t ]+/);
  const numbers = cells.filter((cell) => !Number.isNaN(parseDecimal(cell))).length;
  return numbers >= 2 || (numbers === 1 && cells.some((cell) => cell !== '' && saysNoNumber(cell)));
}

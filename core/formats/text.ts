import { fail, ok, type Result } from '../result.ts';
import type { Assumption, ReadError, ReadLimits } from './read-types.ts';

/** The text of a file, with what had to be assumed to get at it. */
export interface DecodedText {
  readonly text: string;
  readonly assumptions: readonly Assumption[];
}

/**
 * Decodes a file: UTF-8, UTF-16 where a byte order mark says so, else windows-1252. Checks the
 * limits on bytes and on the length of lines before any other work. Errors: `too_many_bytes`,
 * `line_too_long`, `binary_file`, `empty_file`, `bad_encoding`.
 */
export function decodeText(bytes: Uint8Array, limits: ReadLimits): Result<DecodedText, ReadError> {
  if (bytes.length > limits.maxBytes) {
    return fail({
      code: 'too_many_bytes',
      detail: `The file has ${bytes.length} bytes; at most ${limits.maxBytes} are read.`,
      remedy: 'Sweep with fewer points, or ask the operator for a higher limit.',
    });
  }
  if (bytes.length === 0) {
    return fail({
      code: 'empty_file',
      detail: 'The file is empty.',
      remedy: 'Export the sweep again and check its size before sending.',
    });
  }
  const decoded = decode(bytes);
  if (!decoded.ok) return decoded;
  const tooLong = firstLineLongerThan(decoded.value.text, limits.maxLineLength);
  if (tooLong !== null) {
    return fail({
      code: 'line_too_long',
      detail: `Line ${tooLong} is longer than ${limits.maxLineLength} characters.`,
      remedy: 'Sweeps have short lines: send the exported file itself, one point a line.',
      line: tooLong,
    });
  }
  return decoded;
}

function decode(bytes: Uint8Array): Result<DecodedText, ReadError> {
  const [first, second, third] = bytes;
  if (first === 0xff && second === 0xfe) return decodeUtf16(bytes.subarray(2), 'utf-16le');
  if (first === 0xfe && second === 0xff) return decodeUtf16(bytes.subarray(2), 'utf-16be');
  const hasMark = first === 0xef && second === 0xbb && third === 0xbf;
  const marked: Assumption[] = hasMark
    ? [{ code: 'byte_order_mark', detail: 'A byte order mark at the start was left out.', line: 1 }]
    : [];
  const utf8 = decodeFatally(hasMark ? bytes.subarray(3) : bytes, 'utf-8');
  // A zero byte is a zero character in either encoding, and in a string it is found faster.
  if (utf8 !== null) {
    return utf8.includes('\0') ? binary() : ok({ text: utf8, assumptions: marked });
  }
  const detail =
    'The file is not UTF-8; its characters beyond ASCII were read as windows-1252. They matter in comments only.';
  const text = new TextDecoder('windows-1252').decode(bytes);
  if (text.includes('\0')) return binary();
  return ok({ text, assumptions: [...marked, { code: 'windows_1252', detail }] });
}

function decodeUtf16(bytes: Uint8Array, label: string): Result<DecodedText, ReadError> {
  const text = decodeFatally(bytes, label);
  if (text === null || text.includes('\0')) return binary();
  const detail = `The file was decoded as ${label}, as its byte order mark says.`;
  return ok({ text, assumptions: [{ code: 'utf_16', detail, line: 1 }] });
}

function decodeFatally(bytes: Uint8Array, label: string): string | null {
  try {
    return new TextDecoder(label, { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return null;
  }
}

function binary(): Result<DecodedText, ReadError> {
  return fail({
    code: 'binary_file',
    detail: 'The file is not text: it holds zero bytes or broken characters.',
    remedy: 'Export the sweep as Touchstone or as delimited text and send that.',
  });
}

function firstLineLongerThan(text: string, limit: number): number | null {
  if (text.length <= limit) return null;
  let line = 1;
  let start = 0;
  for (let i = 0; i <= text.length; i++) {
    const code = text.charCodeAt(i);
    if (i < text.length && code !== 10 && code !== 13) continue;
    if (i - start > limit) return line;
    if (code === 13 && text.charCodeAt(i + 1) === 10) i += 1;
    start = i + 1;
    line += 1;
  }
  return null;
}

import { fail, ok, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';

/** Parses JSON text. The error `json_syntax` has line and column, where they can be told. */
export function parseJson(text: string): Result<unknown, ReadError> {
  try {
    return ok(JSON.parse(text));
  } catch (error) {
    const at = placeOfFault(text, error instanceof Error ? error.message : '');
    const where = at === null ? '' : ` at line ${at.line}, column ${at.column}`;
    return fail({
      code: 'json_syntax',
      detail: `The file begins like JSON, but breaks its rules${where}.`,
      remedy: 'Correct the JSON, or export the file again.',
      ...at,
    });
  }
}

interface Place {
  readonly line: number;
  readonly column: number;
}

/** Engines name the place in their message, but not for every fault. */
function placeOfFault(text: string, message: string): Place | null {
  const named = /at position (\d+)/.exec(message)?.[1];
  const at = named === undefined ? firstStrayToken(text) : Number(named);
  if (at === null) return null;
  const lines = text.slice(0, at).split(/\r\n|\r|\n/);
  return { line: lines.length, column: lines[lines.length - 1].length + 1 };
}

const token =
  /[ \t\r\n]*(?:[{}[\],:]|"[^"\\]*(?:\\.[^"\\]*)*"|-?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?|true|false|null)/y;
const longestSearched = 1_000_000;

/** Where the first thing stands that is no token of JSON, or the end; null if all are tokens. */
function firstStrayToken(text: string): number | null {
  if (text.length > longestSearched) return null;
  token.lastIndex = 0;
  let end = 0;
  while (token.test(text)) end = token.lastIndex;
  const rest = text.slice(end).search(/[^ \t\r\n]/);
  return rest < 0 ? null : end + rest;
}

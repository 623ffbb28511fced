import { fail, ok, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';

/** Parses JSON text. The error `json_syntax` has line and column, where the engine tells them. */
export function parseJson(text: string): Result<unknown, ReadError> {
  try {
    return ok(JSON.parse(text));
  } catch (error) {
    const message = error instanceof Error ? error.message : '';
    const place = placeOf(text, message);
    return fail({
      code: 'json_syntax',
      detail: `The file begins like JSON, but is not: the text breaks off or goes wrong at line ${place.line}, column ${place.column}.`,
      remedy: 'Correct the JSON, or export the file again.',
      ...place,
    });
  }
}

/** Engines name the place in their message, or name none when the text ends too early. */
function placeOf(
  text: string,
  message: string,
): { readonly line: number; readonly column: number } {
  const position = /at position (\d+)/.exec(message)?.[1];
  const before = position === undefined ? text : text.slice(0, Number(position));
  const lines = before.split(/\r\n|\r|\n/);
  return { line: lines.length, column: lines[lines.length - 1].length + 1 };
}

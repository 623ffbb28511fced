import { fail, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';

/** A refusal that names its place by a JSON pointer (RFC 6901). */
export function refuseAt(
  pointer: string,
  code: string,
  found: string,
  remedy: string,
): Result<never, ReadError> {
  const where = pointer === '' ? 'The document' : `\`${pointer}\``;
  return fail({ code, detail: `${where} ${found}`, remedy });
}

/** A key as one step of a JSON pointer. */
export function pointerOf(key: string): string {
  const shown = key.length > 60 ? `${key.slice(0, 60)}…` : key;
  return `/${shown.replaceAll('~', '~0').replaceAll('/', '~1')}`;
}

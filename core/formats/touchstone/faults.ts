import { fail, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';

/** Where in the file something was found: one-based. */
export interface Place {
  readonly line: number;
  readonly column?: number;
}

/** A refusal, as every part of the reader returns it. */
export function refuse(
  code: string,
  detail: string,
  remedy: string,
  place?: Place,
): Result<never, ReadError> {
  return fail({ code, detail, remedy, ...place });
}

import { ok, type Result } from '../result.ts';
import {
  defaultReadLimits,
  type ReadError,
  type ReadLimits,
  type ReadSweep,
} from './read-types.ts';
import { decodeText } from './text.ts';
import { readTouchstone, type TouchstoneOptions } from './touchstone/read-touchstone.ts';

export interface ReadOptions extends Omit<TouchstoneOptions, 'limits'> {
  readonly columns?: string;
  readonly limits?: ReadLimits;
}

/** Reads a file as a sweep, whatever its kind. */
export function readSweep(
  bytes: Uint8Array,
  options: ReadOptions = {},
): Result<ReadSweep, ReadError> {
  const { limits = defaultReadLimits } = options;
  const decoded = decodeText(bytes, limits);
  if (!decoded.ok) return decoded;
  const read = readTouchstone(decoded.value.text, { ...options, limits });
  if (!read.ok) return read;
  const assumptions = [...decoded.value.assumptions, ...read.value.assumptions];
  return ok({ ...read.value, assumptions });
}

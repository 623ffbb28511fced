import { fail, ok, type Result } from '../result.ts';
import { readDelimited } from './delimited/read-delimited.ts';
import { detect, foreignKind } from './detect.ts';
import { readSweepJson } from './json/read-sweep-json.ts';
import {
  defaultReadLimits,
  type FileFormat,
  type ReadError,
  type ReadLimits,
  type ReadSweep,
} from './read-types.ts';
import { decodeText } from './text.ts';
import { readTouchstone, type TouchstoneOptions } from './touchstone/read-touchstone.ts';

export interface ReadSweepOptions extends Omit<TouchstoneOptions, 'limits'> {
  /** What the columns of delimited text hold, in the grammar of `columnsGrammar`. */
  readonly columns?: string;
  readonly limits?: ReadLimits;
}

/**
 * Reads a file of any kind that is read here: Touchstone 1 or 2, delimited text, JSON sweep. The
 * kind is told by the content; the name is no more than a hint at the number of ports. Limits are
 * checked before work that grows with the input. Errors name line, column and remedy where one is.
 */
export function readSweep(
  bytes: Uint8Array,
  options: ReadSweepOptions = {},
): Result<ReadSweep, ReadError> {
  const { limits = defaultReadLimits } = options;
  const foreign = foreignKind(bytes);
  if (foreign !== null) return fail(foreign);
  // A JSON sweep is often one line: only the limit on bytes holds for it.
  const isLong = startsWithBrace(bytes);
  const decoded = decodeText(
    bytes,
    isLong ? { ...limits, maxLineLength: limits.maxBytes } : limits,
  );
  if (!decoded.ok) return decoded;
  const { text, assumptions } = decoded.value;
  const format = options.optionLine === undefined ? detect(text) : ok('touchstone-1' as const);
  if (!format.ok) return format;
  const read = readAs(format.value, text, { ...options, limits });
  if (!read.ok || assumptions.length === 0) return read;
  return ok({ ...read.value, assumptions: [...assumptions, ...read.value.assumptions] });
}

type Told = ReadSweepOptions & { readonly limits: ReadLimits };

function readAs(format: FileFormat, text: string, told: Told): Result<ReadSweep, ReadError> {
  const { columns, limits, port } = told;
  if (format !== 'delimited' && columns !== undefined) return columnsForOther(format);
  if (format.startsWith('touchstone')) return readTouchstone(text, told);
  if (port === 2) {
    const detail = 'Port 2 was asked for, but only Touchstone files have two ports.';
    return fail({ code: 'port_absent', detail, remedy: 'Leave `port` out.', parameter: 'port' });
  }
  if (format === 'json') return readSweepJson(text, limits);
  return readDelimited(text, { limits, ...(columns === undefined ? {} : { columns }) });
}

function columnsForOther(format: FileFormat): Result<never, ReadError> {
  const kind = format === 'json' ? 'a JSON sweep' : 'Touchstone';
  return fail({
    code: 'columns_not_asked',
    detail: `The file is ${kind}, which says itself what its numbers are; \`columns\` is for delimited text.`,
    remedy: 'Leave `columns` out.',
    parameter: 'columns',
  });
}

function startsWithBrace(bytes: Uint8Array): boolean {
  const hasMark = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf;
  let at = hasMark ? 3 : 0;
  while (bytes[at] === 32 || bytes[at] === 9 || bytes[at] === 10 || bytes[at] === 13) at += 1;
  return bytes[at] === 0x7b;
}

import { ok, type Result } from '../../result.ts';
import type { ReadError, ReadLimits, ReadSweep } from '../read-types.ts';
import { findDialect } from './dialect.ts';
import { formatColumns } from './format-columns.ts';
import { frameByMapping } from './frame.ts';
import { inferColumns } from './infer-columns.ts';
import type { ColumnMapping } from './mapping.ts';
import { parseColumns } from './parse-columns.ts';
import { readMapped } from './read-mapped.ts';
import { assumeDecimalComma, tableText } from './table-text.ts';

export interface DelimitedOptions {
  /** What the columns hold, in the grammar of `columnsGrammar`; inferred if it is left out. */
  readonly columns?: string;
  readonly limits: Pick<ReadLimits, 'maxPoints'>;
}

/**
 * Reads delimited text. With `columns` it is read as told. Without, the header says what the
 * columns hold, and only if it says so beyond doubt is the file read; else the error
 * `columns_to_confirm` carries a proposal.
 */
export function readDelimited(
  text: string,
  { columns, limits }: DelimitedOptions,
): Result<ReadSweep, ReadError> {
  if (columns === undefined) return inferred(text, limits.maxPoints);
  const mapping = parseColumns(columns);
  if (!mapping.ok) return mapping;
  return told(text, mapping.value, limits.maxPoints);
}

function told(
  text: string,
  mapping: ColumnMapping,
  maxPoints: number,
): Result<ReadSweep, ReadError> {
  const dialect = findDialect(text, mapping);
  if (!dialect.ok) return dialect;
  const table = tableText(text, dialect.value);
  if (!table.ok) return table;
  const frame = frameByMapping(table.value, mapping);
  if (!frame.ok) return frame;
  const { start, line } = frame.value;
  const isAssumed = dialect.value.decimal === 'comma' && mapping.decimal === null;
  const commas = isAssumed ? assumeDecimalComma(table.value, start, line) : ok([]);
  if (!commas.ok) return commas;
  const read = readMapped(table.value, frame.value, mapping.referenceOhm, maxPoints);
  if (!read.ok) return read;
  return ok({
    sweep: read.value.sweep,
    format: 'delimited',
    assumptions: [...commas.value, ...read.value.assumptions],
    columns: formatColumns(mapping),
  });
}

function inferred(text: string, maxPoints: number): Result<ReadSweep, ReadError> {
  const inference = inferColumns(text, maxPoints);
  if (!inference.ok) return inference;
  const { mapping, assumptions } = inference.value;
  const read = told(text, mapping, maxPoints);
  if (!read.ok) return read;
  return ok({ ...read.value, assumptions: [...assumptions, ...read.value.assumptions] });
}

import type { Quantity, Unit } from './quantities.ts';

export type Delimiter = 'comma' | 'semicolon' | 'tab' | 'blanks';
export type DecimalMark = 'point' | 'comma';

/** One column that is read. */
export interface MappedColumn {
  /** One-based number of the column, or the text of its header. */
  readonly address: number | string;
  readonly quantity: Quantity;
  /** Null for quantities without a unit. */
  readonly unit: Unit | null;
}

/** What the columns of a delimited text hold, and how it is written. */
export interface ColumnMapping {
  readonly columns: readonly MappedColumn[];
  /** Number of columns of a row where all were listed by order; null where some were addressed. */
  readonly width: number | null;
  /** The following are null where they were not told. */
  readonly referenceOhm: number | null;
  readonly delimiter: Delimiter | null;
  readonly decimal: DecimalMark | null;
}

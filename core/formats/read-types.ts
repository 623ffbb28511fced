import type { Sweep } from '../sweep.ts';

/** A liberty that a reader took, told to whoever reads the answer. Codes are a closed list per reader. */
export interface Assumption {
  readonly code: string;
  readonly detail: string;
  /** One-based line of the file, where one line is meant. */
  readonly line?: number;
}

/** Why a file was refused: what was found, where, and what to do about it. */
export interface ReadError {
  readonly code: string;
  /** What was found. */
  readonly detail: string;
  /** What the member can do. */
  readonly remedy: string;
  /** One-based line and column of the decoded text. */
  readonly line?: number;
  readonly column?: number;
  /** The request parameter at fault, where the file is not. */
  readonly parameter?: 'columns' | 'port';
  /** For `columns_to_confirm`: the mapping to send back as `columns`, with the evidence for it. */
  readonly proposal?: ColumnsProposal;
}

export interface ColumnsProposal {
  /** A mapping in the grammar of the `columns` parameter, ready to be sent back. */
  readonly columns: string;
  /** Sentences: what each column was taken for and why, and what stayed unsure. */
  readonly evidence: readonly string[];
  /** The first data rows as text cells, to look at. */
  readonly firstRows: readonly (readonly string[])[];
}

export type FileFormat = 'touchstone-1' | 'touchstone-2' | 'delimited' | 'json';

/** What a reader makes of a file. */
export interface ReadSweep {
  readonly sweep: Sweep;
  readonly format: FileFormat;
  readonly assumptions: readonly Assumption[];
  /** The column mapping that was used (delimited text only). */
  readonly columns?: string;
  /** The port that was read (two-port files only). */
  readonly port?: 1 | 2;
}

/** Bounds that are checked before any work that grows with the input. */
export interface ReadLimits {
  readonly maxBytes: number;
  readonly maxLineLength: number;
  readonly maxPoints: number;
}

export const defaultReadLimits: ReadLimits = {
  maxBytes: 16 * 1024 * 1024,
  maxLineLength: 100_000,
  maxPoints: 100_001,
};

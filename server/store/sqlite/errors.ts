import Database from 'better-sqlite3';
import { StoreError, type StoreErrorKind } from '../port.ts';

/** The failure of an act, as kind and words alone, so that it can pass between threads. */
export interface Failure {
  readonly kind: StoreErrorKind;
  readonly message: string;
  readonly field: string | null;
}

/** What a caller can do about an error of the driver. */
export function failureOf(error: unknown): Failure {
  if (error instanceof StoreError) {
    return { kind: error.kind, message: error.message, field: error.field ?? null };
  }
  if (!(error instanceof Database.SqliteError)) {
    return { kind: 'unavailable', message: messageOf(error), field: null };
  }
  const { code, message } = error;
  return { kind: kindOf(code), message: `${code}: ${message}`, field: null };
}

/** The same as an error to throw. */
export function storeErrorOf(error: unknown): StoreError {
  if (error instanceof StoreError) return error;
  const { kind, message } = failureOf(error);
  return new StoreError(kind, message, undefined, error);
}

function kindOf(code: string): StoreErrorKind {
  if (code === 'SQLITE_FULL') return 'full';
  if (code.startsWith('SQLITE_CORRUPT') || code === 'SQLITE_NOTADB') return 'corrupt';
  if (code.startsWith('SQLITE_CONSTRAINT')) return 'conflict';
  return 'unavailable';
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

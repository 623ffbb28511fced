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
  return { kind: kindOf(code), message: `${code}: ${message}`, field: twinField(message) };
}

/** The same as an error to throw. */
export function storeErrorOf(error: unknown): StoreError {
  if (error instanceof StoreError) return error;
  return toStoreError(failureOf(error), error);
}

/** A failure as an error to throw, in the thread that it was handed to. */
export function toStoreError({ kind, message, field }: Failure, cause?: unknown): StoreError {
  return new StoreError(kind, message, field ?? undefined, cause);
}

const twinCodes: ReadonlySet<string> = new Set([
  'SQLITE_CONSTRAINT_UNIQUE',
  'SQLITE_CONSTRAINT_PRIMARYKEY',
]);

function kindOf(code: string): StoreErrorKind {
  if (code === 'SQLITE_FULL') return 'full';
  if (code.startsWith('SQLITE_CORRUPT') || code === 'SQLITE_NOTADB') return 'corrupt';
  // Any other constraint is a fault of the service itself, which no caller can mend.
  if (twinCodes.has(code)) return 'conflict';
  return 'unavailable';
}

/** The last column of the key that is in use: those before it tell the club and kind. */
function twinField(message: string): string | null {
  return /^UNIQUE constraint failed: .*\.(\w+)$/.exec(message)?.[1] ?? null;
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

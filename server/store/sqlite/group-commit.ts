import { withOrigin } from '../origin.ts';
import type { Connection } from './connection.ts';
import { type Failure, failureOf, toStoreError } from './errors.ts';
import type { WriteActs } from './write-acts.ts';

/** One act waiting for the writer. */
export interface Job {
  readonly id: number;
  readonly act: keyof WriteActs;
  readonly args: readonly unknown[];
  /** The address that it came from; null: the service itself. */
  readonly origin: string | null;
}

export type JobResult =
  | { readonly id: number; readonly value: unknown }
  | { readonly id: number; readonly failure: Failure };

/** Acts that SQLite does not let run inside a transaction. */
const aloneActs: ReadonlySet<keyof WriteActs> = new Set(['takeLock']);

/**
 * Runs waiting jobs and answers them once they are durable: all in one IMMEDIATE transaction, each
 * in a savepoint, so that one commit (one flush to disk) serves all and one failing job takes no
 * other with it. Where a full disk ends the transaction itself, each job is tried alone: a smaller one
 * may fit. After any other such failure none is tried again.
 */
export function runTogether(
  connection: Connection,
  acts: WriteActs,
  jobs: readonly Job[],
): readonly JobResult[] {
  const grouped = jobs.filter(({ act }) => !aloneActs.has(act));
  const alone = jobs.filter(({ act }) => aloneActs.has(act));
  const together = grouped.length === 0 ? [] : runInOne(connection, acts, grouped);
  return [...together, ...alone.map((job) => attempt(acts, job))];
}

function runInOne(connection: Connection, acts: WriteActs, jobs: readonly Job[]): JobResult[] {
  try {
    connection.exec('BEGIN IMMEDIATE');
    const results = jobs.map((job) => inSavepoint(connection, acts, job));
    connection.exec('COMMIT');
    return results;
  } catch (error) {
    // A full disk may have ended the transaction already.
    if (connection.inTransaction) connection.exec('ROLLBACK');
    const failure = failureOf(error);
    if (failure.kind === 'full' && jobs.length > 1) {
      return jobs.flatMap((job) => runInOne(connection, acts, [job]));
    }
    return jobs.map(({ id }) => ({ id, failure }));
  }
}

function inSavepoint(connection: Connection, acts: WriteActs, job: Job): JobResult {
  connection.exec('SAVEPOINT job');
  const result = attempt(acts, job);
  if ('failure' in result) {
    if (!connection.inTransaction) throw toStoreError(result.failure);
    connection.exec('ROLLBACK TO job');
  }
  connection.exec('RELEASE job');
  return result;
}

function attempt(acts: WriteActs, { id, act, args, origin }: Job): JobResult {
  try {
    const run = acts[act] as (...args: readonly unknown[]) => unknown;
    return { id, value: withOrigin(origin, () => run(...args)) };
  } catch (error) {
    return { id, failure: failureOf(error) };
  }
}

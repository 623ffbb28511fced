import { parentPort, workerData } from 'node:worker_threads';
import { openForCopying } from './connection.ts';
import { type Failure, failureOf } from './errors.ts';
import { makeVerifiedCopy } from './verified-copy.ts';

/** What the thread is started with. */
export interface CopyOrder {
  readonly from: string;
  readonly to: string;
}

// A copy takes minutes where there are many records: in a thread of its own, neither readers nor
// the writer wait for it.
parentPort?.postMessage(copy(workerData));

function copy({ from, to }: CopyOrder): Failure | null {
  try {
    const connection = openForCopying(from);
    try {
      makeVerifiedCopy(connection, to);
    } finally {
      connection.close();
    }
    return null;
  } catch (error) {
    return failureOf(error);
  }
}

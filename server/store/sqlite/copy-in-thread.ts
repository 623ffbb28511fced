import { Worker } from 'node:worker_threads';
import { StoreError } from '../port.ts';
import type { CopyOrder } from './copy-thread.ts';
import { type Failure, toStoreError } from './errors.ts';
import { threadEntry } from './thread-entry.ts';

/** Copies the database online and checks the copy, in a thread that ends with it. Throws `StoreError`. */
export async function copyInThread(order: CopyOrder): Promise<void> {
  const worker = new Worker(threadEntry('copy-thread'), { workerData: order });
  const failure = await new Promise<Failure | null>((resolve, reject) => {
    let answer: Failure | null | undefined;
    worker.once('message', (message: Failure | null) => {
      answer = message;
    });
    worker.once('error', reject);
    worker.once('exit', () => {
      if (answer === undefined) reject(new StoreError('unavailable', 'The copying has ended.'));
      else resolve(answer);
    });
  });
  if (failure !== null) throw toStoreError(failure);
}

import { parentPort, receiveMessageOnPort, workerData } from 'node:worker_threads';
import { type Connection, openWriter } from './connection.ts';
import { failureOf } from './errors.ts';
import { type Job, runTogether } from './group-commit.ts';
import { prepareFile } from './prepare-file.ts';
import { writeActs } from './write-acts.ts';

/** What the thread is started with. */
export interface WriterOptions {
  readonly path: string;
  readonly migrationsFolder: string;
  readonly startedAt: string;
  /** For tests of a full disk: the most pages that the file may have. */
  readonly maxPages?: number;
  /** For the test that counts flushes to disk: what the service never runs with. */
  readonly synchronous?: 'NORMAL';
}

// The one writer, in a thread of its own: a commit waits for the disk, and that wait must not stop
// the readers. It closes its connection itself before it ends.
if (parentPort !== null) serve(parentPort, workerData);

function serve(port: NonNullable<typeof parentPort>, options: WriterOptions): void {
  let connection: Connection;
  try {
    connection = openPrepared(options);
  } catch (error) {
    port.postMessage({ id: 0, failure: failureOf(error) });
    port.close();
    return;
  }
  const acts = writeActs(connection);
  port.on('message', (first: Job | 'close') => {
    const jobs: Job[] = [];
    let message: Job | 'close' | undefined = first;
    let isClosing = false;
    while (message !== undefined) {
      if (message === 'close') isClosing = true;
      else jobs.push(message);
      message = receiveMessageOnPort(port)?.message;
    }
    for (const result of runTogether(connection, acts, jobs)) port.postMessage(result);
    if (!isClosing) return;
    closeTidily(connection);
    port.close();
  });
  port.postMessage({ id: 0, value: null });
}

function openPrepared(options: WriterOptions): Connection {
  const connection = openWriter(options.path);
  try {
    prepareFile(connection, options);
    return connection;
  } catch (error) {
    connection.close();
    throw error;
  }
}

function closeTidily(connection: Connection): void {
  try {
    connection.pragma('optimize');
    connection.pragma('wal_checkpoint(TRUNCATE)');
  } catch {
    // On a full disk neither may work, and nothing is lost: what is in the log is read at next start.
  } finally {
    connection.close();
  }
}

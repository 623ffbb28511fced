import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { Worker } from 'node:worker_threads';
import type { ReadError } from '../core/formats/read-types.ts';
import { fail, ok, type Result } from '../core/result.ts';
import type { Incoming } from './ingest.ts';
import type { IngestAnswer } from './ingest-thread.ts';
import { projectRoot } from './project-files.ts';
import type { NewSweep } from './store/port.ts';

/** Reads and analyses a file on its way in. */
export type Ingest = (incoming: Incoming) => Promise<Result<NewSweep, ReadError>>;

/** Short-lived values of one file: with V8's own choice a thread at rest holds some 50 MB more. */
const resourceLimits = { maxYoungGenerationSizeMb: 8 };

interface Waiting {
  readonly incoming: Incoming;
  readonly resolve: (made: Result<NewSweep, ReadError>) => void;
  readonly reject: (error: Error) => void;
}

interface Thread {
  readonly worker: Worker;
  readonly waiting: Map<number, Waiting>;
}

/**
 * Reads and analyses files in threads of their own: an analysis takes milliseconds, in which nothing
 * else would be answered. Threads start with the first file. One that fails takes its files with it
 * and is replaced at the next.
 */
export class IngestPool {
  private readonly threads: Thread[] = [];
  private readonly most: number;
  private nextId = 1;

  constructor(most = Math.min(4, Math.max(1, availableParallelism() - 1))) {
    this.most = most;
  }

  readonly ingest: Ingest = (incoming) =>
    new Promise((resolve, reject) => {
      const { worker, waiting } = this.leastBusy();
      const id = this.nextId++;
      waiting.set(id, { incoming, resolve, reject });
      worker.postMessage({ id, incoming });
    });

  /** Ends the threads; what is under way fails. */
  async close(): Promise<void> {
    await Promise.all(this.threads.map(({ worker }) => worker.terminate()));
  }

  private leastBusy(): Thread {
    const [idlest] = this.threads.toSorted((a, b) => a.waiting.size - b.waiting.size);
    if (idlest !== undefined && (idlest.waiting.size === 0 || this.threads.length >= this.most)) {
      return idlest;
    }
    return this.start();
  }

  private start(): Thread {
    const entry = pathToFileURL(join(projectRoot(), 'dist/server/ingest-thread.js'));
    const thread: Thread = { worker: new Worker(entry, { resourceLimits }), waiting: new Map() };
    thread.worker.on('message', (answer: IngestAnswer) => settle(thread, answer));
    thread.worker.on('error', (error) => this.remove(thread, error));
    thread.worker.once('exit', () => this.remove(thread, new Error('A reading thread has ended.')));
    this.threads.push(thread);
    return thread;
  }

  private remove(thread: Thread, error: Error): void {
    const at = this.threads.indexOf(thread);
    if (at >= 0) this.threads.splice(at, 1);
    for (const { reject } of thread.waiting.values()) reject(error);
    thread.waiting.clear();
  }
}

function settle({ waiting }: Thread, answer: IngestAnswer): void {
  const asked = waiting.get(answer.id);
  waiting.delete(answer.id);
  if (asked === undefined) return;
  if ('fault' in answer) {
    asked.reject(new Error(answer.fault));
    return;
  }
  const { made } = answer;
  // The file itself stayed here.
  asked.resolve(made.ok ? ok({ ...made.value, file: asked.incoming.bytes }) : fail(made.error));
}

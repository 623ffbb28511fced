import { Worker } from 'node:worker_threads';
import { presentOrigin } from '../origin.ts';
import { StoreError } from '../port.ts';
import { toStoreError } from './errors.ts';
import type { JobResult } from './group-commit.ts';
import { threadEntry } from './thread-entry.ts';
import type { WriteActs } from './write-acts.ts';
import type { WriterOptions } from './writer-thread.ts';

/** What it holds is passed on at once: V8's own choice would only keep memory. */
const resourceLimits = { maxYoungGenerationSizeMb: 8 };

interface Waiting {
  readonly resolve: (value: never) => void;
  readonly reject: (error: StoreError) => void;
}

/** The main thread's side of the writer: hands over acts and waits for them to be durable. */
export class Writer {
  private readonly worker: Worker;
  private readonly waiting = new Map<number, Waiting>();
  private readonly listeners = new Set<() => void>();
  private readonly exited: Promise<void>;
  private nextId = 1;
  private isClosed = false;

  private constructor(worker: Worker) {
    this.worker = worker;
    worker.on('message', (result: JobResult) => this.settle(result));
    this.exited = new Promise((resolve) => {
      worker.once('exit', () => {
        this.failAll('The writer has ended.');
        resolve();
      });
    });
    worker.on('error', (error) => this.failAll(`The writer failed: ${error.message}`));
  }

  /** Starts the thread; resolves once the file is open and its schema up to date. */
  static async start(options: WriterOptions): Promise<Writer> {
    const writer = new Writer(
      new Worker(threadEntry('writer-thread'), { workerData: options, resourceLimits }),
    );
    await new Promise<never>((resolve, reject) => writer.waiting.set(0, { resolve, reject }));
    return writer;
  }

  /** How many acts are waiting for their commit. */
  get depth(): number {
    return this.waiting.size;
  }

  /** Resolves with the act's result once it is on disk. Throws `StoreError`. */
  run<Act extends keyof WriteActs>(
    act: Act,
    ...args: Parameters<WriteActs[Act]>
  ): Promise<ReturnType<WriteActs[Act]>> {
    if (this.isClosed) return Promise.reject(new StoreError('unavailable', 'The store is closed.'));
    const id = this.nextId++;
    return new Promise((resolve, reject) => {
      this.waiting.set(id, { resolve, reject });
      this.worker.postMessage({ id, act, args, origin: presentOrigin() });
    });
  }

  /** Calls back after each act that is on disk; returns what ends that. */
  onWrite(listener: () => void): () => void {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  }

  /** Lets the acts handed over finish, then ends the thread. */
  async close(): Promise<void> {
    if (!this.isClosed) {
      this.isClosed = true;
      this.worker.postMessage('close');
    }
    await this.exited;
  }

  private settle(result: JobResult): void {
    const waiting = this.waiting.get(result.id);
    this.waiting.delete(result.id);
    if ('failure' in result) {
      waiting?.reject(toStoreError(result.failure));
      return;
    }
    waiting?.resolve(result.value as never);
    for (const listener of this.listeners) listener();
  }

  private failAll(message: string): void {
    this.isClosed = true;
    for (const { reject } of this.waiting.values()) reject(new StoreError('unavailable', message));
    this.waiting.clear();
  }
}

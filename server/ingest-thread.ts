import { parentPort, type TransferListItem } from 'node:worker_threads';
import type { ReadError } from '../core/formats/read-types.ts';
import { fail, ok, type Result } from '../core/result.ts';
import { type Incoming, ingest } from './ingest.ts';
import type { NewSweep, StoredPoints } from './store/port.ts';

interface IngestOrder {
  readonly id: number;
  readonly incoming: Incoming;
}

/** What came of one file; without the file, which who asked has. */
export type IngestAnswer =
  | { readonly id: number; readonly made: Result<Omit<NewSweep, 'file'>, ReadError> }
  | { readonly id: number; readonly fault: string };

parentPort?.on('message', ({ id, incoming }: IngestOrder) => {
  const answer = answerTo(id, incoming);
  const isMade = 'made' in answer && answer.made.ok;
  parentPort?.postMessage(answer, isMade ? columnsOf(answer.made.value.points) : []);
});

function answerTo(id: number, incoming: Incoming): IngestAnswer {
  try {
    const made = ingest(incoming);
    if (!made.ok) return { id, made: fail(made.error) };
    const { file: _, ...rest } = made.value;
    return { id, made: ok(rest) };
  } catch (error) {
    return { id, fault: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

/** Moved, not copied. */
function columnsOf(points: StoredPoints): TransferListItem[] {
  const buffers = Object.values(points).flatMap((column: Float64Array | null) =>
    column === null ? [] : [column.buffer],
  );
  return [...new Set(buffers)].filter((buffer) => buffer instanceof ArrayBuffer);
}

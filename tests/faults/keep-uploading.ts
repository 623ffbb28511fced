import { createHash } from 'node:crypto';
import { writeSync } from 'node:fs';
import { openSqliteStore } from '../../server/store/sqlite/open.ts';
import { club } from '../support/open-test-store.ts';
import { idOf, newSweep } from '../support/store-records.ts';

// A client of the store that keeps uploading, and writes a line for each sweep that was acknowledged,
// until it is killed. Told `early`, it writes the line before: what the test must find out.
const [path, first, acknowledge] = process.argv.slice(2);
const loops = 4;
const store = await openSqliteStore({ path });

async function keepUploading(from: number): Promise<void> {
  for (let number = from; ; number += loops) {
    const sweep = newSweep(club, idOf(number), idOf(20), textOf(number));
    const kept = store.addSweep(sweep);
    if (acknowledge === 'early') {
      tell(sweep.record.id, sweep.file);
      // In the same turn: the writer cannot have it yet.
      if (number >= Number(first) + 3 * loops) process.kill(process.pid, 'SIGKILL');
    }
    const { record } = await kept;
    if (acknowledge !== 'early') tell(record.id, sweep.file);
  }
}

function tell(id: string, file: Uint8Array): void {
  writeSync(1, `${id} ${createHash('sha256').update(file).digest('hex')}\n`);
}

/** Some pages of text that hardly shrink. */
function textOf(number: number): string {
  const lines = Array.from({ length: 300 }, (_, i) =>
    createHash('sha256').update(`${number} ${i}`).digest('hex'),
  );
  return lines.join('\n');
}

await Promise.all(Array.from({ length: loops }, (_, i) => keepUploading(Number(first) + i)));

import { createHash } from 'node:crypto';
import { fsyncSync, openSync, writeSync } from 'node:fs';
import { setTimeout as pause } from 'node:timers/promises';
import { numberedFile, uploadNumbered } from '../built-service.ts';

// A member who uploads one file after the other, four at a time, and notes each acknowledged one in
// a ledger of his own, on disk before he goes on. Where no answer comes, he sends the same again.
const [url, token, ledger] = process.argv.slice(2);
const loops = 4;
const book = openSync(ledger, 'a');

async function keepUploading(first: number): Promise<never> {
  for (let number = first; ; number += loops) {
    const { status, id } = await untilAnswered(number);
    const sha256 = createHash('sha256').update(numberedFile(number)).digest('hex');
    writeSync(book, `${number} ${id} ${sha256} ${status}\n`);
    fsyncSync(book);
  }
}

async function untilAnswered(number: number): Promise<{ status: number; id: string }> {
  for (;;) {
    try {
      const answer = await uploadNumbered(url, token, number);
      const { id } = (await answer.json()) as { id: string };
      if (answer.ok) return { status: answer.status, id };
      // While it closes or starts it may say that it cannot; nothing else is to be expected.
      if (answer.status !== 503) process.exit(3);
    } catch {
      await pause(20);
    }
  }
}

await Promise.all(Array.from({ length: loops }, (_, i) => keepUploading(i + 1)));

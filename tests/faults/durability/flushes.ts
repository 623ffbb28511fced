/** A wait for an acknowledgement, and how many flushes of the log of writes ended within it. */
export interface Acknowledgement {
  readonly number: number;
  readonly flushes: number;
}

// A call that another thread's comes into is written in two lines: `<unfinished ...>`, `resumed`.
const whole = /^(\d+) .*\bf(?:data)?sync\(\d+<[^>]*-wal>\)\s*= 0/;
const begun = /^(\d+) .*\bf(?:data)?sync\(\d+<[^>]*-wal>.*<unfinished/;
const resumed = /^(\d+) .*<\.\.\. f(?:data)?sync resumed>.*= 0/;
const mark = /\bwrite\(1<.*"(begin|acknowledged) (\d+)\\n"/;

/** Reads a trace (`strace -f -y -e trace=fsync,fdatasync,write`) of `commit-one-by-one.ts`. */
export function flushesIn(trace: string): readonly Acknowledgement[] {
  const found: Acknowledgement[] = [];
  const flushing = new Set<string>();
  let flushes = 0;
  for (const line of trace.split('\n')) {
    const [, word, number] = mark.exec(line) ?? [];
    if (word === 'begin') flushes = 0;
    if (word === 'acknowledged') found.push({ number: Number(number), flushes });
    const thread = begun.exec(line)?.[1];
    if (thread !== undefined) flushing.add(thread);
    const ended = resumed.exec(line)?.[1];
    if (whole.test(line) || (ended !== undefined && flushing.delete(ended))) flushes += 1;
  }
  return found;
}

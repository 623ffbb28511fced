import type { FeedLine } from '../../core/line/feed-line.ts';
import { fromFeedPoint } from '../../core/line/line.ts';
import { complexOf, readText } from './reading.ts';

/** A Touchstone file of what an analyzer sees through a line, from a file that holds at its far end. */
export function throughLineFile(file: string, line: FeedLine): string {
  const seen = fromFeedPoint(complexOf(readText(file)), line);
  if (!seen.ok) throw new Error(seen.error.detail);
  const { frequencyHz, reflectionRe, reflectionIm } = seen.value;
  const rows = [...frequencyHz].map((hz, i) => `${hz} ${reflectionRe[i]} ${reflectionIm[i]}`);
  return `! through a line\n# HZ S RI R 50\n${rows.join('\n')}\n`;
}

/** A Touchstone file of a line whose far end reflects all: open (1) or shorted (-1). */
export function lineEndFile(
  line: FeedLine,
  { end = 1, lowHz = 1e6, highHz = 201e6, points = 401, comment = 'a line' } = {},
): string {
  const hertz = Array.from(
    { length: points },
    (_, i) => lowHz + ((highHz - lowHz) * i) / (points - 1),
  );
  const rows = hertz.map((hz) => `${hz} ${end} 0`);
  const ended = `# HZ S RI R 50\n${rows.join('\n')}\n`;
  return throughLineFile(ended, line).replace('through a line', comment);
}

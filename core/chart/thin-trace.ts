import type { PixelLine } from './thin-line.ts';

/** Blocks of a trace that may turn anywhere; each leaves at most six points. */
const blocks = 400;
/** A step shorter than this is not seen. */
const leastStepPx = 0.4;

/**
 * Leaves out the points of a trace in the plane that nobody could see missing: of a long one, each
 * block keeps its ends and its outermost points; of these, steps too short to be seen go.
 */
export function thinTrace(trace: PixelLine): PixelLine {
  const { x, y } = trace;
  const length = Math.ceil(x.length / blocks);
  const kept: number[] = [];
  for (let first = 0; first < x.length; first += length) {
    const last = Math.min(x.length, first + length) - 1;
    for (const i of outermost(trace, first, last)) {
      const before = kept[kept.length - 1];
      const isSeen =
        before === undefined ||
        i === x.length - 1 ||
        Math.max(Math.abs(x[i] - x[before]), Math.abs(y[i] - y[before])) >= leastStepPx;
      if (isSeen) kept.push(i);
    }
  }
  return { x: Float64Array.from(kept, (i) => x[i]), y: Float64Array.from(kept, (i) => y[i]) };
}

function outermost({ x, y }: PixelLine, first: number, last: number): readonly number[] {
  let [west, east, north, south] = [first, first, first, first];
  for (let i = first; i <= last; i++) {
    if (x[i] < x[west]) west = i;
    if (x[i] > x[east]) east = i;
    if (y[i] < y[north]) north = i;
    if (y[i] > y[south]) south = i;
  }
  return [...new Set([first, west, east, north, south, last])].sort((a, b) => a - b);
}

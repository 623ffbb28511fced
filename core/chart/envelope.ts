import type { Box } from './boxes.ts';
import type { PixelLine } from './thin-line.ts';

/** What lines cover, column by column: whether a box lies clear of them is told at once. */
export class Envelope {
  private readonly highest: Float64Array;
  private readonly lowest: Float64Array;

  constructor(widthPx: number, lines: readonly PixelLine[]) {
    this.highest = new Float64Array(widthPx + 1).fill(Number.POSITIVE_INFINITY);
    this.lowest = new Float64Array(widthPx + 1).fill(Number.NEGATIVE_INFINITY);
    for (const line of lines) this.add(line);
  }

  private add({ x, y }: PixelLine): void {
    for (let i = 0; i + 1 < x.length; i++) {
      if (Number.isNaN(y[i]) || Number.isNaN(y[i + 1])) continue;
      const first = Math.max(0, Math.floor(x[i]));
      const last = Math.min(this.highest.length - 1, Math.ceil(x[i + 1]));
      for (let column = first; column <= last; column++) {
        const from = yAt(column, x[i], y[i], x[i + 1], y[i + 1]);
        const to = yAt(column + 1, x[i], y[i], x[i + 1], y[i + 1]);
        this.highest[column] = Math.min(this.highest[column], from, to);
        this.lowest[column] = Math.max(this.lowest[column], from, to);
      }
    }
  }

  crosses({ left, top, right, bottom }: Box): boolean {
    const last = Math.min(this.highest.length - 1, Math.ceil(right));
    for (let column = Math.max(0, Math.floor(left)); column <= last; column++) {
      if (this.highest[column] < bottom && this.lowest[column] > top) return true;
    }
    return false;
  }
}

/** The ordinate of a straight line, held at its ends beyond them. */
function yAt(at: number, x0: number, y0: number, x1: number, y1: number): number {
  if (x1 === x0) return at <= x0 ? y0 : y1;
  return y0 + (y1 - y0) * Math.min(1, Math.max(0, (at - x0) / (x1 - x0)));
}

import type { Box } from './boxes.ts';
import type { PixelLine } from './thin-line.ts';

const cellPx = 4;

/** Cells of a chart that a trace runs through: whether a box lies clear of it is told at once. */
export class CoveredCells {
  private readonly columns: number;
  private readonly covered: Uint8Array;

  constructor(widthPx: number, heightPx: number, { x, y }: PixelLine) {
    this.columns = Math.ceil(widthPx / cellPx) + 1;
    this.covered = new Uint8Array(this.columns * (Math.ceil(heightPx / cellPx) + 1));
    for (let i = 0; i + 1 < x.length; i++) {
      const length = Math.max(Math.abs(x[i + 1] - x[i]), Math.abs(y[i + 1] - y[i]));
      const steps = Math.max(1, Math.ceil(length / (cellPx / 2)));
      for (let step = 0; step <= steps; step++) {
        const part = step / steps;
        this.cover(x[i] + part * (x[i + 1] - x[i]), y[i] + part * (y[i + 1] - y[i]));
      }
    }
  }

  private cover(x: number, y: number): void {
    const column = Math.floor(x / cellPx);
    const at = Math.floor(y / cellPx) * this.columns + column;
    if (column >= 0 && column < this.columns && at >= 0) this.covered[at] = 1;
  }

  crosses({ left, top, right, bottom }: Box): boolean {
    for (let row = Math.floor(top / cellPx); row * cellPx < bottom; row++) {
      for (let column = Math.floor(left / cellPx); column * cellPx < right; column++) {
        if (this.covered[row * this.columns + column] === 1) return true;
      }
    }
    return false;
  }
}

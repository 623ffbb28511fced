/** A run of points in pixels; a NaN ordinate is a gap. */
export interface PixelLine {
  readonly x: Float64Array;
  readonly y: Float64Array;
}

/** No point that is left out lies further than this from the line that is drawn. */
const tolerancePx = 0.12;

/**
 * Leaves out the points of a line, ascending in x, that nobody could see missing. Of the points of
 * one pixel column the first, the last, the highest and the lowest stay, so that no minimum is lost
 * (Jugel et al., Proc. VLDB Endowment 7(10), 2014); of these, points on a straight stretch go.
 */
export function thinLine(line: PixelLine): PixelLine {
  const columns = columnExtremes(line);
  return alongStraights(line, columns);
}

function columnExtremes({ x, y }: PixelLine): number[] {
  const kept: number[] = [];
  for (let first = 0; first < x.length; ) {
    if (Number.isNaN(y[first])) {
      kept.push(first++);
      continue;
    }
    const column = Math.floor(x[first]);
    let last = first;
    let low = first;
    let high = first;
    while (
      last + 1 < x.length &&
      !Number.isNaN(y[last + 1]) &&
      Math.floor(x[last + 1]) === column
    ) {
      last += 1;
      if (y[last] < y[low]) low = last;
      if (y[last] > y[high]) high = last;
    }
    keepInOrder(kept, [first, Math.min(low, high), Math.max(low, high), last]);
    first = last + 1;
  }
  return kept;
}

function keepInOrder(kept: number[], ascending: readonly number[]): void {
  for (const i of ascending) if (kept[kept.length - 1] !== i) kept.push(i);
}

/** From each kept point on, the slopes that stay within the tolerance of all that is left out. */
function alongStraights({ x, y }: PixelLine, indices: readonly number[]): PixelLine {
  const kept: number[] = [];
  let anchor = -1;
  let least = Number.NEGATIVE_INFINITY;
  let most = Number.POSITIVE_INFINITY;
  for (let n = 0; n < indices.length; n++) {
    const i = indices[n];
    const next = indices[n + 1];
    const ends = anchor < 0 || Number.isNaN(y[i]) || next === undefined || Number.isNaN(y[next]);
    if (!ends) {
      least = Math.max(least, (y[i] - tolerancePx - y[anchor]) / (x[i] - x[anchor]));
      most = Math.min(most, (y[i] + tolerancePx - y[anchor]) / (x[i] - x[anchor]));
      const slope = (y[next] - y[anchor]) / (x[next] - x[anchor]);
      if (slope >= least && slope <= most) continue;
    }
    kept.push(i);
    anchor = Number.isNaN(y[i]) ? -1 : i;
    least = Number.NEGATIVE_INFINITY;
    most = Number.POSITIVE_INFINITY;
  }
  return {
    x: Float64Array.from(kept, (i) => x[i]),
    y: Float64Array.from(kept, (i) => y[i]),
  };
}

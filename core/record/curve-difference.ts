import { reflectionMagnitude, type Sweep } from '../sweep.ts';

/** How two reflections differ where both were swept. */
export interface CurveDifference {
  readonly lowHz: number;
  readonly highHz: number;
  readonly points: number;
  /** `complex`: the whole reflection; `magnitude`: its magnitude, for either has no phase. */
  readonly of: 'complex' | 'magnitude';
  /** Root mean square of |difference|. */
  readonly rms: number;
  readonly largest: number;
  readonly largestHz: number;
}

/**
 * The difference of two reflections of one reference, at the points of the first that lie within the
 * second, which is read between its points by straight lines. Null where they share no point.
 */
export function curveDifference(first: Sweep, second: Sweep): CurveDifference | null {
  const grid = first.frequencyHz;
  const other = second.frequencyHz;
  const lowHz = Math.max(grid[0], other[0]);
  const highHz = Math.min(grid[grid.length - 1], other[other.length - 1]);
  const parts = partsOf(first, second);
  let points = 0;
  let squares = 0;
  let largest = -1;
  let largestHz = lowHz;
  let upper = 1;
  for (let i = 0; i < grid.length; i++) {
    const f = grid[i];
    if (f < lowHz || f > highHz) continue;
    while (upper < other.length - 1 && other[upper] < f) upper++;
    const square = parts.reduce((sum, [mine, theirs]) => {
      return sum + (valueAt(other, theirs, upper, f) - mine[i]) ** 2;
    }, 0);
    points += 1;
    squares += square;
    if (square <= largest) continue;
    largest = square;
    largestHz = f;
  }
  if (points === 0) return null;
  return {
    lowHz,
    highHz,
    points,
    of: parts.length === 2 ? 'complex' : 'magnitude',
    rms: Math.sqrt(squares / points),
    largest: Math.sqrt(largest),
    largestHz,
  };
}

function partsOf(
  first: Sweep,
  second: Sweep,
): readonly (readonly [mine: Float64Array, theirs: Float64Array])[] {
  if (first.phase === 'signed' && second.phase === 'signed') {
    return [
      [first.reflectionRe, second.reflectionRe],
      [first.reflectionIm, second.reflectionIm],
    ];
  }
  return [[reflectionMagnitude(first), reflectionMagnitude(second)]];
}

function valueAt(
  frequencyHz: Float64Array,
  values: Float64Array,
  upper: number,
  at: number,
): number {
  if (frequencyHz.length === 1) return values[0];
  const share = (at - frequencyHz[upper - 1]) / (frequencyHz[upper] - frequencyHz[upper - 1]);
  return values[upper - 1] + share * (values[upper] - values[upper - 1]);
}

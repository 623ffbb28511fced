/** A parabola by the orthogonal polynomials 1, t and t² - mean of t², t from the block's middle. */
export interface Parabola {
  readonly level: number;
  readonly slope: number;
  readonly bend: number;
  readonly meanSquare: number;
  /** Sum of the squared residuals. */
  readonly squaresLeft: number;
}

/** The least-squares parabola through evenly spaced values, the last place left out. */
export function parabolaThrough(values: Float64Array, from: number, to: number): Parabola {
  const count = to - from;
  const meanSquare = (count * count - 1) / 12;
  let level = 0;
  for (let i = from; i < to; i++) level += values[i];
  level /= count;
  let first = 0;
  let second = 0;
  let squares = 0;
  for (let i = from; i < to; i++) {
    const t = i - from - (count - 1) / 2;
    const value = values[i] - level;
    first += t * value;
    second += (t * t - meanSquare) * value;
    squares += value * value;
  }
  const firstNorm = count * meanSquare;
  const secondNorm = (count * (count * count - 1) * (count * count - 4)) / 180;
  return {
    level,
    slope: first / firstNorm,
    bend: second / secondNorm,
    meanSquare,
    squaresLeft: Math.max(0, squares - first ** 2 / firstNorm - second ** 2 / secondNorm),
  };
}

/** Its value at a place counted from the middle. */
export function parabolaAt({ level, slope, bend, meanSquare }: Parabola, t: number): number {
  return level + slope * t + bend * (t * t - meanSquare);
}

/**
 * The zero of a function between two frequencies, ascending, at which it has different signs, by
 * bisection with a secant first (C. J. F. Ridders, IEEE Trans. Circuits and Systems 26(11), 1979). To the last
 * bits; `low` itself where the signs do not differ.
 */
export function zeroBetween(value: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  let fa = value(a);
  let fb = value(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) return Math.abs(fa) <= Math.abs(fb) ? a : b;
  for (let i = 0; i < 60; i++) {
    const middle = 0.5 * (a + b);
    if (middle === a || middle === b) break;
    const fm = value(middle);
    if (fm === 0) return middle;
    // Over the largest of them, so that no square is too large or small to be held.
    const size = Math.max(Math.abs(fa), Math.abs(fb), Math.abs(fm));
    const root = Math.sqrt((fm / size) ** 2 - (fa / size) * (fb / size));
    const secant = middle + (middle - a) * ((fa > fb ? 1 : -1) * (fm / size / root));
    const x = secant > a && secant < b ? secant : middle;
    const fx = value(x);
    if (fx === 0) return x;
    const [nextLow, nextHigh] = tightest([a, fa], [middle, fm], [x, fx], [b, fb]);
    if (nextHigh[0] - nextLow[0] >= b - a) break;
    [a, fa] = nextLow;
    [b, fb] = nextHigh;
    if (b - a <= 4e-16 * Math.abs(b)) break;
  }
  return Math.abs(fa) <= Math.abs(fb) ? a : b;
}

type Point = readonly [x: number, value: number];

/** The narrowest neighbours with different signs among four points of which the ends differ. */
function tightest(low: Point, first: Point, second: Point, high: Point): [Point, Point] {
  const inner = first[0] <= second[0] ? [first, second] : [second, first];
  if (low[1] > 0 !== inner[0][1] > 0) return [low, inner[0]];
  if (inner[0][1] > 0 !== inner[1][1] > 0) return [inner[0], inner[1]];
  return [inner[1], high];
}

const EULER_GAMMA = 0.577_215_664_901_532_9;
const SERIES_LIMIT = 4;
const TOLERANCE = 1e-16;

/** The sine and cosine integrals of one argument. */
export interface SineIntegrals {
  readonly si: number;
  readonly ci: number;
}

/**
 * Si(x) and Ci(x) for x > 0, to about 1e-14 absolute.
 * Power series up to x = 4 (DLMF 6.6.5, 6.6.6), above it the continued fraction of E1(jx)
 * (DLMF 6.9.1 contracted to its even part), as Ci(x) = -Re E1(jx) and Si(x) = pi/2 + Im E1(jx)
 * (DLMF 6.5.5, 6.5.6). Throws RangeError where x is not positive and finite.
 */
export function sineIntegrals(x: number): SineIntegrals {
  if (!(x > 0) || !Number.isFinite(x)) {
    throw new RangeError(`Si and Ci need a positive finite argument; got ${x}.`);
  }
  return x <= SERIES_LIMIT ? bySeries(x) : byContinuedFraction(x);
}

function bySeries(x: number): SineIntegrals {
  const negativeSquare = -x * x;
  let si = 0;
  let cosineSum = 0;
  let power = x; // x^n/n! with alternating sign by pairs
  for (let n = 1; ; n += 2) {
    si += power / n;
    const even = (power * negativeSquare) / (x * (n + 1));
    cosineSum += even / (n + 1);
    if (Math.abs(power) < TOLERANCE) break;
    power = (even * x) / (n + 2);
  }
  return { si, ci: EULER_GAMMA + Math.log(x) + cosineSum };
}

/**
 * E1(z) = e^-z / (z + 1 - 1/(z + 3 - 4/(z + 5 - 9/(...)))) at z = jx, evaluated backwards from a
 * depth at which the tail no longer shows (it converges like exp(-4 sqrt(2 n x) cos(pi/4))).
 */
function byContinuedFraction(x: number): SineIntegrals {
  const depth = Math.ceil(260 / x) + 8;
  let re = 2 * depth + 1;
  let im = x;
  for (let n = depth; n >= 1; n--) {
    const scale = (n * n) / (re * re + im * im);
    const nextRe = 2 * n - 1 - scale * re;
    im = x + scale * im;
    re = nextRe;
  }
  const scale = 1 / (re * re + im * im);
  const cos = Math.cos(x);
  const sin = Math.sin(x);
  // e^-jx / (re + j im)
  const e1Re = scale * (cos * re - sin * im);
  const e1Im = scale * (-sin * re - cos * im);
  return { si: Math.PI / 2 + e1Im, ci: -e1Re };
}

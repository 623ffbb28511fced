/**
 * Distribution functions and quantiles that the statistics need. Series and continued fractions
 * from Abramowitz and Stegun, Handbook of Mathematical Functions (1964): 6.1.41 (log gamma),
 * 26.5.8 (incomplete beta), 26.7.1 (Student), 26.6.2 (F).
 */

const relativeTolerance = 1e-16;
const largestTermCount = 2000;

/** ln Γ(x) for x > 0: Stirling's series after shifting x above 15, where eight terms reach 1e-16. */
export function logGamma(x: number): number {
  let shifted = x;
  let shift = 0;
  while (shifted < 15) {
    shift += Math.log(shifted);
    shifted += 1;
  }
  const inverse = 1 / shifted;
  const square = inverse * inverse;
  const series =
    inverse *
    (1 / 12 -
      square *
        (1 / 360 -
          square *
            (1 / 1260 - square * (1 / 1680 - square * (1 / 1188 - square * (691 / 360_360))))));
  return (
    (shifted - 0.5) * Math.log(shifted) - shifted + 0.5 * Math.log(2 * Math.PI) + series - shift
  );
}

/** The regularised incomplete beta function I_x(a, b) for a, b > 0 and 0 <= x <= 1. */
export function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  // The fraction converges fast only below the mean; above it the symmetric one does.
  if (x > (a + 1) / (a + b + 2)) return 1 - incompleteBeta(1 - x, b, a);
  const front = Math.exp(
    logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x),
  );
  return (front * betaFraction(x, a, b)) / a;
}

/** The continued fraction of 26.5.8, summed by Lentz's method. */
function betaFraction(x: number, a: number, b: number): number {
  let c = 1;
  let d = 1 / notZero(1 - ((a + b) * x) / (a + 1));
  let fraction = d;
  for (let m = 1; m <= largestTermCount; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / notZero(1 + even * d);
    c = notZero(1 + even / c);
    fraction *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / notZero(1 + odd * d);
    c = notZero(1 + odd / c);
    const step = d * c;
    fraction *= step;
    if (Math.abs(step - 1) < relativeTolerance) break;
  }
  return fraction;
}

function notZero(value: number): number {
  return Math.abs(value) < 1e-300 ? 1e-300 : value;
}

/** P(T <= t) of Student's distribution. */
export function studentCdf(t: number, degrees: number): number {
  const upper = 0.5 * incompleteBeta(degrees / (degrees + t * t), degrees / 2, 0.5);
  return t > 0 ? 1 - upper : upper;
}

/** The t with P(T <= t) = probability, for 0 < probability < 1. */
export function studentQuantile(probability: number, degrees: number): number {
  if (probability === 0.5) return 0;
  if (probability < 0.5) return -studentQuantile(1 - probability, degrees);
  const tail = 1 - probability;
  const upperTail = (t: number) =>
    0.5 * incompleteBeta(degrees / (degrees + t * t), degrees / 2, 0.5);
  return solveFalling((t) => upperTail(t) - tail);
}

/** P(F <= f) of the F distribution. */
export function fisherCdf(f: number, numerator: number, denominator: number): number {
  if (f <= 0) return 0;
  return incompleteBeta(
    (numerator * f) / (numerator * f + denominator),
    numerator / 2,
    denominator / 2,
  );
}

/** The f with P(F > f) = tail, for 0 < tail < 1. */
export function fisherUpperQuantile(tail: number, numerator: number, denominator: number): number {
  const upperTail = (f: number) =>
    incompleteBeta(denominator / (numerator * f + denominator), denominator / 2, numerator / 2);
  return solveFalling((f) => upperTail(f) - tail);
}

/** P(N <= z) of the standard normal distribution. */
export function normalCdf(z: number): number {
  return z < 0
    ? 0.5 * complementaryError(-z / Math.SQRT2)
    : 1 - 0.5 * complementaryError(z / Math.SQRT2);
}

/** The z with P(N <= z) = probability, for 0 < probability < 1. */
export function normalQuantile(probability: number): number {
  if (probability === 0.5) return 0;
  if (probability < 0.5) return -normalQuantile(1 - probability);
  const tail = 1 - probability;
  return solveFalling((z) => 0.5 * complementaryError(z / Math.SQRT2) - tail);
}

/** erfc(x) for x >= 0: the series 7.1.6 below 2.5, the continued fraction 7.1.14 above. */
function complementaryError(x: number): number {
  if (x < 2.5) {
    let term = x;
    let sum = x;
    for (let n = 1; Math.abs(term) > relativeTolerance * sum; n++) {
      term *= (2 * x * x) / (2 * n + 1);
      sum += term;
    }
    return 1 - (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
  }
  let tail = 0;
  for (let n = 120; n >= 1; n--) tail = n / 2 / (x + tail);
  return Math.exp(-x * x) / (Math.sqrt(Math.PI) * (x + tail));
}

/** The positive zero of a falling function, by bracketing and bisection to the last bit. */
function solveFalling(excess: (x: number) => number): number {
  let low = 0;
  let high = 1;
  while (excess(high) > 0) {
    low = high;
    high *= 2;
  }
  for (let i = 0; i < 200; i++) {
    const middle = 0.5 * (low + high);
    if (middle === low || middle === high) break;
    if (excess(middle) > 0) low = middle;
    else high = middle;
  }
  return 0.5 * (low + high);
}

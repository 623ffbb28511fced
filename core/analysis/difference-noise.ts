/** Coefficients of the fourth difference: what is smooth over five points falls out of it. */
const fourth = [1, -4, 6, -4, 1];
const fourthNorm = Math.sqrt(70);
/** Differences looked at, evenly taken from all. */
const mostLookedAt = 1024;
/** Mean size of the smaller nine tenths of standard normal numbers. */
const meanOfSmaller = 0.657_24;

/**
 * Standard deviation of one number of a sampled curve, from fourth differences; the largest tenth,
 * where the curve itself may be sharp, is left out. At least the curve's own share at most points,
 * so that it is an upper bound for a curve that is sharp everywhere. Zero below six points.
 */
export function differenceNoise(re: Float64Array, im: Float64Array): number {
  const places = re.length - 4;
  if (places < 2) return 0;
  const stride = Math.max(1, Math.floor(places / mostLookedAt));
  const sizes = new Float64Array(2 * Math.ceil(places / stride));
  let count = 0;
  for (let i = 0; i < places; i += stride) {
    sizes[count] = Math.abs(fourthDifference(re, i));
    sizes[count + 1] = Math.abs(fourthDifference(im, i));
    count += 2;
  }
  const kept = Math.max(1, Math.floor(0.9 * count));
  sizes.sort();
  let sum = 0;
  for (let i = 0; i < kept; i++) sum += sizes[i];
  return sum / kept / meanOfSmaller / fourthNorm;
}

function fourthDifference(values: Float64Array, at: number): number {
  let sum = 0;
  for (let k = 0; k < 5; k++) sum += fourth[k] * values[at + k];
  return sum;
}

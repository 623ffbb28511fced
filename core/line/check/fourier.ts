/**
 * In-place inverse discrete Fourier transform without the factor 1/N: x[m] = sum X[n] e^(+j 2 pi n m/N),
 * radix 2 by decimation in time (J. W. Cooley and J. W. Tukey, Math. Comp. 19 (1965) 297-301).
 * Both arrays have the same length, a power of two; RangeError otherwise.
 */
export function inverseTransform(re: Float64Array, im: Float64Array): void {
  const size = re.length;
  if (size === 0 || (size & (size - 1)) !== 0 || im.length !== size) {
    throw new RangeError(`The transform needs two arrays of one power of two; got ${size}.`);
  }
  bitReverse(re, im);
  for (let half = 1; half < size; half *= 2) {
    const angle = Math.PI / half;
    for (let k = 0; k < half; k++) {
      const wr = Math.cos(angle * k);
      const wi = Math.sin(angle * k);
      for (let upper = k; upper < size; upper += 2 * half) {
        const lower = upper + half;
        const tr = re[lower] * wr - im[lower] * wi;
        const ti = re[lower] * wi + im[lower] * wr;
        re[lower] = re[upper] - tr;
        im[lower] = im[upper] - ti;
        re[upper] += tr;
        im[upper] += ti;
      }
    }
  }
}

function bitReverse(re: Float64Array, im: Float64Array): void {
  const size = re.length;
  let reversed = 0;
  for (let i = 1; i < size; i++) {
    let bit = size >> 1;
    while ((reversed & bit) !== 0) {
      reversed ^= bit;
      bit >>= 1;
    }
    reversed |= bit;
    if (i < reversed) {
      [re[i], re[reversed]] = [re[reversed], re[i]];
      [im[i], im[reversed]] = [im[reversed], im[i]];
    }
  }
}

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { inverseTransform } from '../../../../core/line/check/fourier.ts';

describe('the fast inverse transform', () => {
  it('equals the sum it stands for', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 7 }).chain((power) =>
          fc.array(fc.double({ min: -1, max: 1, noNaN: true }), {
            minLength: 2 ** (power + 1),
            maxLength: 2 ** (power + 1),
          }),
        ),
        (values) => {
          const size = values.length / 2;
          const re = Float64Array.from(values.slice(0, size));
          const im = Float64Array.from(values.slice(size));
          const [fastRe, fastIm] = [re.slice(), im.slice()];
          inverseTransform(fastRe, fastIm);
          for (let m = 0; m < size; m++) {
            let [sumRe, sumIm] = [0, 0];
            for (let n = 0; n < size; n++) {
              const angle = (2 * Math.PI * n * m) / size;
              sumRe += re[n] * Math.cos(angle) - im[n] * Math.sin(angle);
              sumIm += re[n] * Math.sin(angle) + im[n] * Math.cos(angle);
            }
            expect(Math.abs(fastRe[m] - sumRe)).toBeLessThan(1e-11);
            expect(Math.abs(fastIm[m] - sumIm)).toBeLessThan(1e-11);
          }
        },
      ),
      { numRuns: 60 },
    );
  });

  it.each([0, 3, 12])('refuses a length of %d, which is no power of two', (size) => {
    expect(() => inverseTransform(new Float64Array(size), new Float64Array(size))).toThrow(
      RangeError,
    );
  });

  it('refuses parts of unlike length', () => {
    expect(() => inverseTransform(new Float64Array(4), new Float64Array(8))).toThrow(RangeError);
  });
});

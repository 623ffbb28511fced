import { describe, expect, it } from 'vitest';
import { zeroBetween } from '../../../core/analysis/zero.ts';

describe('the zero between two places of different sign', () => {
  it('is found to the last digits', () => {
    expect(zeroBetween((x) => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 15);
    expect(zeroBetween((x) => Math.cos(x), 1, 2)).toBeCloseTo(Math.PI / 2, 15);
  });

  it('is an end where the function is zero there', () => {
    expect(zeroBetween((x) => x - 1, 1, 2)).toBe(1);
    expect(zeroBetween((x) => x - 2, 1, 2)).toBe(2);
    expect(zeroBetween((x) => x - 1.5, 1, 2)).toBe(1.5);
  });

  it('is the end that is nearer to zero where the signs do not differ', () => {
    expect(zeroBetween((x) => x, 1, 2)).toBe(1);
    expect(zeroBetween((x) => -x, -2, -1)).toBe(-1);
  });

  it('is where the function jumps, if it jumps', () => {
    expect(zeroBetween((x) => (x < 1.25 ? -1 : 3), 1, 2)).toBeCloseTo(1.25, 12);
  });

  it('is found for values that cannot be squared', () => {
    expect(zeroBetween((x) => 1e-200 * (x - 1.25), 1, 2)).toBeCloseTo(1.25, 12);
    expect(zeroBetween((x) => 1e200 * (x - 1.25), 1, 2)).toBeCloseTo(1.25, 12);
  });
});

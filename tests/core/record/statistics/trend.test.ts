import { describe, expect, it } from 'vitest';
import {
  mannKendall,
  mannKendallVariance,
} from '../../../../core/record/statistics/mann-kendall.ts';
import { median, robustScale } from '../../../../core/record/statistics/robust.ts';
import { theilSen } from '../../../../core/record/statistics/theil-sen.ts';

describe('the Theil-Sen trend', () => {
  // P. K. Sen, JASA 63 (1968) 1379-1389, worked example: slope 4, interval (3.71, 4.38).
  const x = [1, 2, 3, 4, 10, 12, 18];
  const y = [9, 15, 19, 20, 45, 55, 78];

  it("repeats Sen's worked example", () => {
    const trend = theilSen(x, y, 0.93);
    expect(trend?.slope).toBe(4);
    expect(trend?.intercept).toBe(4);
    expect(trend?.slopeLow).toBeCloseTo(26 / 7, 12);
    expect(trend?.slopeHigh).toBeCloseTo(35 / 8, 12);
  });

  it('is not moved by one wild value', () => {
    const months = Array.from({ length: 12 }, (_, i) => i);
    const drift = [
      7.101, 7.098, 7.099, 7.095, 7.096, 7.092, 7.094, 7.09, 7.091, 7.088, 7.088, 7.085,
    ];
    const calm = theilSen(months, drift);
    expect(calm?.slope).toBeCloseTo(-0.00131666666666667, 14);
    expect(calm?.slopeLow).toBeCloseTo(-0.00155555555556, 13);
    expect(calm?.slopeHigh).toBeCloseTo(-0.001, 13);
    const wild = theilSen(months, drift.with(5, 7.15));
    expect(wild?.slope).toBeCloseTo(-0.00133333333333333, 14);
  });

  it('has no interval from three points, and no slope where all times are one', () => {
    expect(theilSen([1, 2, 3], [1, 2, 4])).toMatchObject({ slopeLow: null, slopeHigh: null });
    expect(theilSen([5, 5], [1, 2])).toBeNull();
  });
});

describe('the Mann-Kendall test', () => {
  it.each([
    // R. O. Gilbert (1987), table of S for n = 4, one-sided 0.167: value from memory, recomputed.
    [[10, 15, 14, 20], 4, 2 / 6],
    [[9, 15, 19, 20, 45, 55, 78], 21, 2 * 0.0001984126984126984],
  ])('counts small samples out exactly', (values, s, probability) => {
    const test = mannKendall(values);
    expect(test.s).toBe(s);
    expect(test.probability).toBeCloseTo(probability, 13);
  });

  it('takes ties from the variance', () => {
    const values = [23, 24, 29, 6, 29, 24, 24, 29, 23];
    expect(mannKendallVariance(values)).toBeCloseTo(83.6666666667, 9);
    const test = mannKendall(values);
    expect(test.s).toBe(3);
    expect(test.z).toBeCloseTo(0.218652155124, 11);
    expect(test.probability).toBeCloseTo(0.826921021757, 11);
  });

  it('finds the drift of a year', () => {
    const test = mannKendall([
      7.101, 7.098, 7.099, 7.095, 7.096, 7.092, 7.094, 7.09, 7.091, 7.088, 7.088, 7.085,
    ]);
    expect(test.s).toBe(-57);
    expect(test.z).toBeCloseTo(-3.84912302109, 10);
  });

  it('sees no trend where nothing changes', () => {
    expect(mannKendall([5, 5, 5, 5])).toEqual({ s: 0, z: 0, probability: 1 });
  });
});

describe('robust location and scale', () => {
  it('are not moved by one wild value', () => {
    const values = [7.05, 7.06, 7.04, 7.05, 7.07, 7.06, 7.9];
    expect(median(values)).toBe(7.06);
    expect(robustScale(values)).toBeCloseTo(0.014826022185056, 13);
  });

  it('take the mean of the middle two of an even number, and know nothing of nothing', () => {
    expect(median([4, 1, 3, 2])).toBe(2.5);
    expect(median([])).toBeNaN();
  });
});

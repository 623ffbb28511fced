import { describe, expect, it } from 'vitest';
import {
  fisherCdf,
  fisherUpperQuantile,
  incompleteBeta,
  logGamma,
  normalCdf,
  normalQuantile,
  studentCdf,
  studentQuantile,
} from '../../../../core/record/statistics/distributions.ts';

// Tables of the t and F distributions as printed in statistics handbooks: values from memory.
describe("Student's distribution", () => {
  it.each([
    [0.975, 1, 12.706],
    [0.975, 5, 2.571],
    [0.995, 10, 3.169],
    [0.95, 30, 1.697],
  ])('has the tabulated quantile at %d with %d degrees of freedom', (p, degrees, t) => {
    expect(studentQuantile(p, degrees)).toBeCloseTo(t, 3);
  });

  it('has the 97.5 % quantile at 16 degrees that the Bland-Altman example uses', () => {
    // J. M. Bland, D. G. Altman, Lancet 327 (1986) 307-310; recomputed value.
    expect(studentQuantile(0.975, 16)).toBeCloseTo(2.11990529922125, 12);
  });

  it('is odd, and its quantile undoes it', () => {
    expect(studentQuantile(0.2, 7)).toBe(-studentQuantile(0.8, 7));
    expect(studentQuantile(0.5, 7)).toBe(0);
    expect(studentCdf(studentQuantile(0.9, 4), 4)).toBeCloseTo(0.9, 14);
    expect(studentCdf(-1.3, 9) + studentCdf(1.3, 9)).toBeCloseTo(1, 14);
  });

  it('with one degree of freedom is the Cauchy distribution', () => {
    expect(studentCdf(2, 1)).toBeCloseTo(0.5 + Math.atan(2) / Math.PI, 14);
  });
});

describe('the F distribution', () => {
  it.each([
    [0.05, 2, 10, 4.103],
    [0.01, 4, 20, 4.431],
    [0.05, 1, 46, 4.052],
  ])('has the tabulated upper quantile at %d', (tail, numerator, denominator, f) => {
    expect(fisherUpperQuantile(tail, numerator, denominator)).toBeCloseTo(f, 3);
  });

  it("gives the probabilities of NIST's one-way sets", () => {
    // NIST StRD: SiRstv and AtmWtAg, certified F statistics; probabilities recomputed.
    expect(1 - fisherCdf(1.18046237440255, 4, 20)).toBeCloseTo(0.34944749340219355, 13);
    expect(1 - fisherCdf(15.946733567793, 1, 46)).toBeCloseTo(0.00023268444833892838, 14);
  });

  it('has nothing below zero', () => {
    expect(fisherCdf(0, 3, 3)).toBe(0);
  });
});

describe('the normal distribution', () => {
  it('has the usual quantiles', () => {
    // Any table of the normal distribution; digits from memory.
    expect(normalQuantile(0.975)).toBeCloseTo(1.959963984540054, 13);
    expect(normalQuantile(0.75)).toBeCloseTo(1 / 1.482602218505602, 13);
    expect(normalQuantile(0.5)).toBe(0);
    expect(normalQuantile(0.025)).toBe(-normalQuantile(0.975));
  });

  it('is right in both tails, near and far', () => {
    expect(normalCdf(0)).toBe(0.5);
    expect(normalCdf(-1)).toBeCloseTo(0.15865525393145707, 14);
    expect(normalCdf(-6) / 9.865876450376946e-10).toBeCloseTo(1, 10);
    expect(normalCdf(1.3) + normalCdf(-1.3)).toBeCloseTo(1, 15);
  });
});

describe('the functions beneath', () => {
  it('take factorials and half-integers from log gamma', () => {
    expect(Math.exp(logGamma(6))).toBeCloseTo(120, 10);
    expect(Math.exp(logGamma(0.5)) ** 2).toBeCloseTo(Math.PI, 12);
  });

  it('keep the incomplete beta function between 0 and 1 and symmetric', () => {
    expect(incompleteBeta(0, 2, 3)).toBe(0);
    expect(incompleteBeta(1, 2, 3)).toBe(1);
    expect(incompleteBeta(0.3, 2, 3) + incompleteBeta(0.7, 3, 2)).toBeCloseTo(1, 14);
    // Polynomial for whole numbers: I_x(2, 3) = 6x² - 8x³ + 3x⁴.
    expect(incompleteBeta(0.3, 2, 3)).toBeCloseTo(6 * 0.09 - 8 * 0.027 + 3 * 0.0081, 14);
  });
});

import { describe, expect, it } from 'vitest';
import {
  magnitudeOfReturnLoss,
  mismatchLossDb,
  returnLossDb,
  sweepReturnLossDb,
} from '../../../core/network/return-loss.ts';
import { magnitudeOfSwr, sweepSwr, swrOf } from '../../../core/network/swr.ts';
import type { ScalarSweep } from '../../../core/sweep.ts';

const sweep: ScalarSweep = {
  phase: 'none',
  frequencyHz: Float64Array.of(1, 2, 3, 4),
  referenceOhm: 50,
  reflectionMagnitude: Float64Array.of(0, 0.5, 1, 1.1),
};

describe('SWR', () => {
  it('is one at a match', () => {
    expect(swrOf(0)).toBe(1);
  });

  it.each([1, 1.000001, 5, Number.NaN])('does not exist at a magnitude of %d', (magnitude) => {
    expect(swrOf(magnitude)).toBeNull();
  });

  it('gives the magnitude back', () => {
    for (const magnitude of [0, 0.1, 1 / 3, 0.9]) {
      expect(magnitudeOfSwr(swrOf(magnitude) ?? Number.NaN)).toBeCloseTo(magnitude, 14);
    }
    expect(magnitudeOfSwr(Number.POSITIVE_INFINITY)).toBe(1);
  });

  it.each([0.99, 0, -3, Number.NaN])('is never %d', (swr) => {
    expect(magnitudeOfSwr(swr)).toBeNull();
  });

  it('of a sweep is NaN where all or more comes back', () => {
    expect([...sweepSwr(sweep)]).toEqual([1, 3, Number.NaN, Number.NaN]);
  });
});

describe('return loss', () => {
  it('is positive for a passive load, zero for a total reflection, negative for an active one', () => {
    expect(returnLossDb(0.1)).toBeCloseTo(20, 12);
    expect(returnLossDb(1)).toBeCloseTo(0, 15);
    expect(returnLossDb(10)).toBeCloseTo(-20, 12);
  });

  it('is not a number at a perfect match', () => {
    expect(returnLossDb(0)).toBeNull();
    expect(returnLossDb(Number.NaN)).toBeNull();
  });

  it('gives the magnitude back', () => {
    expect(magnitudeOfReturnLoss(20)).toBeCloseTo(0.1, 15);
    expect(magnitudeOfReturnLoss(0)).toBe(1);
  });

  it('of a sweep is NaN at a perfect match', () => {
    const [match, half, total, above] = sweepReturnLossDb(sweep);
    expect(match).toBeNaN();
    expect(half).toBeCloseTo(6.020599913, 9);
    expect(total).toBeCloseTo(0, 15);
    expect(above).toBeLessThan(0);
  });
});

describe('mismatch loss', () => {
  it('is none at a match and does not exist at a total reflection', () => {
    expect(mismatchLossDb(0)).toBeCloseTo(0, 15);
    expect(mismatchLossDb(1)).toBeNull();
    expect(mismatchLossDb(Number.NaN)).toBeNull();
  });
});

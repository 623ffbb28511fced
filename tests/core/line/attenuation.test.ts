import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { attenuationDbPer100M, fitAttenuation } from '../../../core/line/attenuation.ts';
import { fitCable } from '../../../core/line/cable.ts';
import { accepted, refusalOf } from './builders.ts';

const point = (mhz: number, lossDbPer100M: number) => ({ frequencyHz: mhz * 1e6, lossDbPer100M });

describe('the loss of a cable from a few points', () => {
  it('is found exactly where the points follow k1 sqrt(f) + k2 f', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 5, noNaN: true }),
        fc.double({ min: 0, max: 0.1, noNaN: true }),
        (k1, k2) => {
          const points = [3, 14, 50, 144, 440].map((mhz) =>
            point(mhz, k1 * Math.sqrt(mhz) + k2 * mhz),
          );
          const fit = accepted(fitAttenuation(points));
          expect(fit.conductorDbPer100M).toBeCloseTo(k1, 8);
          expect(fit.dielectricDbPer100M).toBeCloseTo(k2, 9);
          expect(fit.residualLargest).toBeLessThan(1e-9);
        },
      ),
    );
  });

  it('has no residual to judge by when only two points are given', () => {
    const fit = accepted(fitAttenuation([point(30, 8.1), point(150, 18.5)]));
    expect(fit.residualRms).toBeNull();
    expect(fit.residualLargest).toBeNull();
    expect(attenuationDbPer100M(fit, 30e6)).toBeCloseTo(8.1, 10);
  });

  it('keeps a constant from falling below zero and says how far off the points then lie', () => {
    // rises slower than sqrt(f): the dielectric part would be negative
    const slow = accepted(fitAttenuation([point(10, 4.4), point(20, 6), point(40, 8)]));
    expect(slow.dielectricDbPer100M).toBe(0);
    expect(slow.residualLargest).toBeGreaterThan(0.01);
    // rises faster than f: the conductor part would be negative
    const fast = accepted(fitAttenuation([point(10, 1), point(20, 2.1), point(40, 4.3)]));
    expect(fast.conductorDbPer100M).toBe(0);
    expect(fast.residualLargest).toBeGreaterThan(0.01);
    const two = accepted(fitAttenuation([point(10, 4), point(40, 7.9)]));
    expect(two.residualRms).toBeGreaterThan(0);
  });

  it('keeps the span of the points, outside which it is a guess', () => {
    const fit = accepted(fitAttenuation([point(150, 18.5), point(30, 8.1)]));
    expect([fit.lowHz, fit.highHz]).toEqual([30e6, 150e6]);
  });
});

describe('nonsense as the loss of a cable', () => {
  it.each([
    ['cable_points_too_few', []],
    ['cable_points_too_few', [point(10, 1), point(10, 1.01)]],
    ['cable_points_too_many', Array.from({ length: 1001 }, (_, i) => point(i + 1, i + 1))],
    ['cable_point_not_positive', [point(10, -1), point(20, 2)]],
    ['cable_point_not_positive', [point(10, 1), point(0, 2)]],
    ['cable_point_not_positive', [point(10, Number.NaN), point(20, 2)]],
    ['cable_point_not_positive', [point(10, 1), point(20, Number.POSITIVE_INFINITY)]],
    ['cable_loss_not_rising', [point(10, 3), point(20, 2.8)]],
    ['cable_fit_poor', [point(10, 1), point(20, 1.1), point(40, 8)]],
  ])('is refused as %s', (code, points) => {
    expect(refusalOf(fitAttenuation(points))).toBe(code);
  });

  it('is a falling loss only beyond what rounding of printed tables explains', () => {
    expect(fitAttenuation([point(10, 3), point(11, 2.95), point(20, 4.2)]).ok).toBe(true);
  });

  it('is named by the index of the point in the given order', () => {
    const result = fitAttenuation([point(20, 2.8), point(30, 5), point(10, 4)]);
    expect(result).toMatchObject({ ok: false, error: { index: 0 } });
  });
});

describe("a club's own cable", () => {
  const stated = {
    id: 'attic-coax',
    name: 'Attic coax',
    characteristicOhm: 75,
    velocityFactor: 0.8,
    points: [point(10, 2), point(100, 6.5)],
  };

  it('carries assumed half-widths where none is stated', () => {
    const cable = accepted(fitCable(stated));
    expect(cable.characteristicU95Ohm).toBeCloseTo(3, 12);
    expect(cable.velocityFactorU95).toBeCloseTo(0.016, 12);
    expect(cable.lossU95Fraction).toBe(0.15);
  });

  it('keeps stated half-widths', () => {
    const cable = accepted(
      fitCable({
        ...stated,
        characteristicU95Ohm: 1,
        velocityFactorU95: 0.005,
        lossU95Fraction: 0.05,
      }),
    );
    expect(cable).toMatchObject({
      characteristicU95Ohm: 1,
      velocityFactorU95: 0.005,
      lossU95Fraction: 0.05,
    });
  });

  it('gets a wider loss where its points scatter', () => {
    const scattered = [point(10, 2), point(30, 4.2), point(50, 4.2), point(100, 7)];
    expect(accepted(fitCable({ ...stated, points: scattered })).lossU95Fraction).toBeGreaterThan(
      0.15,
    );
  });

  it.each([
    ['cable_impedance_out_of_range', { characteristicOhm: 0 }],
    ['cable_impedance_out_of_range', { characteristicOhm: Number.NaN }],
    ['cable_velocity_factor_out_of_range', { velocityFactor: 1.2 }],
    ['cable_half_width_negative', { lossU95Fraction: -0.1 }],
    ['cable_points_too_few', { points: [] }],
  ])('is refused as %s', (code, change) => {
    expect(refusalOf(fitCable({ ...stated, ...change }))).toBe(code);
  });
});

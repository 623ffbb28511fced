import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  impedanceOf,
  reflectionOf,
  reflectionsOf,
  sweepImpedances,
} from '../../../core/network/impedance.ts';
import type { ComplexSweep } from '../../../core/sweep.ts';

describe('the impedance behind a reflection', () => {
  it('is the reference where nothing is reflected', () => {
    expect(impedanceOf({ re: 0, im: 0 }, 75)).toEqual({ resistanceOhm: 75, reactanceOhm: 0 });
  });

  it('is zero at a short, and none at an open', () => {
    expect(impedanceOf({ re: -1, im: 0 }, 50)).toEqual({ resistanceOhm: 0, reactanceOhm: 0 });
    expect(impedanceOf({ re: 1, im: 0 }, 50)).toBeNull();
  });

  it('is inductive above the real axis and capacitive below', () => {
    expect(impedanceOf({ re: 0, im: 0.5 }, 50)?.reactanceOhm).toBeCloseTo(40, 12);
    expect(impedanceOf({ re: 0, im: -0.5 }, 50)?.reactanceOhm).toBeCloseTo(-40, 12);
  });

  it('has a negative resistance where more comes back than went', () => {
    expect(impedanceOf({ re: -1.5, im: 0 }, 50)?.resistanceOhm).toBeCloseTo(-10, 12);
  });
});

describe('the reflection of an impedance', () => {
  it.each([
    [0, 0, -1, 0],
    [50, 0, 0, 0],
    [Number.POSITIVE_INFINITY, 0, 1, 0],
    [0, Number.NEGATIVE_INFINITY, 1, 0],
    [1e200, 1e200, 1, 0],
    [0, 50, 0, 1],
    [0, -50, 0, -1],
  ])('of %d + j%d ohm is %d + j%d at 50 ohm', (resistanceOhm, reactanceOhm, re, im) => {
    expect(reflectionOf({ resistanceOhm, reactanceOhm }, 50)).toEqual({ re, im });
  });

  it('does not exist for the negative of the reference, nor for what is unknown', () => {
    expect(reflectionOf({ resistanceOhm: -50, reactanceOhm: 0 }, 50)).toBeNull();
    expect(reflectionOf({ resistanceOhm: Number.NaN, reactanceOhm: 0 }, 50)).toBeNull();
    expect(reflectionOf({ resistanceOhm: 1, reactanceOhm: Number.NaN }, 50)).toBeNull();
  });

  it('leads back to the impedance', () => {
    const ohms = fc.double({ min: 1e-2, max: 1e4, noNaN: true });
    const reactance = fc.double({ min: -1e4, max: 1e4, noNaN: true });
    fc.assert(
      fc.property(ohms, reactance, fc.double({ min: 5, max: 600, noNaN: true }), (r, x, z0) => {
        const reflection = reflectionOf({ resistanceOhm: r, reactanceOhm: x }, z0);
        if (reflection === null) throw new Error('a passive load has a reflection');
        expect(Math.hypot(reflection.re, reflection.im)).toBeLessThanOrEqual(1);
        const back = impedanceOf(reflection, z0);
        const scale = 1e-12 * ((r + z0) ** 2 + x ** 2) * (1 / z0);
        expect(Math.abs((back?.resistanceOhm ?? 0) - r)).toBeLessThan(scale);
        expect(Math.abs((back?.reactanceOhm ?? 0) - x)).toBeLessThan(scale);
      }),
    );
  });
});

describe('a sweep', () => {
  const sweep: ComplexSweep = {
    phase: 'signed',
    frequencyHz: Float64Array.of(1, 2, 3),
    referenceOhm: 50,
    reflectionRe: Float64Array.of(0.5, 1, 0),
    reflectionIm: Float64Array.of(0, 0, 0.5),
  };

  it('has its impedances, with none at an open', () => {
    const { resistanceOhm, reactanceOhm } = sweepImpedances(sweep);
    expect([...resistanceOhm]).toEqual([150, Number.NaN, 30]);
    expect([...reactanceOhm]).toEqual([0, Number.NaN, 40]);
  });

  it('of impedances has its reflections, with none where the impedance is unknown', () => {
    const resistanceOhm = Float64Array.of(150, Number.NaN, 30);
    const { reflectionRe, reflectionIm } = reflectionsOf(
      { resistanceOhm, reactanceOhm: Float64Array.of(0, 0, 40) },
      50,
    );
    expect([...reflectionRe]).toEqual([0.5, Number.NaN, expect.closeTo(0, 15)]);
    expect([...reflectionIm]).toEqual([0, Number.NaN, expect.closeTo(0.5, 15)]);
  });
});

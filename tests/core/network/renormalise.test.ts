import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { impedanceOf } from '../../../core/network/impedance.ts';
import { renormalise, renormaliseSweep } from '../../../core/network/renormalise.ts';
import type { ComplexSweep, Sweep } from '../../../core/sweep.ts';
import { withoutSign } from '../../support/make-sweep.ts';

const sweep: ComplexSweep = {
  phase: 'signed',
  frequencyHz: Float64Array.of(1, 2, 3),
  referenceOhm: 50,
  reflectionRe: Float64Array.of(0.2, -1, 0),
  reflectionIm: Float64Array.of(0.3, 0, -0.5),
};

describe('another reference', () => {
  it('leaves the impedance as it is', () => {
    const part = fc.double({ min: -0.7, max: 0.7, noNaN: true });
    const ohms = fc.double({ min: 10, max: 600, noNaN: true });
    fc.assert(
      fc.property(part, part, ohms, ohms, (re, im, from, to) => {
        const before = impedanceOf({ re, im }, from);
        const moved = renormalise({ re, im }, from, to);
        if (before === null || moved === null) throw new Error('a passive load has both');
        const after = impedanceOf(moved, to);
        const size = Math.hypot(before.resistanceOhm, before.reactanceOhm) + to + to * to;
        expect(after?.resistanceOhm).toBeCloseTo(before.resistanceOhm, 6);
        expect(Math.abs((after?.reactanceOhm ?? 0) - before.reactanceOhm)).toBeLessThan(
          1e-10 * size,
        );
      }),
    );
  });

  it('keeps opens and shorts where they are', () => {
    expect(renormalise({ re: 1, im: 0 }, 50, 75)?.re).toBeCloseTo(1, 15);
    expect(renormalise({ re: -1, im: 0 }, 50, 75)?.re).toBeCloseTo(-1, 15);
  });

  it('has no reflection for an impedance that is its negative', () => {
    // Γ = 2 at 50 ohm is -150 ohm.
    expect(renormalise({ re: 2, im: 0 }, 50, 150)).toBeNull();
  });
});

describe('a sweep against another reference', () => {
  it('is moved point by point', () => {
    const moved = renormaliseSweep(sweep, 75);
    if (moved.phase === 'none') throw new Error('the phase is kept');
    expect(moved.referenceOhm).toBe(75);
    for (let i = 0; i < 3; i++) {
      const point = { re: sweep.reflectionRe[i], im: sweep.reflectionIm[i] };
      expect({ re: moved.reflectionRe[i], im: moved.reflectionIm[i] }).toEqual(
        renormalise(point, 50, 75),
      );
    }
  });

  it('keeps the imaginary part of an unsigned phase at or above zero', () => {
    const moved = renormaliseSweep(withoutSign(sweep), 300);
    if (moved.phase === 'none') throw new Error('the phase is kept');
    expect(Math.min(...moved.reflectionIm)).toBeGreaterThanOrEqual(0);
  });

  it('is the same sweep if the reference is the same or the phase is unknown', () => {
    expect(renormaliseSweep(sweep, 50)).toBe(sweep);
    const scalar: Sweep = {
      phase: 'none',
      frequencyHz: Float64Array.of(1),
      referenceOhm: 50,
      reflectionMagnitude: Float64Array.of(0.5),
    };
    expect(renormaliseSweep(scalar, 75)).toBe(scalar);
  });
});

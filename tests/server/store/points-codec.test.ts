import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { packPoints, unpackPoints } from '../../../server/store/sqlite/points-codec.ts';

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });

describe('packed points', () => {
  it('come back bit for bit, whatever the numbers', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(finite, finite, finite), { minLength: 1 }), (rows) => {
        const points = {
          frequencyHz: Float64Array.from(rows, ([f]) => f),
          reflectionRe: Float64Array.from(rows, ([, re]) => re),
          reflectionIm: Float64Array.from(rows, ([, , im]) => im),
          reflectionMagnitude: null,
        };
        expect(unpackPoints(packPoints(points))).toEqual(points);
      }),
    );
  });

  it('keep the sign of a negative zero', () => {
    const points = {
      frequencyHz: Float64Array.of(1, 2),
      reflectionRe: null,
      reflectionIm: null,
      reflectionMagnitude: Float64Array.of(0, -0),
    };
    const [, zero] = unpackPoints(packPoints(points)).reflectionMagnitude ?? [];
    expect(Object.is(zero, -0)).toBe(true);
  });

  it('are small where numbers have few places, as in files', () => {
    const frequencyHz = Float64Array.from({ length: 401 }, (_, i) => 14_000_000 + 2500 * i);
    const reflectionRe = frequencyHz.map((f) => Number(Math.sin(f / 1e5).toFixed(5)));
    const reflectionIm = frequencyHz.map((f) => Number(Math.cos(f / 1e5).toFixed(5)));
    const packed = packPoints({
      frequencyHz,
      reflectionRe,
      reflectionIm,
      reflectionMagnitude: null,
    });
    expect(packed.length).toBeLessThan(401 * 9);
    expect(packed.length).toBeGreaterThan(401);
  });

  it('are told as corrupt when one bit is not as it was', () => {
    const points = {
      frequencyHz: Float64Array.of(14e6, 14.1e6, 14.2e6),
      reflectionRe: Float64Array.of(0.1, -0.25, 1 / 3),
      reflectionIm: Float64Array.of(-0.5, 0, 0.123456),
      reflectionMagnitude: null,
    };
    const packed = packPoints(points);
    expect(packed.length).toBeGreaterThan(20);
    for (let bit = 0; bit < 8 * packed.length; bit++) {
      const damaged = Uint8Array.from(packed);
      damaged[bit >> 3] ^= 1 << (bit & 7);
      expect(() => unpackPoints(damaged), `bit ${bit}`).toThrow(/not what was kept/);
    }
  });

  it('are told as corrupt also where they stand deflated', () => {
    const frequencyHz = Float64Array.from({ length: 101 }, (_, i) => 14_000_000 + 2500 * i);
    const reflectionMagnitude = frequencyHz.map((_, i) => (i % 10) / 100);
    const points = { frequencyHz, reflectionRe: null, reflectionIm: null, reflectionMagnitude };
    const packed = packPoints(points);
    expect(packed.length).toBeLessThan(101);
    expect(unpackPoints(packed)).toEqual(points);
    let told = 0;
    for (let bit = 0; bit < 8 * packed.length; bit++) {
      const damaged = Uint8Array.from(packed);
      damaged[bit >> 3] ^= 1 << (bit & 7);
      try {
        // The padding of the last block may differ and the points be whole.
        expect(unpackPoints(damaged), `bit ${bit}`).toEqual(points);
      } catch (error) {
        expect(error, `bit ${bit}`).toMatchObject({ kind: 'corrupt' });
        told += 1;
      }
    }
    expect(told).toBeGreaterThan(8 * (packed.length - 2));
  });

  it('that were cut off are told as corrupt', () => {
    const points = {
      frequencyHz: Float64Array.of(1, 2.5, 1e300),
      reflectionRe: null,
      reflectionIm: null,
      reflectionMagnitude: Float64Array.of(0.1, 0.2, 0.3),
    };
    const packed = packPoints(points);
    for (let length = 0; length < packed.length; length++) {
      expect(() => unpackPoints(packed.subarray(0, length))).toThrow(/not what was kept/);
    }
  });
});

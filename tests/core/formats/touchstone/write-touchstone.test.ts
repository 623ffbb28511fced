import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { writeTouchstone } from '../../../../core/formats/touchstone/write-touchstone.ts';
import { type ComplexSweep, makeSweep, type Sweep } from '../../../../core/sweep.ts';
import { taken } from './reading.ts';

function written(sweep: Sweep, comments: readonly string[] = []): string {
  const result = writeTouchstone(sweep, { comments });
  if (!result.ok) throw new Error(result.error.code);
  return result.value;
}

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });
const frequency = fc.double({ min: 0, noNaN: true, noDefaultInfinity: true });

const anySweep = fc
  .record({
    rows: fc.uniqueArray(fc.tuple(frequency, finite, finite), {
      minLength: 1,
      selector: ([f]) => f + 0,
    }),
    referenceOhm: fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
  })
  .map(({ rows, referenceOhm }): ComplexSweep => {
    const sorted = [...rows].sort(([a], [b]) => a - b);
    return {
      phase: 'signed',
      frequencyHz: Float64Array.from(sorted, ([f]) => f + 0),
      reflectionRe: Float64Array.from(sorted, ([, re]) => re),
      reflectionIm: Float64Array.from(sorted, ([, , im]) => im),
      referenceOhm,
    };
  });

describe('a written Touchstone file', () => {
  it('reads back bit for bit', () => {
    fc.assert(
      fc.property(anySweep, (sweep) => {
        expect(makeSweep(sweep).ok).toBe(true);
        expect(taken(written(sweep)).sweep).toEqual(sweep);
      }),
    );
  });

  const small: ComplexSweep = {
    phase: 'signed',
    frequencyHz: Float64Array.of(14e6, 15e6),
    reflectionRe: Float64Array.of(0.1, -1e-7),
    reflectionIm: Float64Array.of(-0, 1),
    referenceOhm: 50,
  };

  it('is version 1 in hertz, real and imaginary part, with CR+LF', () => {
    expect(written(small)).toBe('# Hz S RI R 50\r\n14000000 0.1 -0\r\n15000000 -1e-7 1\r\n');
  });

  it('has its comments first, and none can smuggle in a line', () => {
    const text = written(small, ['Hilltop', 'evil\r\n# GHz\n1 1 1', 'Ω']);
    expect(text.split('\r\n').slice(0, 4)).toEqual([
      '! Hilltop',
      '! evil??# GHz?1 1 1',
      '! ?',
      '# Hz S RI R 50',
    ]);
    expect(taken(text).sweep).toEqual(small);
  });

  it.each<Sweep>([
    { ...small, phase: 'unsigned' },
    {
      phase: 'none',
      frequencyHz: small.frequencyHz,
      reflectionMagnitude: small.reflectionRe,
      referenceOhm: 50,
    },
  ])('is not made of a sweep without signed phase', (sweep) => {
    expect(writeTouchstone(sweep)).toMatchObject({
      ok: false,
      error: { code: 'phase_not_signed' },
    });
  });
});

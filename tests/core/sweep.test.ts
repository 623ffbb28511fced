import { describe, expect, it } from 'vitest';
import { makeSweep, reflectionMagnitude, type Sweep } from '../../core/sweep.ts';

const good: Sweep = {
  phase: 'signed',
  frequencyHz: Float64Array.of(0, 14e6, 15e6),
  reflectionRe: Float64Array.of(0.3, -0.6, 1),
  reflectionIm: Float64Array.of(0.4, 0.8, 0),
  referenceOhm: 50,
};
const scalar: Sweep = {
  phase: 'none',
  frequencyHz: Float64Array.of(14e6, 15e6),
  reflectionMagnitude: Float64Array.of(0.2, 0.1),
  referenceOhm: 75,
};

function faultOf(sweep: Sweep) {
  const made = makeSweep(sweep);
  return made.ok ? null : [made.error.code, made.error.index];
}

describe('a sweep', () => {
  it('that keeps its promises is given back as it is, frozen', () => {
    const made = makeSweep(good);
    expect(made).toEqual({ ok: true, value: good });
    expect(made.ok && Object.isFrozen(made.value)).toBe(true);
    expect(faultOf(scalar)).toBeNull();
  });

  it('has at least one point', () => {
    expect(faultOf({ ...scalar, frequencyHz: new Float64Array(0) })).toEqual([
      'sweep_empty',
      undefined,
    ]);
  });

  it.each([0, -50, Number.NaN, Number.POSITIVE_INFINITY])('has no reference of %d ohm', (ohm) => {
    expect(faultOf({ ...good, referenceOhm: ohm })).toEqual([
      'sweep_reference_not_positive',
      undefined,
    ]);
  });

  it('has as many reflections as frequencies', () => {
    const reflectionIm = Float64Array.of(0);
    expect(faultOf({ ...good, reflectionIm })).toEqual(['sweep_lengths_differ', undefined]);
  });

  it.each([
    ['stands still', [1, 1, 2], ['sweep_not_ascending', 1]],
    ['steps back', [1, 3, 2], ['sweep_not_ascending', 2]],
    ['begins below zero', [-1, 1, 2], ['sweep_frequency_negative', 0]],
    ['is no number', [1, Number.NaN, 2], ['sweep_not_finite', 1]],
    ['has no end', [1, 2, Number.POSITIVE_INFINITY], ['sweep_not_finite', 2]],
  ])('is refused at the first point whose frequency %s', (_, hertz, fault) => {
    expect(faultOf({ ...good, frequencyHz: Float64Array.from(hertz) })).toEqual(fault);
  });

  it('has finite reflections', () => {
    const reflectionRe = Float64Array.of(0, 0, Number.NaN);
    expect(faultOf({ ...good, reflectionRe })).toEqual(['sweep_not_finite', 2]);
  });

  it('has no negative magnitude, nor a negative part whose sign is unknown', () => {
    const reflectionMagnitude = Float64Array.of(0.1, -0.1);
    expect(faultOf({ ...scalar, reflectionMagnitude })).toEqual(['sweep_magnitude_negative', 1]);
    const reflectionIm = Float64Array.of(0, -1e-9, 0);
    expect(faultOf({ ...good, phase: 'unsigned', reflectionIm })).toEqual([
      'sweep_magnitude_negative',
      1,
    ]);
    expect(faultOf({ ...good, reflectionIm })).toBeNull();
  });
});

describe('the magnitude of the reflection', () => {
  it('is the length of a complex one, and a scalar one itself', () => {
    expect([...reflectionMagnitude(good)]).toEqual([0.5, 1, 1]);
    expect([...reflectionMagnitude(scalar)]).toEqual([0.2, 0.1]);
  });
});

import { describe, expect, it } from 'vitest';
import { compress } from '../../../core/analysis/compress.ts';
import { differenceNoise } from '../../../core/analysis/difference-noise.ts';
import { parabolaAt, parabolaThrough } from '../../../core/analysis/parabola.ts';
import { evenFrequencies, seriesCircuit, sweepOf, withNoise } from '../../support/make-sweep.ts';

function samplesOf(points: number, rms: number, q = 10) {
  const sweep = withNoise(
    sweepOf(seriesCircuit(40, q, 7.1e6), evenFrequencies(6.5e6, 7.7e6, points)),
    rms,
    1,
  );
  const { frequencyHz, reflectionRe: re, reflectionIm: im } = sweep;
  return { frequencyHz, re, im };
}

function sum(values: Float64Array): number {
  return values.reduce((total, value) => total + value, 0);
}

describe('a long noisy sweep', () => {
  const samples = samplesOf(1601, 0.005);
  const short = compress(samples, differenceNoise(samples.re, samples.im));

  it('is replaced by less than a sixth of its points', () => {
    expect(short.re.length).toBeLessThan(1601 / 6);
    expect(short.re.length).toBe(short.weight.length);
  });

  it('keeps the weight of all its points', () => {
    expect(sum(short.weight)).toBeCloseTo(1601, 6);
  });

  it('keeps the sums that fits are made of', () => {
    // Gauss quadrature on evenly weighted points is exact to the fifth degree.
    const moment = (f: Float64Array, w: (i: number) => number, power: number) =>
      f.reduce((total, value, i) => total + w(i) * ((value - 7.1e6) / 6e5) ** power, 0);
    for (const power of [1, 2, 3, 4, 5]) {
      const whole = moment(samples.frequencyHz, () => 1, power);
      const part = moment(short.frequencyHz, (i) => short.weight[i], power);
      expect(part).toBeCloseTo(whole, 8);
    }
    const mean = (re: Float64Array, w: (i: number) => number) =>
      re.reduce((total, value, i) => total + w(i) * value, 0);
    expect(mean(short.re, (i) => short.weight[i])).toBeCloseTo(
      mean(samples.re, () => 1),
      8,
    );
  });

  it('leaves inside the blocks what is noise: three numbers of each are kept', () => {
    const freedom = 2 * (1601 - short.re.length);
    const noise = Math.sqrt(short.squaresInside / freedom);
    expect(noise / (0.005 / Math.SQRT2)).toBeGreaterThan(0.93);
    expect(noise / (0.005 / Math.SQRT2)).toBeLessThan(1.07);
  });
});

describe('a sweep', () => {
  it('keeps most of its points where it is sharp', () => {
    const sharp = samplesOf(1601, 0.0005, 400);
    const short = compress(sharp, differenceNoise(sharp.re, sharp.im));
    // 53 points lie within 20 kHz, of which evenly long blocks would keep five.
    const near = short.frequencyHz.filter((f) => Math.abs(f - 7.1e6) < 20e3).length;
    expect(near).toBeGreaterThan(53 / 2);
    expect(short.re.length).toBeLessThan(1000);
  });

  it('keeps all its points where it is short or without noise', () => {
    expect(compress(samplesOf(150, 0.005), 0.003).re).toHaveLength(150);
    expect(compress(samplesOf(1601, 0), 0).re).toHaveLength(1601);
  });
});

describe('a parabola through evenly spaced values', () => {
  it('is the parabola that they lie on', () => {
    const values = Float64Array.from({ length: 9 }, (_, i) => 2 - 0.5 * i + 0.25 * i * i);
    const parabola = parabolaThrough(values, 0, 9);
    expect(parabola.squaresLeft).toBeCloseTo(0, 12);
    for (const i of [0, 4, 8]) expect(parabolaAt(parabola, i - 4)).toBeCloseTo(values[i], 12);
  });
});

import { describe, expect, it } from 'vitest';
import { analyse } from '../../../core/analysis/analysis.ts';
import { differenceNoise } from '../../../core/analysis/difference-noise.ts';
import { noiseOfRepeats } from '../../../core/analysis/repeat-noise.ts';
import { summarise } from '../../../core/analysis/summarise.ts';
import type { ComplexSweep } from '../../../core/sweep.ts';
import {
  evenFrequencies,
  type ImpedanceOf,
  magnitudeOnly,
  rounded,
  seriesCircuit,
  sweepOf,
  withNoise,
  withoutSign,
} from '../../support/make-sweep.ts';

const antenna = seriesCircuit(30, 15, 7.1e6);
const clean = sweepOf(antenna, evenFrequencies(6.9e6, 7.3e6, 201));
const seeds = Array.from({ length: 40 }, (_, i) => i + 1);

describe('the noise of a sweep', () => {
  // Complex noise of rms 0.004 has 0.004/sqrt 2 on each component.
  it.each([1, 2, 3])('is found from the sweep itself (seed %d)', (seed) => {
    const { quality } = summarise(withNoise(clean, 0.004, seed));
    expect((quality.reflectionNoise ?? 0) / (0.004 / Math.SQRT2)).toBeGreaterThan(0.85);
    expect((quality.reflectionNoise ?? 0) / (0.004 / Math.SQRT2)).toBeLessThan(1.15);
  });

  it('is the same from repeated sweeps of one antenna by one instrument', () => {
    const repeats = [4, 5, 6, 7].map((seed) => withNoise(clean, 0.004, seed));
    const told = summarise(repeats[0]).quality.reflectionNoise ?? 0;
    expect((noiseOfRepeats(repeats) ?? 0) / told).toBeGreaterThan(0.85);
    expect((noiseOfRepeats(repeats) ?? 0) / told).toBeLessThan(1.15);
  });

  it('is that of rounding where a file carries few digits', () => {
    // A number rounded to three decimals is off by 0.001/sqrt 12 rms.
    const { quality } = summarise(rounded(withNoise(clean, 0.0005, 8), 3));
    const expected = Math.hypot(0.0005 / Math.SQRT2, 0.001 / Math.sqrt(12));
    expect((quality.reflectionNoise ?? 0) / expected).toBeGreaterThan(0.8);
    expect((quality.reflectionNoise ?? 0) / expected).toBeLessThan(1.2);
  });

  it.each(['unsigned', 'none'] as const)('is found with phase %s too', (phase) => {
    const noisy = withNoise(clean, 0.004, 9);
    const sweep = phase === 'none' ? magnitudeOnly(noisy) : withoutSign(noisy);
    const noise = summarise(sweep).quality.reflectionNoise ?? 0;
    expect(noise / (0.004 / Math.SQRT2)).toBeGreaterThan(0.7);
    expect(noise / (0.004 / Math.SQRT2)).toBeLessThan(1.3);
  });

  it('is not told from four points', () => {
    const sweep = sweepOf(antenna, evenFrequencies(7e6, 7.2e6, 4));
    const { quality, absent } = summarise(sweep);
    expect(quality.reflectionNoise).toBeNull();
    expect(absent.map(({ field }) => field)).toContain('quality.reflection_noise');
  });

  it('is not told from repeats on different frequencies, nor from one sweep', () => {
    const other = sweepOf(antenna, evenFrequencies(6.9e6, 7.3e6, 101));
    expect(noiseOfRepeats([clean, other])).toBeNull();
    expect(noiseOfRepeats([clean])).toBeNull();
  });

  it('is not raised by a smooth curve', () => {
    expect(differenceNoise(clean.reflectionRe, clean.reflectionIm)).toBeLessThan(1e-6);
    expect(differenceNoise(new Float64Array(5), new Float64Array(5))).toBe(0);
  });
});

describe('a half-width', () => {
  const answers = seeds.map((seed) => summarise(withNoise(clean, 0.002, seed)));

  it('of the resonance holds the truth in about 95 of 100 sweeps', () => {
    const held = answers.filter(({ resonances: [found] }) => {
      return Math.abs(found.frequencyHz - 7.1e6) <= (found.frequencyU95Hz ?? 0);
    });
    expect(held.length).toBeGreaterThanOrEqual(34);
  });

  it('of the resistance and Q holds the truth as well', () => {
    const held = answers.filter(({ resonances: [found] }) => {
      const isR = Math.abs((found.resistanceOhm ?? 0) - 30) <= (found.resistanceU95Ohm ?? 0);
      return isR && Math.abs((found.q ?? 0) - 15) <= (found.qU95 ?? 0);
    });
    expect(held.length).toBeGreaterThanOrEqual(31);
  });

  it('is near the scatter that a Monte Carlo run of a quadratic fit gave', () => {
    // 41 points 6.9-7.3 MHz, noise 0.002 rms, R 30, Q 15: 0.17 kHz by a fit of the true form.
    const sweep = sweepOf(antenna, evenFrequencies(6.9e6, 7.3e6, 41));
    const u95 = seeds.map(
      (seed) => summarise(withNoise(sweep, 0.002, seed)).resonances[0].frequencyU95Hz ?? 0,
    );
    const mean = u95.reduce((sum, value) => sum + value, 0) / u95.length;
    expect(mean / 1.96).toBeGreaterThan(120);
    expect(mean / 1.96).toBeLessThan(260);
  });
});

describe('a noisy sweep', () => {
  it('has one resonance for each true one, whatever the noise', () => {
    for (const seed of seeds) {
      const found = summarise(withNoise(clean, 0.02, seed)).resonances;
      expect(found.filter(({ grazing }) => !grazing)).toHaveLength(1);
    }
  });

  it('has one span where its SWR only grazes the limit, and a flag', () => {
    // Two minima of SWR with a hump between them that just reaches the limit.
    const hump = rippled();
    const peak = summarise(hump).swrMinima;
    expect(peak).toHaveLength(2);
    const curveTop = analyse(hump).maxima;
    expect(curveTop).toHaveLength(1);
    const top = Math.sqrt(curveTop[0].square);
    const limit = (1 + top) / (1 - top) - 1e-4;
    let flagged = 0;
    for (const seed of seeds.slice(0, 10)) {
      const summary = summarise(withNoise(hump, 0.02, seed), { swrLimits: [limit] });
      expect(summary.spans).toHaveLength(1);
      if (summary.quality.flags.some(({ code }) => code === 'swr_grazes_limit')) flagged += 1;
    }
    expect(flagged).toBeGreaterThanOrEqual(2);
  });

  it('of nothing but a load has no resonance beyond doubt', () => {
    const load = sweepOf(() => ({ resistance: 75, reactance: 0 }), evenFrequencies(1e6, 30e6, 101));
    for (const seed of seeds) {
      const found = summarise(withNoise(load, 0.005, seed)).resonances;
      expect(found.filter(({ grazing }) => !grazing)).toEqual([]);
    }
  });
});

describe('a reactance that touches zero and turns back', () => {
  // X = (f - 7 MHz)² + 0.1 ohm with R = 40: within the noise of 0.005 it cannot be told from a touch.
  const touching: ImpedanceOf = (f) => ({
    resistance: 40,
    reactance: 60 * ((f - 7e6) / 1e6) ** 2 + 0.05,
  });
  const sweep = sweepOf(touching, evenFrequencies(6e6, 8e6, 201));

  it('is one grazing resonance, without a half-width', () => {
    for (const seed of seeds.slice(0, 10)) {
      const found = summarise(withNoise(sweep, 0.02, seed)).resonances;
      expect(found).toHaveLength(1);
      expect(found[0].grazing).toBe(true);
      expect(found[0].frequencyU95Hz).toBeNull();
      expect(Math.abs(found[0].frequencyHz - 7e6)).toBeLessThan(0.2e6);
    }
  });

  it('is none where it stays clear of zero', () => {
    const clear: ImpedanceOf = (f) => ({ ...touching(f), reactance: touching(f).reactance + 10 });
    const above = withNoise(sweepOf(clear, evenFrequencies(6e6, 8e6, 201)), 0.01, 1);
    expect(summarise(above).resonances).toEqual([]);
  });
});

/** Two coupled circuits: the SWR has two minima and a hump between them. */
function rippled(): ComplexSweep {
  const first = seriesCircuit(50, 8, 7e6);
  const impedance: ImpedanceOf = (f) => {
    // A parallel circuit in series adds the second minimum.
    const detuning = 12 * (f / 7e6 - 7e6 / f);
    const part = 1 + detuning ** 2;
    const { resistance, reactance } = first(f);
    return {
      resistance: resistance - 15 + 60 / part,
      reactance: reactance - (60 * detuning) / part,
    };
  };
  return sweepOf(impedance, evenFrequencies(6.3e6, 7.7e6, 301));
}

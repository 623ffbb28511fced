import { describe, expect, it } from 'vitest';
import { analyse } from '../../../core/analysis/analysis.ts';
import { summarise } from '../../../core/analysis/summarise.ts';
import {
  evenFrequencies,
  type ImpedanceOf,
  magnitudeOnly,
  rounded,
  seriesCircuit,
  sweepOf,
  withNoise,
} from '../../support/make-sweep.ts';
import { Random } from '../../support/random.ts';

const antenna = seriesCircuit(40, 12, 7.1e6);

/** The antenna behind 20 m of lossless 50 ohm line with a velocity of 2e8 m/s. */
const behindLine: ImpedanceOf = (f) => {
  const { resistance: r, reactance: x } = antenna(f);
  const t = Math.tan((2 * Math.PI * f * 20) / 2e8);
  const [nr, ni, dr, di] = [r, x + 50 * t, 50 - x * t, r * t];
  const d = dr * dr + di * di;
  return { resistance: (50 * (nr * dr + ni * di)) / d, reactance: (50 * (ni * dr - nr * di)) / d };
};

describe('a sweep of 100,001 points', () => {
  const exact = sweepOf(antenna, evenFrequencies(6e6, 8.5e6, 100_001));

  it('has the resonance of its circuit when it is exact', () => {
    const { resonances, swrMinima } = summarise(exact);
    expect(resonances).toHaveLength(1);
    expect(swrMinima).toHaveLength(1);
    expect(Math.abs(resonances[0].frequencyHz - 7.1e6)).toBeLessThan(0.025);
  });

  it('has it within its half-width in noise, which is as small as so many points make it', () => {
    const [found] = summarise(withNoise(exact, 0.003, 5)).resonances;
    expect(Math.abs(found.frequencyHz - 7.1e6)).toBeLessThan(2 * (found.frequencyU95Hz ?? 0));
    expect(found.frequencyU95Hz).toBeLessThan(50);
  });

  it.each(['signed', 'none'] as const)(
    'with phase %s does not follow the steps of rounding',
    (phase) => {
      const coarse = rounded(exact, 3);
      const sweep = phase === 'none' ? magnitudeOnly(coarse) : coarse;
      const { swrMinima, quality, minimumSwr } = summarise(sweep);
      expect(swrMinima).toHaveLength(1);
      expect(quality.flags).toEqual([]);
      expect(Math.abs((minimumSwr?.frequencyHz ?? 0) - 7.1e6)).toBeLessThan(2000);
    },
  );
});

describe('an antenna behind many wavelengths of line', () => {
  it.each([201, 1601])('has every crossing in %d points', (points) => {
    const sweep = sweepOf(behindLine, evenFrequencies(1e6, 60e6, points));
    const im = sweep.reflectionIm;
    let crossings = 0;
    for (let i = 1; i < im.length; i++) if (im[i] > 0 !== im[i - 1] > 0) crossings += 1;
    expect(crossings).toBe(25);
    const { resonances } = summarise(sweep);
    expect(resonances).toHaveLength(25);
    for (const { frequencyHz, kind } of resonances) {
      const h = 100;
      const [low, high] = [frequencyHz - h, frequencyHz + h].map((f) => {
        const { resistance, reactance } = behindLine(f);
        return reactance / ((resistance + 50) ** 2 + reactance ** 2);
      });
      expect(low < 0).toBe(kind === 'series');
      expect(high > 0).toBe(kind === 'series');
    }
  });

  it('is stood for by pieces without gaps', () => {
    const sweep = sweepOf(behindLine, evenFrequencies(1e6, 60e6, 201));
    const pieces = analyse(sweep).reflection?.pieces ?? [];
    expect(pieces.length).toBeGreaterThan(1);
    expect(pieces[0].lowHz).toBe(1e6);
    expect(pieces.at(-1)?.highHz).toBe(60e6);
    for (let i = 1; i < pieces.length; i++) expect(pieces[i].lowHz).toBe(pieces[i - 1].highHz);
  });
});

describe('points that follow no curve', () => {
  it('are joined by straight lines, without half-widths', () => {
    // Places held for four points each, chosen by chance, as no network does.
    const random = new Random(1);
    const places = Array.from({ length: 40 }, () => random.uniform(-0.7, 0.7));
    const frequencyHz = evenFrequencies(1e6, 2e6, 80);
    const { reflection } = analyse({
      phase: 'signed',
      frequencyHz,
      referenceOhm: 50,
      reflectionRe: frequencyHz.map((_, i) => places[i >> 2]),
      reflectionIm: frequencyHz.map((_, i) => places[20 + (i >> 2)]),
    });
    const straight = reflection?.pieces.filter((piece) => piece.noise === null) ?? [];
    expect(straight.length).toBeGreaterThan(0);
  });
});

import { describe, expect, it } from 'vitest';
import { hilltop20m } from '../../server/demo/antennas/hilltop-20m.ts';
import { evenly, summaryOfFile, touchstoneFile } from './summary-of-file.ts';

/** The demo's loaded dipole as its model has it, without an instrument's errors. */
function loadedDipole() {
  const { range, model } = hilltop20m;
  const occasion = { measuredAt: '2025-06-01T12:00:00Z', wet: false, years: 0.5 };
  const frequenciesHz = evenly(range.lowHz, range.highHz, 401);
  return summaryOfFile(touchstoneFile((hz) => model(hz, occasion), frequenciesHz, 50));
}

describe('a reactive-loaded dipole near 14 MHz', () => {
  // Common practice, no source: on such antennas the frequency of zero reactance and that of lowest
  // SWR may differ by about 100 kHz, and SWR may be 2 at resonance while it is near 1 close by.
  it('has its resonance about 100 kHz from its lowest SWR', () => {
    const { resonanceOffsetHz, minimumSwr } = loadedDipole();
    expect(Math.abs(resonanceOffsetHz ?? 0)).toBeGreaterThan(80_000);
    expect(Math.abs(resonanceOffsetHz ?? 0)).toBeLessThan(120_000);
    expect(Math.abs((minimumSwr?.frequencyHz ?? 0) - 14_150_000)).toBeLessThan(10_000);
  });

  it('has an SWR of about 2 at resonance and near 1 at the minimum', () => {
    const { resonances, minimumSwr } = loadedDipole();
    expect(resonances).toHaveLength(2);
    for (const { swr } of resonances) expect(Math.abs((swr ?? 0) - 2)).toBeLessThan(0.1);
    expect(minimumSwr?.swr).toBeLessThan(1.3);
  });

  it('has a reactance at its lowest SWR that is not zero', () => {
    expect(Math.abs(loadedDipole().minimumSwr?.reactanceOhm ?? 0)).toBeGreaterThan(5);
  });

  // A shunt reactance turns a resistance of half the reference into two resonances, at half and at
  // twice the reference: X / (R^2 + X^2) = 1 / (2.5 R) has the roots X = R/2 and X = 2R (identity).
  it('is resonant once with a low and once with a high resistance', () => {
    const { resonances } = loadedDipole();
    const ohms = resonances.map(({ resistanceOhm }) => resistanceOhm ?? 0);
    expect(ohms[0]).toBeCloseTo(100, -1);
    expect(ohms[1]).toBeCloseTo(25, -1);
    expect(resonances.map(({ kind }) => kind)).toEqual(['parallel', 'series']);
  });
});

describe('an impedance that rises along a straight line', () => {
  // Z = 28.125 + (f - 7)(46.875 + j62.5) ohm, f in MHz, moved to 14.1 MHz and twice as steep. With
  // r = r0 + b d and x = a d the least SWR lies at r = sqrt((a^2 r0^2 + b^2)/(a^2 + b^2)): here at
  // 37.5 + j12.5 ohm, where |reflection| is 1/5 (derived from SWR + 1/SWR; exact).
  const line = (hz: number) => {
    const megahertzAbove = (hz - 14_100_000) / 1e6;
    return { re: 28.125 + 93.75 * megahertzAbove, im: 125 * megahertzAbove };
  };
  const summary = () =>
    summaryOfFile(touchstoneFile(line, evenly(13_950_000, 14_450_000, 501), 50));

  it('has zero reactance at an SWR of 16/9', () => {
    const [resonance, ...others] = summary().resonances;
    expect(others).toEqual([]);
    expect(Math.abs(resonance.frequencyHz - 14_100_000)).toBeLessThan(5);
    expect(resonance.swr).toBeCloseTo(16 / 9, 5);
  });

  it('has an SWR of exactly 1.5 100 kHz above', () => {
    const { minimumSwr, resonanceOffsetHz } = summary();
    expect(Math.abs((minimumSwr?.frequencyHz ?? 0) - 14_200_000)).toBeLessThan(50);
    expect(minimumSwr?.swr).toBeCloseTo(1.5, 6);
    expect(minimumSwr?.resistanceOhm).toBeCloseTo(37.5, 2);
    expect(minimumSwr?.reactanceOhm).toBeCloseTo(12.5, 2);
    expect(Math.abs((resonanceOffsetHz ?? 0) - 100_000)).toBeLessThan(50);
  });
});

import { describe, expect, it } from 'vitest';
import { automaticBaseline, chosenBaseline } from '../../../core/record/baseline.ts';
import { bandOf, dayMs, resonanceAt, rowAt } from '../../support/history-rows.ts';

const day = (n: number, hz: number, facts: Parameters<typeof rowAt>[2] = {}) =>
  rowAt(n * dayMs, [bandOf([resonanceAt(hz)])], { sweepId: `day ${n}`, ...facts });

describe('an automatic baseline', () => {
  it('is the median of the first three good sweeps in dry weather', () => {
    const rows = [
      day(1, 14.05e6, { condition: 'rain' }),
      day(2, 14.1e6),
      day(3, 14.3e6),
      day(4, 14.12e6),
      day(5, 14.2e6),
    ];
    const [{ source, sweepIds, resonances, minimumHz }] = automaticBaseline(rows);
    expect(source).toBe('dry');
    expect(sweepIds).toEqual(['day 2', 'day 3', 'day 4']);
    expect(resonances.map(({ frequencyHz }) => frequencyHz.value)).toEqual([14.12e6]);
    expect(minimumHz?.value).toBe(14.12e6);
  });

  it('passes over sweeps that are noisy, cut short or of a small part of the band', () => {
    const bad = [
      bandOf([resonanceAt(14e6)], { flags: ['noisy'] }),
      bandOf([resonanceAt(14e6)], { sweptFraction: 0.3 }),
      bandOf([resonanceAt(14e6)], { minimum: null }),
    ].map((band, n) => rowAt(n, [band]));
    const [{ sweepIds }] = automaticBaseline([...bad, day(9, 14.1e6)]);
    expect(sweepIds).toEqual(['day 9']);
  });

  it('takes what weather there is where none was dry, and says so', () => {
    const rows = [day(1, 14.1e6, { condition: 'rain' }), day(2, 14.1e6, { condition: null })];
    expect(automaticBaseline(rows)[0]).toMatchObject({ source: 'any' });
  });

  it('is none where nothing good was swept', () => {
    expect(automaticBaseline([rowAt(0, [bandOf([], { flags: ['noisy'] })])])).toEqual([]);
  });

  it('has no resonance that only one of three sweeps shows', () => {
    const odd = rowAt(3 * dayMs, [bandOf([resonanceAt(14.1e6), resonanceAt(14.3e6)])]);
    const [{ resonances }] = automaticBaseline([day(1, 14.1e6), day(2, 14.1e6), odd]);
    expect(resonances).toHaveLength(1);
  });
});

describe('the half-width of a baseline', () => {
  const u95Of = (...hz: readonly number[]) =>
    automaticBaseline(hz.map((one, n) => day(n, one)))[0].resonances[0].frequencyHz.u95;

  it('is that of the sweep where there is one alone', () => {
    expect(u95Of(14.1e6)).toBe(300);
  });

  it('never falls below that of a sweep, and grows with the scatter', () => {
    expect(u95Of(14.1e6, 14.1e6, 14.1e6)).toBe(300);
    expect(u95Of(14.1e6, 14.1e6 + 2000, 14.1e6 - 2000) ?? 0).toBeGreaterThan(2000);
    // Half the distance of two, joined to 300 Hz.
    expect(u95Of(14.1e6, 14.1e6 + 800)).toBeCloseTo(500, 9);
  });

  it('is unknown where that of a sweep is', () => {
    const unknown = rowAt(0, [bandOf([resonanceAt(14.1e6, { frequencyU95Hz: null })])]);
    expect(automaticBaseline([unknown])[0].resonances[0].frequencyHz.u95).toBeNull();
  });
});

describe('a chosen baseline', () => {
  it('is made of the chosen sweeps, however good or wet they were', () => {
    const chosen = [day(1, 14.1e6, { condition: 'rain' }), day(2, 14.2e6)];
    const [baseline] = chosenBaseline(chosen);
    expect(baseline).toMatchObject({ source: 'chosen', sweepIds: ['day 1', 'day 2'] });
  });
});

import { describe, expect, it } from 'vitest';
import { type ComparedSweep, compareSweeps } from '../../../core/record/compare.ts';
import type { HistoryRow } from '../../../core/record/measures.ts';
import { bandOf, resonanceAt, rowAt } from '../../support/history-rows.ts';
import {
  evenFrequencies,
  magnitudeOnly,
  seriesCircuit,
  sweepOf,
} from '../../support/make-sweep.ts';

const dipole = { kind: 'dipole', trims: [], throughLine: false } as const;
const sweepAt = (hz: number, points = 101) =>
  sweepOf(seriesCircuit(60, 12, hz), evenFrequencies(13.9e6, 14.5e6, points));

function side(row: HistoryRow, facts: Partial<ComparedSweep> = {}): ComparedSweep {
  return { row, antennaId: 'one', sweep: sweepAt(14.1e6), ...facts };
}
const rowOf = (hz: number, facts: Parameters<typeof rowAt>[2] = {}) =>
  rowAt(0, [bandOf([resonanceAt(hz)])], facts);

describe('two sweeps whose difference is within their half-widths', () => {
  const { bands, verdict, lengthChange } = compareSweeps(
    side(rowOf(14.1e6)),
    side(rowOf(14.1e6 + 400)),
    dipole,
  );

  it('are the same within uncertainty', () => {
    expect(verdict).toBe('same_within_uncertainty');
    const [{ frequencyHz }] = bands[0].resonances;
    expect(frequencyHz).toMatchObject({ difference: 400, verdict: 'same_within_uncertainty' });
    // Root sum of squares of 300 and 300 Hz.
    expect(frequencyHz.u95).toBeCloseTo(424.26, 2);
  });

  it('need no change of length to explain it', () => {
    expect(lengthChange).toBeNull();
  });
});

describe('a resonance that moved beyond the half-widths', () => {
  it('is a change, and a bare wire would have become longer by f1/f2 - 1', () => {
    const comparison = compareSweeps(side(rowOf(14.1e6)), side(rowOf(14.0e6)), dipole);
    expect(comparison.verdict).toBe('changed');
    expect(comparison.lengthChange).toMatchObject({ goal: 'resonance', method: 'simple_rule' });
    expect(comparison.lengthChange?.lengthChangeFraction).toBeCloseTo(14.1 / 14.0 - 1, 9);
    expect(comparison.lengthChange?.lengthChangeM ?? 0).toBeGreaterThan(0.05);
  });

  it('is explained by what trimming this antenna did before, where that is known', () => {
    const trims = [{ lengthChangeM: -0.1, frequencyChangeHz: 50e3, frequencyChangeU95Hz: 1e3 }];
    const trap = { kind: 'trap_dipole', trims, throughLine: false } as const;
    const { lengthChange } = compareSweeps(side(rowOf(14.1e6)), side(rowOf(14.0e6)), trap);
    // -100 kHz at -500 kHz a metre.
    expect(lengthChange).toMatchObject({ method: 'own_sensitivity' });
    expect(lengthChange?.lengthChangeM).toBeCloseTo(0.2, 9);
  });

  it('of an antenna that is not a bare wire has no length to explain it', () => {
    const beam = { ...dipole, kind: 'beam' } as const;
    const { lengthChange } = compareSweeps(side(rowOf(14.1e6)), side(rowOf(14.0e6)), beam);
    expect(lengthChange).toBeNull();
  });

  it('goes by the least SWR where a line moves resonances', () => {
    const through = { ...dipole, throughLine: true };
    const { lengthChange } = compareSweeps(side(rowOf(14.1e6)), side(rowOf(14.0e6)), through);
    expect(lengthChange?.goal).toBe('swr_minimum');
  });
});

describe('a measure without half-width', () => {
  it('cannot be called same or changed', () => {
    const unknown = rowAt(0, [bandOf([resonanceAt(14.1e6, { frequencyU95Hz: null })])]);
    const { bands } = compareSweeps(side(unknown), side(rowOf(14.2e6)), dipole);
    const { u95, verdict, difference } = bands[0].resonances[0].frequencyHz;
    expect([u95, verdict, difference]).toEqual([null, 'cannot_tell', 100e3]);
  });
});

describe('resonances without a partner', () => {
  it('are told apart from those that moved, and kinds are not mixed', () => {
    const first = rowAt(0, [bandOf([resonanceAt(14.0e6), resonanceAt(14.2e6)])]);
    const second = rowAt(0, [
      bandOf([resonanceAt(14.0e6, { kind: 'parallel' }), resonanceAt(14.21e6)]),
    ]);
    const [band] = compareSweeps(side(first), side(second), dipole).bands;
    expect(band.resonances.map(({ frequencyHz }) => frequencyHz.first)).toEqual([14.2e6]);
    expect(band.onlyFirstHz).toEqual([14.0e6]);
    expect(band.onlySecondHz).toEqual([14.0e6]);
  });
});

describe('a span that is open at an end', () => {
  it('has no width to compare, but its other edge', () => {
    const open = bandOf([resonanceAt(14.1e6)]);
    if (open.span === null) throw new Error('The builder makes a span.');
    const cut = { ...open, span: { ...open.span, highOpen: true, highU95Hz: null } };
    const [band] = compareSweeps(side(rowAt(0, [cut])), side(rowOf(14.1e6)), dipole).bands;
    expect(band.spanWidthHz).toBeNull();
    expect(band.spanHighHz).toBeNull();
    expect(band.spanLowHz?.difference).toBe(0);
  });
});

describe('what stands against a comparison', () => {
  const codes = (first: ComparedSweep, second: ComparedSweep) =>
    compareSweeps(first, second, dipole).obstacles.map(({ code }) => code);
  const plain = side(rowOf(14.1e6));

  it('is another antenna, another plane, another reference, or no band in common', () => {
    const other = rowAt(0, [{ ...bandOf([]), band: '40m' }]);
    expect(codes(plain, plain)).toEqual([]);
    expect(codes(plain, side(rowOf(14.1e6), { antennaId: 'two' }))).toEqual(['antennas_differ']);
    expect(codes(plain, side(rowOf(14.1e6, { measures: { plane: 'feed_point' } })))).toEqual([
      'planes_differ',
    ]);
    expect(codes(plain, side(rowOf(14.1e6, { measures: { referenceOhm: 75 } })))).toEqual([
      'references_differ',
    ]);
    expect(codes(plain, side(other))).toEqual(['no_common_band']);
  });

  it('leaves nothing compared', () => {
    const { verdict, bands, curve } = compareSweeps(
      plain,
      side(rowOf(14.1e6), { antennaId: 'two' }),
      dipole,
    );
    expect([verdict, bands, curve]).toEqual(['cannot_tell', [], null]);
  });
});

describe('what may differ beside the antenna', () => {
  const codes = (facts: Parameters<typeof rowAt>[2]) =>
    compareSweeps(side(rowOf(14.1e6)), side(rowOf(14.1e6, facts)), dipole)
      .cautions.map(({ code }) => code)
      .filter((code) => code !== 'half_widths_only');

  it('is said: analyzer, weather, work, phase', () => {
    expect(codes({})).toEqual([]);
    expect(codes({ analyzerId: 'handheld' })).toEqual(['analyzers_differ']);
    expect(codes({ analyzerId: null })).toEqual(['analyzer_unknown']);
    expect(codes({ condition: 'rain' })).toEqual(['weather_differs']);
    expect(codes({ condition: null })).toEqual(['weather_unknown']);
    expect(codes({ eraIndex: 1 })).toEqual(['work_between']);
    expect(codes({ measures: { phase: 'none' } })).toEqual(['phases_differ']);
  });
});

describe('the difference of two curves', () => {
  const curveOf = (first: ComparedSweep['sweep'], second: ComparedSweep['sweep']) => {
    const row = rowOf(14.1e6);
    return compareSweeps(side(row, { sweep: first }), side(row, { sweep: second }), dipole).curve;
  };

  it('is zero for the same curve, also on another grid up to the straight lines between points', () => {
    expect(curveOf(sweepAt(14.1e6), sweepAt(14.1e6))?.largest).toBeLessThan(1e-12);
    expect(curveOf(sweepAt(14.1e6), sweepAt(14.1e6, 397))?.largest).toBeLessThan(1e-4);
  });

  it('is read where both were swept alone', () => {
    const narrow = sweepOf(seriesCircuit(60, 12, 14.1e6), evenFrequencies(14e6, 14.2e6, 41));
    const curve = curveOf(narrow, sweepAt(14.1e6));
    expect(curve).toMatchObject({ lowHz: 14e6, highHz: 14.2e6, points: 41, of: 'complex' });
    const apart = sweepOf(seriesCircuit(60, 12, 14.1e6), evenFrequencies(21e6, 21.2e6, 41));
    expect(curveOf(narrow, apart)).toBeNull();
  });

  it('is of the magnitude alone where either has no phase', () => {
    const curve = curveOf(sweepAt(14.1e6), magnitudeOnly(sweepAt(14.15e6)));
    expect(curve?.of).toBe('magnitude');
    expect(curve?.largest).toBeGreaterThan(0.01);
  });
});

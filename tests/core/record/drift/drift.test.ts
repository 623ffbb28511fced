import { describe, expect, it } from 'vitest';
import { type DriftReport, driftOf } from '../../../../core/record/drift/drift.ts';
import type { DriftSweep } from '../../../../core/record/drift/drift-series.ts';
import { Random } from '../../../support/random.ts';

const monthMs = (365.25 * 24 * 3600 * 1000) / 12;

interface Told {
  readonly hz?: number;
  readonly swr?: number;
  readonly widthHz?: number;
  readonly analyzerId?: string;
  readonly wetness?: DriftSweep['wetness'];
  readonly eraIndex?: number;
  readonly resonant?: boolean;
}

/** Sweeps every second month, with a scatter of 0.05 % in frequency and 1 % in SWR and width. */
function series(count: number, told: (i: number) => Told): readonly DriftSweep[] {
  const random = new Random(5);
  return Array.from({ length: count }, (_, i) => {
    const { hz = 14.1e6, swr = 1.5, widthHz = 300e3, resonant = true, ...facts } = told(i);
    const some = (value: number, scatter: number, u95: number) => ({
      value: value * (1 + scatter * random.gaussian()),
      u95,
    });
    return {
      sweepId: `sweep ${i}`,
      measuredAtMs: 2 * i * monthMs,
      analyzerId: facts.analyzerId ?? `instrument ${i % 2}`,
      wetness: facts.wetness ?? 'dry',
      eraIndex: facts.eraIndex ?? 0,
      resonant,
      values: {
        ...(resonant ? { resonance_hz: some(hz, 0.0005, 1000) } : {}),
        minimum_swr: some(swr, 0.01, 0.01),
        span_width_hz: some(widthHz, 0.01, 500),
      },
    };
  });
}

function codes({ findings }: DriftReport): readonly string[] {
  return findings.map(({ code }) => code);
}

describe('a sound antenna', () => {
  it('has trends about zero, a scatter, and no finding', () => {
    const report = driftOf(series(24, () => ({})));
    expect(codes(report)).toEqual([]);
    const trend = report.trends.find(({ measure }) => measure === 'resonance_hz');
    expect(trend?.trendPerYear?.low).toBeLessThan(0);
    expect(trend?.trendPerYear?.high).toBeGreaterThan(0);
    expect(trend?.scatter).toBeGreaterThan(0.0002);
    expect(trend?.scatter).toBeLessThan(0.001);
    expect(trend?.typical).toBeCloseTo(14.1e6, -5);
    expect(trend?.trendProbability).toBeGreaterThan(0.01);
  });

  it('has none either after one wild value', () => {
    expect(codes(driftOf(series(24, (i) => (i === 12 ? { hz: 14.6e6 } : {}))))).toEqual([]);
  });

  it('has none where work explains a jump', () => {
    const report = driftOf(
      series(24, (i) => (i < 12 ? {} : { hz: 14.3e6, swr: 1.2, eraIndex: 1 })),
    );
    expect(codes(report)).toEqual([]);
    expect(report.trends.filter(({ measure }) => measure === 'resonance_hz')).toHaveLength(2);
  });
});

describe('an antenna that changed', () => {
  it('is said to drift down slowly, by how much a year and on which sweeps', () => {
    const report = driftOf(series(18, (i) => ({ hz: 14.1e6 * (1 - 0.005 * (i / 6)) })));
    expect(codes(report)).toEqual(['slow_drift_down']);
    expect(report.findings[0]).toMatchObject({ measure: 'resonance_hz', next: 'inspect_antenna' });
    expect(report.findings[0].change).toBeCloseTo(-0.005, 3);
    expect(report.findings[0].evidence.length).toBeGreaterThan(10);
    expect(report.trends[0].trendPerYear?.high).toBeLessThan(-0.004);
    expect(report.trends[0].trendProbability).toBeLessThan(0.001);
  });

  it('is said to drift up, too', () => {
    const report = driftOf(series(18, (i) => ({ hz: 14.1e6 * (1 + 0.005 * (i / 6)) })));
    expect(codes(report)).toEqual(['slow_drift_up']);
  });

  it('is said to have jumped, from the sweep on that shows it first', () => {
    const report = driftOf(series(16, (i) => (i < 13 ? {} : { hz: 14.3e6 })));
    expect(codes(report)).toEqual(['sudden_jump']);
    expect(report.findings[0].evidence).toEqual(['sweep 13', 'sweep 14', 'sweep 15']);
    expect(report.findings[0].change).toBeCloseTo(0.2 / 14.1, 3);
  });

  it('has a growing loss where SWR falls and the span widens', () => {
    const report = driftOf(series(16, (i) => (i < 12 ? {} : { swr: 1.3, widthHz: 380e3 })));
    expect(codes(report)).toEqual(['loss_growing']);
    expect(report.findings[0].next).toBe('check_line');
  });

  it('is other only when it is wet', () => {
    const report = driftOf(
      series(24, (i) => (i % 3 === 0 ? { wetness: 'wet', hz: 13.9e6, swr: 2 } : {})),
    );
    expect(codes(report)).toEqual(['only_when_wet']);
    const wet = report.trends.find(({ measure }) => measure === 'minimum_swr')?.wetMinusDry;
    expect(wet?.value).toBeCloseTo(Math.log(2 / 1.5), 1);
    expect(wet?.low).toBeGreaterThan(0.2);
    expect(wet?.high).toBeLessThan(0.4);
  });

  it('has lost its resonance where the newest sweeps show none', () => {
    const report = driftOf(series(12, (i) => ({ resonant: i < 10 })));
    expect(codes(report)).toEqual(['resonance_lost']);
    expect(report.findings[0].evidence).toEqual(['sweep 10', 'sweep 11']);
    expect(codes(driftOf(series(12, (i) => ({ resonant: i < 11 }))))).toEqual([]);
  });
});

describe('an instrument that shows frequencies too high', () => {
  const sweeps = series(24, (i) =>
    i % 3 === 0 ? { analyzerId: 'off', hz: 14.1e6 * 1.005 } : { analyzerId: `good ${i % 3}` },
  );

  it('is what is named, not the antenna', () => {
    const report = driftOf(sweeps);
    expect(codes(report)).toEqual(['instrument_off']);
    expect(report.findings[0].evidence).toContain('sweep 0');
    expect(report.findings[0].detail).toMatch(/higher than the others/);
  });

  it('moves no antenna where its bias is known from elsewhere', () => {
    const changed = series(14, (i) =>
      i < 9 ? { analyzerId: 'good' } : { analyzerId: 'off', hz: 14.1e6 * 1.005 },
    );
    const known = new Map([['off', { resonance_hz: { bias: 0.005, standardError: 0.0003 } }]]);
    expect(codes(driftOf(changed, known))).not.toContain('sudden_jump');
  });
});

describe('two sweeps', () => {
  it('support no finding, however far apart they are', () => {
    const report = driftOf(series(2, (i) => ({ hz: 14.1e6 + i * 1e6, swr: 1.2 + i })));
    expect(report.findings).toEqual([]);
    expect(report.trends).toEqual([]);
  });
});

describe('a test that should have been made', () => {
  it('is overdue from its day on', () => {
    const sweeps = series(6, () => ({}));
    const due = { nowMs: 40 * monthMs, dueMs: 16 * monthMs };
    expect(codes(driftOf(sweeps, undefined, due))).toEqual(['test_overdue']);
    expect(codes(driftOf(sweeps, undefined, { ...due, nowMs: 15 * monthMs }))).toEqual([]);
  });
});

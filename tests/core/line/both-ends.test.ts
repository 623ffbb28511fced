import { describe, expect, it } from 'vitest';
import { bothEnds, lineReport } from '../../../core/line/both-ends.ts';
import { findCable } from '../../../core/line/cables.ts';
import { resolveFeedLine } from '../../../core/line/feed-line.ts';
import { fromFeedPoint } from '../../../core/line/line.ts';
import { fail, ok } from '../../../core/result.ts';
import { reflectionMagnitude } from '../../../core/sweep.ts';
import {
  accepted,
  evenly,
  exactCable,
  impedanceSweep,
  lineOf,
  reflectionSweep,
  resonator,
  section,
} from './builders.ts';
import { plainSummary } from './plain-summary.ts';

const thin = findCable('m17-28-rg58') ?? exactCable();
const f = evenly(28e6, 29.7e6, 171);
const antenna = impedanceSweep(f, resonator(120, 28.6e6, 6));

describe('a line seen from both ends', () => {
  const line = lineOf(section(thin, 35));
  const measured = accepted(fromFeedPoint(antenna, line));
  const ends = bothEnds(measured, line, f[60]);

  it('has the SWR of the antenna at one and that of the analyzer at the other', () => {
    expect(ends?.swrAntenna).toBeCloseTo(2.4, 9);
    expect(ends?.swrShack).toBeLessThan(1.6);
    const rho = reflectionMagnitude(measured)[60];
    expect(ends?.swrShack).toBeCloseTo((1 + rho) / (1 - rho), 9);
    expect(ends?.method).toBe('complex');
  });

  it('has losses that add up, by the general formula and close to it by the handbook form', () => {
    expect(ends).not.toBeNull();
    if (ends === null || ends.totalLossDb === null || ends.mismatchLossDb === null) return;
    expect(ends.matchedLossDb + ends.mismatchLossDb).toBeCloseTo(ends.totalLossDb, 12);
    expect(ends.mismatchLossDb).toBeGreaterThan(0.2);
    expect(Math.abs((ends.handbookTotalLossDb ?? 0) - ends.totalLossDb)).toBeLessThan(0.02);
  });

  it('is interpolated between two points of the sweep and not known outside it', () => {
    const between = bothEnds(measured, line, (f[60] + f[61]) / 2);
    expect(between?.swrAntenna).toBeGreaterThan(2.39);
    expect(bothEnds(measured, line, f[0])?.frequencyHz).toBe(f[0]);
    expect(bothEnds(measured, line, f[0] - 1)).toBeNull();
    expect(bothEnds(measured, line, f[170] + 1)).toBeNull();
  });

  it('has no handbook figure where its sections differ', () => {
    const mixed = lineOf(section(thin, 10), section(findCable('window-450') ?? thin, 10));
    const there = accepted(fromFeedPoint(antenna, mixed));
    const both = bothEnds(there, mixed, f[60]);
    expect(both?.handbookTotalLossDb).toBeNull();
    expect(both?.totalLossDb).toBeGreaterThan(both?.matchedLossDb ?? 0);
  });

  it('has no SWR and no loss where more comes back than was sent', () => {
    const all = reflectionSweep(f, () => ({ re: 0.99, im: 0 }));
    expect(bothEnds(all, line, f[60])).toMatchObject({
      swrAntenna: null,
      totalLossDb: null,
      mismatchLossDb: null,
      handbookTotalLossDb: null,
    });
    const two = lineOf(section(thin, 17), section(thin, 18));
    expect(bothEnds(all, two, f[60])?.totalLossDb).toBeNull();
  });

  it('is not known where the line cannot be removed', () => {
    expect(bothEnds(measured, lineOf(section(thin, 2000)), f[60])).toBeNull();
  });
});

describe('a line before a sweep without phase', () => {
  const line = lineOf(section(thin, 35));
  const measured = accepted(fromFeedPoint(antenna, line));
  const scalar = {
    phase: 'none',
    frequencyHz: f,
    referenceOhm: 50,
    reflectionMagnitude: reflectionMagnitude(measured),
  } as const;

  it('is judged by the handbook form if it is of the reference impedance', () => {
    const both = bothEnds(scalar, line, f[60]);
    expect(both?.method).toBe('magnitude_only');
    expect(both?.swrAntenna).toBeCloseTo(2.4, 1);
    expect(both?.mismatchLossDb).toBeGreaterThan(0.2);
    const unsigned = { ...measured, phase: 'unsigned' } as const;
    expect(bothEnds(unsigned, line, f[60])?.swrAntenna).toBeCloseTo(both?.swrAntenna ?? 0, 9);
  });

  it('is not judged if it is of another impedance', () => {
    const other = lineOf(section(exactCable({ characteristicOhm: 75 }), 5));
    expect(bothEnds(scalar, other, f[60])).toBeNull();
  });

  it('has no antenna that explains too high an SWR', () => {
    const all = { ...scalar, reflectionMagnitude: f.map(() => 0.95) };
    expect(bothEnds(all, line, f[60])).toMatchObject({ swrAntenna: null, totalLossDb: null });
    const more = { ...scalar, reflectionMagnitude: f.map(() => 1) };
    expect(bothEnds(more, line, f[60])).toMatchObject({ swrShack: null, swrAntenna: null });
  });
});

describe('the report of a line', () => {
  const codes = (report: ReturnType<typeof lineReport>) => report.flags.map((flag) => flag.code);

  it('flags a loss that hides the mismatch, and a resonance that the line moved', () => {
    const line = lineOf(section(thin, 60));
    const measured = accepted(fromFeedPoint(antenna, line));
    const report = lineReport(measured, plainSummary(measured), ok(line), 2);
    expect(codes(report)).toEqual(['line_moves_resonance', 'loss_hides_mismatch']);
    expect(report.ends.length).toBeGreaterThan(0);
    const asked = report.ends.map((each) => each.frequencyHz);
    expect(asked).toEqual(asked.toSorted((a, b) => a - b));
  });

  it('flags it also where no antenna explains what comes back', () => {
    const line = lineOf(section(thin, 60));
    const good = reflectionSweep(f, () => ({ re: 0.3, im: 0 }));
    const tooLossy = lineOf(section(exactCable(), 1, { extraLossDb: 6 }));
    expect(codes(lineReport(good, plainSummary(good), ok(line), 2))).toContain(
      'loss_hides_mismatch',
    );
    const report = lineReport(good, plainSummary(good), ok(tooLossy), 2);
    expect(report.flags.at(-1)?.detail).toContain('beyond any limit');
  });

  it('flags nothing where the analyzer is at the feed point', () => {
    const report = lineReport(antenna, plainSummary(antenna), ok(lineOf()), 2);
    expect(report.flags).toEqual([]);
    expect(report.ends[0].totalLossDb).toBeCloseTo(0, 12);
  });

  it('flags no hidden mismatch where the SWR is above the limit already', () => {
    const bad = impedanceSweep(f, () => ({ re: 400, im: 0 }));
    const report = lineReport(bad, plainSummary(bad), ok(lineOf(section(thin, 20))), 2);
    expect(codes(report)).toEqual(['line_moves_resonance']);
  });

  it('says that nothing is known of the antenna behind a line of unknown length', () => {
    const unknown = resolveFeedLine(
      [{ cable: 'm17-28-rg58', lengthM: null, lengthU95M: null, extraLossDb: 0, choke: false }],
      findCable,
    );
    const report = lineReport(antenna, plainSummary(antenna), unknown, 2);
    expect(report.ends).toEqual([]);
    expect(codes(report)).toEqual(['line_length_unknown', 'line_moves_resonance']);
  });

  it('says so of a line nobody described', () => {
    const error = fail({ code: 'line_unknown', detail: 'Nobody said.' } as const);
    expect(codes(lineReport(antenna, plainSummary(antenna), error, 2))[0]).toBe('line_unknown');
    const empty = { ...plainSummary(antenna), minimumSwr: null, resonances: [] };
    expect(lineReport(antenna, empty, ok(lineOf()), 2).ends).toEqual([]);
  });
});

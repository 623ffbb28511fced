import { describe, expect, it } from 'vitest';
import { residualError } from '../../../core/analysis/check-load.ts';
import {
  instrumentErrorOf,
  reflectionErrorBound,
  statedInstrumentError,
} from '../../../core/analysis/instrument-error.ts';
import { swrCurve } from '../../../core/analysis/refined-swr.ts';
import { summarise } from '../../../core/analysis/summarise.ts';
import type { ComplexSweep } from '../../../core/sweep.ts';
import {
  evenFrequencies,
  magnitudeOnly,
  seriesCircuit,
  sweepOf,
  withNoise,
} from '../../support/make-sweep.ts';

const frequencyHz = evenFrequencies(6.5e6, 7.7e6, 241);
const directivity40 = { directivity: 0.01, sourceMatch: null, tracking: null };

describe('the residual error of an analyzer', () => {
  it('is read from decibels as magnitudes', () => {
    const error = instrumentErrorOf({ directivityDb: 40, sourceMatchDb: -30, trackingDb: 0.1 });
    expect(error.directivity).toBeCloseTo(0.01, 12);
    expect(error.sourceMatch).toBeCloseTo(0.0316227766, 9);
    expect(error.tracking).toBeCloseTo(0.0115794543, 9);
    expect(
      instrumentErrorOf({ directivityDb: null, sourceMatchDb: null, trackingDb: null }),
    ).toEqual({ directivity: null, sourceMatch: null, tracking: null });
  });

  it('comes back as the decibels it was stated in', () => {
    const stated = { directivityDb: 40, sourceMatchDb: 30, trackingDb: 0.1 };
    const back = statedInstrumentError(instrumentErrorOf(stated));
    expect(back.directivityDb).toBeCloseTo(40, 9);
    expect(back.sourceMatchDb).toBeCloseTo(30, 9);
    expect(back.trackingDb).toBeCloseTo(0.1, 9);
    expect(statedInstrumentError({ directivity: 0, sourceMatch: null, tracking: null })).toEqual({
      directivityDb: null,
      sourceMatchDb: null,
      trackingDb: null,
    });
  });

  it('bounds a return loss of 20 dB by 18.6 and 21.7 dB, as in a published example', () => {
    // Directivity 35 dB, match 30 dB: a published application example, recomputed to 18.5550739867
    // and 21.7342182296 dB.
    const error = instrumentErrorOf({ directivityDb: 35, sourceMatchDb: 30, trackingDb: null });
    const bound = reflectionErrorBound(error, 0.1);
    expect(-20 * Math.log10(0.1 + bound)).toBeCloseTo(18.5550739867, 8);
    expect(-20 * Math.log10(0.1 - bound)).toBeCloseTo(21.7342182296, 8);
  });
});

describe('a sweep by an analyzer of 40 dB directivity', () => {
  it.each([
    [25, 1.9556649661, 2.0456852792],
    [75, 1.4691358025, 1.5316455696],
  ])('of a load of %d ohm has an SWR between the tabled readings', (resistance, low, high) => {
    // SWR range from directivity alone: (1 + ρ -+ D)/(1 - ρ +- D), recomputed.
    const sweep = sweepOf(seriesCircuit(resistance, 5, 7.1e6), frequencyHz);
    const { minimumSwr } = summarise(sweep, { instrument: directivity40 });
    const { swr = 0, swrU95 } = minimumSwr ?? {};
    const half = (high - low) / 2;
    expect((swrU95 ?? 0) / half).toBeGreaterThan(0.95);
    expect((swrU95 ?? 0) / half).toBeLessThan(1.05);
    expect(swr - (swrU95 ?? 0)).toBeLessThan(low + 0.002);
  });

  // Directivity D at its worst phase moves X = 0 by x = D(r + 1)²/2, and the minimum of SWR by
  // x = D(r + 1)²/(2r), in first order of D; a frequency by x/(2 r Q). Recomputed.
  it.each([0.5, 1.36, 2])('finds the resonance of r = %d no better than it can', (r) => {
    const sweep = sweepOf(seriesCircuit(50 * r, 10, 7.1e6), frequencyHz);
    const { resonances, minimumSwr } = summarise(sweep, { instrument: directivity40 });
    const ofResonance = ((0.01 * (r + 1) ** 2) / 2 / (2 * r * 10)) * 7.1e6;
    expect((resonances[0].frequencyU95Hz ?? 0) / ofResonance).toBeCloseTo(1, 3);
    expect((minimumSwr?.frequencyU95Hz ?? 0) / (ofResonance / r)).toBeCloseTo(1, 3);
  });

  it('has wider half-widths everywhere than by noise alone, and says what they hold', () => {
    const sweep = withNoise(sweepOf(seriesCircuit(40, 10, 7.1e6), frequencyHz), 0.002, 1);
    const alone = summarise(sweep);
    const both = summarise(sweep, { instrument: directivity40 });
    expect(both.resonances[0].resistanceU95Ohm).toBeGreaterThan(
      alone.resonances[0].resistanceU95Ohm ?? 0,
    );
    expect(both.spans).toHaveLength(3);
    for (const [i, span] of both.spans.entries()) {
      expect(span.lowU95Hz).toBeGreaterThan(alone.spans[i].lowU95Hz ?? 0);
    }
    expect(alone.cautions.map(({ code }) => code)).toEqual(['noise_only']);
    expect(both.cautions.map(({ code }) => code)).toEqual(['instrument_error_included']);
    expect(both.cautions[0].detail).toMatch(/source match, tracking/);
    const full = { directivity: 0.01, sourceMatch: 0.02, tracking: 0.01 };
    expect(summarise(sweep, { instrument: full }).cautions[0].detail).not.toMatch(/Not known/);
  });

  it('has a wider half-width of its worst SWR as well, with and without phase', () => {
    const sweep = withNoise(sweepOf(seriesCircuit(40, 10, 7.1e6), frequencyHz), 0.002, 1);
    for (const known of [sweep, magnitudeOnly(sweep)]) {
      const alone = swrCurve(known).extremes(7e6, 7.2e6)?.worstSwrU95 ?? 0;
      const both = swrCurve(known, directivity40).extremes(7e6, 7.2e6)?.worstSwrU95 ?? 0;
      expect(alone).toBeGreaterThan(0);
      expect(both).toBeGreaterThan(2 * alone);
    }
  });
});

/** What an analyzer with these residual errors makes of a load: Γ + D + T Γ + M Γ². */
function reading(resistance: number, d: number, t: number, m: number): ComplexSweep {
  const count = frequencyHz.length;
  const nominal =
    resistance === Number.POSITIVE_INFINITY ? 1 : (resistance - 50) / (resistance + 50);
  const read = nominal + d + t * nominal + m * nominal ** 2;
  return {
    phase: 'signed',
    frequencyHz,
    referenceOhm: 50,
    reflectionRe: new Float64Array(count).fill(read),
    reflectionIm: new Float64Array(count),
  };
}

describe('checks with known loads', () => {
  const loads = [0, 25, 50, 75, 100, Number.POSITIVE_INFINITY];

  it('give back the residual errors that made the readings', () => {
    const answer = residualError(
      loads.map((nominalOhm) => ({ nominalOhm, sweep: reading(nominalOhm, 0.01, 0.02, 0.03) })),
    );
    expect(answer.ok).toBe(true);
    if (!answer.ok) return;
    expect(answer.value.directivity).toBeCloseTo(0.01, 12);
    expect(answer.value.tracking).toBeCloseTo(0.02, 12);
    expect(answer.value.sourceMatch).toBeCloseTo(0.03, 12);
  });

  it('with a matched load alone tell the directivity alone', () => {
    const answer = residualError([{ nominalOhm: 50, sweep: reading(50, 0.01, 0.02, 0.03) }]);
    expect(answer).toEqual({
      ok: true,
      value: { directivity: expect.closeTo(0.01, 12), tracking: null, sourceMatch: null },
    });
  });

  it('answer what all but one frequency in twenty stay below', () => {
    const sweep = reading(50, 0.01, 0, 0);
    sweep.reflectionRe.fill(0.5, 0, 5);
    const few = residualError([{ nominalOhm: 50, sweep }]);
    expect(few.ok && few.value.directivity).toBeCloseTo(0.01, 12);
    sweep.reflectionRe.fill(0.5, 0, 30);
    const many = residualError([{ nominalOhm: 50, sweep }]);
    expect(many.ok && many.value.directivity).toBeCloseTo(0.5, 12);
  });

  it('are refused where they cannot tell', () => {
    const other = { ...reading(50, 0, 0, 0), frequencyHz: frequencyHz.map((f) => f + 1) };
    const checks = [{ nominalOhm: 25, sweep: reading(25, 0, 0, 0) }];
    const codeOf = (answer: ReturnType<typeof residualError>) =>
      answer.ok ? null : answer.error.code;
    expect(codeOf(residualError([]))).toBe('no_check');
    expect(
      codeOf(residualError([{ nominalOhm: 50, sweep: magnitudeOnly(reading(50, 0, 0, 0)) }])),
    ).toBe('check_without_phase');
    expect(codeOf(residualError([...checks, { nominalOhm: 50, sweep: other }]))).toBe(
      'checks_on_different_frequencies',
    );
  });
});

import { describe, expect, it } from 'vitest';
import { summarise } from '../../../core/analysis/summarise.ts';
import {
  evenFrequencies,
  magnitudeOnly,
  seriesCircuit,
  sweepOf,
  withNoise,
  withoutSign,
} from '../../support/make-sweep.ts';

const sweep = sweepOf(seriesCircuit(40, 12, 7.1e6), evenFrequencies(6.8e6, 7.4e6, 121));
const signed = summarise(sweep);

describe('a sweep without the sign of its reactance', () => {
  const summary = summarise(withoutSign(sweep));

  it('has the same SWR minimum and spans as with it', () => {
    expect(summary.minimumSwr?.swr).toBeCloseTo(signed.minimumSwr?.swr ?? 0, 6);
    expect(summary.minimumSwr?.frequencyHz).toBeCloseTo(signed.minimumSwr?.frequencyHz ?? 0, -1);
    expect(summary.spans).toHaveLength(signed.spans.length);
    for (const [i, span] of summary.spans.entries()) {
      expect(span.lowHz).toBeCloseTo(signed.spans[i].lowHz, -1);
      expect(span.highHz).toBeCloseTo(signed.spans[i].highHz, -1);
    }
  });

  it('has its resistance at the minimum, but no reactance', () => {
    expect(summary.minimumSwr?.resistanceOhm).toBeCloseTo(40, 3);
    expect(summary.minimumSwr?.reactanceOhm).toBeNull();
  });

  it('claims no resonance and says why', () => {
    expect(summary.resonances).toEqual([]);
    expect(summary.resonanceOffsetHz).toBeNull();
    for (const field of ['resonances', 'resonance_offset_hz', 'minimum_swr.reactance_ohm']) {
      expect(summary.absent).toContainEqual(
        expect.objectContaining({ field, code: 'reactance_sign_unknown' }),
      );
    }
  });

  it('tells where the magnitude of the reactance is smallest', () => {
    expect(summary.reactanceMagnitudeMinima).toHaveLength(1);
    const [smallest] = summary.reactanceMagnitudeMinima;
    expect(Math.abs(smallest.frequencyHz - 7.1e6)).toBeLessThan(500);
    expect(smallest.reactanceMagnitudeOhm).toBe(0);
    expect(smallest.resistanceOhm).toBeCloseTo(40, 0);
    expect(smallest.frequencyU95Hz).not.toBeNull();
  });

  it('tells it through noise, with a half-width', () => {
    const [smallest] = summarise(withoutSign(withNoise(sweep, 0.003, 2))).reactanceMagnitudeMinima;
    const u95 = smallest.frequencyU95Hz ?? 0;
    expect(u95).toBeGreaterThan(0);
    expect(Math.abs(smallest.frequencyHz - 7.1e6)).toBeLessThan(2 * u95);
  });

  it('keeps the magnitude of a reactance that turns back before zero', () => {
    const round = sweepOf(
      (f) => ({ resistance: 50, reactance: 8 + 900 * ((f - 7.1e6) / 1e6) ** 2 }),
      evenFrequencies(6.8e6, 7.4e6, 121),
    );
    const [smallest] = summarise(withoutSign(round)).reactanceMagnitudeMinima;
    expect(smallest.reactanceMagnitudeOhm).toBeCloseTo(8, 6);
    expect(smallest.frequencyU95Hz).toBeNull();
  });

  it('has no smallest place where the reactance only falls', () => {
    const below = sweepOf(seriesCircuit(40, 12, 7.1e6), evenFrequencies(6.5e6, 7e6, 121));
    expect(summarise(withoutSign(below)).reactanceMagnitudeMinima).toEqual([]);
  });
});

describe('a sweep of magnitudes alone', () => {
  const summary = summarise(magnitudeOnly(sweep));

  it('has the same SWR minimum and spans as with the phase', () => {
    expect(summary.minimumSwr?.swr).toBeCloseTo(signed.minimumSwr?.swr ?? 0, 6);
    expect(summary.spans.map(({ maxSwr }) => maxSwr)).toEqual([1.5, 2, 3]);
  });

  it('has no impedance and no resonance, and says why for each', () => {
    expect(summary.minimumSwr?.resistanceOhm).toBeNull();
    expect(summary.reactanceMagnitudeMinima).toEqual([]);
    for (const field of [
      'resonances',
      'reactance_magnitude_minima',
      'resonance_offset_hz',
      'minimum_swr.resistance_ohm',
      'minimum_swr.reactance_ohm',
    ]) {
      expect(summary.absent).toContainEqual(
        expect.objectContaining({ field, code: 'phase_not_measured' }),
      );
    }
  });

  it('cannot be referred to another resistance, and says so', () => {
    const asked = summarise(magnitudeOnly(sweep), { referenceOhm: 75 });
    expect(asked.referenceOhm).toBe(50);
    expect(asked.cautions.map(({ code }) => code)).toContain('reference_not_moved');
    expect(summary.cautions.map(({ code }) => code)).not.toContain('reference_not_moved');
  });
});

import { describe, expect, it } from 'vitest';
import { swrCurve } from '../../../core/analysis/refined-swr.ts';
import { summarise } from '../../../core/analysis/summarise.ts';
import { usableBands } from '../../../core/bands/usable.ts';
import { measuresOf } from '../../../core/record/measures.ts';
import type { Sweep } from '../../../core/sweep.ts';
import {
  evenFrequencies,
  type ImpedanceOf,
  magnitudeOnly,
  seriesCircuit,
  sweepOf,
  withNoise,
} from '../../support/make-sweep.ts';
import { knownPlan } from '../bands/known-plan.ts';

function measured(sweep: Sweep, designBands: readonly string[] = [], maxSwr = 2) {
  const curve = swrCurve(sweep);
  const usable = usableBands(curve, knownPlan('iaru-r1'), { maxSwr, designBands });
  const summary = summarise(sweep);
  return measuresOf({ summary, usable, spans: curve.spans(maxSwr), designBands });
}

function circuit(resonanceHz: number, lowHz: number, highHz: number, points = 201) {
  return sweepOf(seriesCircuit(60, 12, resonanceHz), evenFrequencies(lowHz, highHz, points));
}

describe('the measures of a sweep of one band', () => {
  const sweep = withNoise(circuit(14.1e6, 13.5e6, 14.8e6), 1e-4, 5);
  const { bands, maxSwr } = measured(sweep);

  it('tell its resonance with what is known of it there', () => {
    expect(bands.map(({ band }) => band)).toEqual(['20m']);
    const [{ resonances }] = bands;
    expect(resonances).toHaveLength(1);
    const [{ frequencyHz, frequencyU95Hz, resistanceOhm, q, kind }] = resonances;
    expect(Math.abs(frequencyHz - 14.1e6)).toBeLessThan(2 * (frequencyU95Hz ?? 0));
    expect(resistanceOhm).toBeCloseTo(60, 1);
    expect(q).toBeCloseTo(12, 1);
    expect(kind).toBe('series');
  });

  it('tell the span about the minimum as a whole, with a half-width that joins both edges’', () => {
    const { span, minimum } = bands[0];
    if (span === null || minimum === null) throw new Error('Neither may be missing.');
    expect(maxSwr).toBe(2);
    expect(span.lowHz).toBeLessThan(14e6);
    expect(span.lowHz).toBeLessThan(minimum.frequencyHz);
    expect(span.highHz).toBeGreaterThan(minimum.frequencyHz);
    const { lowU95Hz, highU95Hz, widthU95Hz } = span;
    expect((widthU95Hz ?? 0) ** 2).toBeCloseTo((lowU95Hz ?? 0) ** 2 + (highU95Hz ?? 0) ** 2, 3);
  });
});

describe('a resonance below its band', () => {
  it('is filed under the design band, though another one is nearer', () => {
    const tooLong = circuit(26.3e6, 24e6, 30e6);
    const filed = measured(tooLong, ['10m']).bands.filter(
      ({ resonances }) => resonances.length > 0,
    );
    expect(filed.map(({ band }) => band)).toEqual(['10m']);
  });

  it('is filed under the nearest swept band where the antenna is meant for none', () => {
    const filed = measured(circuit(26.3e6, 24e6, 30e6)).bands.filter(
      ({ minimum }) => minimum !== null,
    );
    expect(filed.map(({ band }) => band)).toEqual(['12m']);
  });

  it('is filed under no band that is far away', () => {
    expect(measured(circuit(5.9e6, 5.6e6, 6.2e6), ['40m']).bands).toEqual([]);
  });
});

describe('a sweep of several bands', () => {
  const twoResonances: ImpedanceOf = (f) =>
    f < 9e6 ? seriesCircuit(45, 12, 7.1e6)(f) : seriesCircuit(70, 14, 14.2e6)(f);
  const { bands } = measured(sweepOf(twoResonances, evenFrequencies(6.5e6, 15e6, 801)), [
    '40m',
    '20m',
  ]);
  const named = (name: string) => bands.find(({ band }) => band === name);

  it('has each resonance under its own band', () => {
    expect(named('40m')?.resonances[0]?.frequencyHz).toBeCloseTo(7.1e6, -3);
    expect(named('20m')?.resonances[0]?.frequencyHz).toBeCloseTo(14.2e6, -3);
  });

  it('has the bands between as well, as they were swept', () => {
    expect(named('30m')?.sweptFraction).toBe(1);
    expect(named('30m')?.usableFraction).toBe(0);
  });
});

describe('the quality of a sweep', () => {
  it('stands with the bands that a flag concerns', () => {
    const narrow = measured(circuit(14.6e6, 13.9e6, 14.3e6));
    expect(narrow.bands[0].flags).toContain('sweep_too_narrow');
    expect(narrow.bands[0].minimum?.atEdge).toBe(true);
  });
});

describe('a sweep without phase', () => {
  it('has a minimum and a span but no resonance', () => {
    const { bands, phase } = measured(magnitudeOnly(circuit(14.1e6, 13.5e6, 14.8e6)));
    expect(phase).toBe('none');
    expect(bands[0].resonances).toEqual([]);
    expect(bands[0].minimum?.frequencyHz).toBeCloseTo(14.1e6, -4);
    expect(bands[0].span).not.toBeNull();
  });
});

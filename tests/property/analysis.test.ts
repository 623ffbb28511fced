import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { summarise } from '../../core/analysis/summarise.ts';
import type { Summary } from '../../core/analysis/summary.ts';
import type { ComplexSweep } from '../../core/sweep.ts';
import {
  evenFrequencies,
  type ImpedanceOf,
  seriesCircuit,
  sweepOf,
  withNoise,
} from '../support/make-sweep.ts';

/** Antennas whose resonance and SWR-2 span lie well inside a sweep from 0.85 to 1.15 of 7 MHz. */
const antennas = fc.record({
  resistance: fc.double({ min: 28, max: 90, noNaN: true }),
  q: fc.double({ min: 8, max: 40, noNaN: true }),
  resonanceHz: fc.double({ min: 6.9e6, max: 7.1e6, noNaN: true }),
  seed: fc.integer({ min: 1, max: 1e6 }),
});

interface Drawn {
  readonly resistance: number;
  readonly q: number;
  readonly resonanceHz: number;
  readonly seed: number;
}

const frequencyHz = evenFrequencies(5.95e6, 8.05e6, 401);

function noisySweep({ resistance, q, resonanceHz, seed }: Drawn): ComplexSweep {
  return withNoise(sweepOf(seriesCircuit(resistance, q, resonanceHz), frequencyHz), 0.002, seed);
}

function placesOf({ minimumSwr, resonances, spans }: Summary): number[] {
  return [
    minimumSwr?.frequencyHz ?? 0,
    ...resonances.map((resonance) => resonance.frequencyHz),
    ...spans.flatMap(({ lowHz, highHz }) => [lowHz, highHz]),
  ];
}

describe('a summary', () => {
  it('scales with the frequencies of its sweep', () => {
    fc.assert(
      fc.property(antennas, fc.integer({ min: 1, max: 40 }), (drawn, factor) => {
        const sweep = noisySweep(drawn);
        const here = placesOf(summarise(sweep));
        const there = placesOf(
          summarise({ ...sweep, frequencyHz: sweep.frequencyHz.map((f) => f * factor) }),
        );
        expect(there).toHaveLength(here.length);
        for (const [i, place] of here.entries()) {
          expect(Math.abs(there[i] / factor - place)).toBeLessThan(1e-6 * place);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('swaps the kinds of resonance where the reactance changes its sign', () => {
    fc.assert(
      fc.property(antennas, (drawn) => {
        const sweep = noisySweep(drawn);
        const here = summarise(sweep);
        const there = summarise({ ...sweep, reflectionIm: sweep.reflectionIm.map((x) => -x) });
        expect(there.resonances).toHaveLength(here.resonances.length);
        for (const [i, { kind, frequencyHz: f, frequencyU95Hz }] of here.resonances.entries()) {
          expect(there.resonances[i].kind).toBe(kind === 'series' ? 'parallel' : 'series');
          expect(Math.abs(there.resonances[i].frequencyHz - f)).toBeLessThan(frequencyU95Hz ?? 0);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('has its resonances where they are whatever the reference, with the same resistance', () => {
    fc.assert(
      fc.property(antennas, fc.constantFrom(25, 75, 300), (drawn, referenceOhm) => {
        const sweep = noisySweep(drawn);
        const [here] = summarise(sweep).resonances;
        const [there] = summarise(sweep, { referenceOhm }).resonances;
        expect(Math.abs(there.frequencyHz - here.frequencyHz)).toBeLessThan(
          (here.frequencyU95Hz ?? 0) + (there.frequencyU95Hz ?? 0),
        );
        expect(Math.abs((there.resistanceOhm ?? 0) - (here.resistanceOhm ?? 0))).toBeLessThan(
          (here.resistanceU95Ohm ?? 0) + (there.resistanceU95Ohm ?? 0),
        );
      }),
      { numRuns: 30 },
    );
  });

  it('does not change by more than its half-widths when every other point is left out', () => {
    fc.assert(
      fc.property(antennas, (drawn) => {
        const sweep = noisySweep(drawn);
        const half = (values: Float64Array) => values.filter((_, i) => i % 2 === 0);
        const thin = summarise({
          ...sweep,
          frequencyHz: half(sweep.frequencyHz),
          reflectionRe: half(sweep.reflectionRe),
          reflectionIm: half(sweep.reflectionIm),
        });
        const full = summarise(sweep);
        expect(thin.resonances).toHaveLength(full.resonances.length);
        for (const [i, { frequencyHz: f, frequencyU95Hz }] of thin.resonances.entries()) {
          // The full sweep holds the thin one: 2.5 half-widths are five deviations of one of them.
          expect(Math.abs(f - full.resonances[i].frequencyHz)).toBeLessThan(
            2.5 * (frequencyU95Hz ?? 0),
          );
        }
      }),
      { numRuns: 30 },
    );
  });

  it('has its spans inside each other, the wider limit around the narrower', () => {
    fc.assert(
      fc.property(antennas, (drawn) => {
        const { spans } = summarise(noisySweep(drawn), { swrLimits: [1.9, 2.2, 3] });
        expect(spans.length).toBeGreaterThanOrEqual(2);
        for (let i = 1; i < spans.length; i++) {
          expect(spans[i].lowHz).toBeLessThanOrEqual(spans[i - 1].lowHz);
          expect(spans[i].highHz).toBeGreaterThanOrEqual(spans[i - 1].highHz);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('of any finite points comes to an end and holds finite numbers', () => {
    const points = fc.array(
      fc.tuple(
        fc.double({ min: -1.5, max: 1.5, noNaN: true }),
        fc.double({ min: -1.5, max: 1.5, noNaN: true }),
      ),
      { minLength: 1, maxLength: 60 },
    );
    fc.assert(
      fc.property(points, (drawn) => {
        const summary = summarise({
          phase: 'signed',
          frequencyHz: Float64Array.from(drawn, (_, i) => 1e6 * (i + 1)),
          referenceOhm: 50,
          reflectionRe: Float64Array.from(drawn, ([re]) => re),
          reflectionIm: Float64Array.from(drawn, ([, im]) => im),
        });
        const text = JSON.stringify(summary, (_, value) =>
          typeof value === 'number' && !Number.isFinite(value) ? 'not finite' : value,
        );
        expect(text).not.toContain('not finite');
        for (const { swr } of summary.swrMinima) expect(swr).toBeGreaterThanOrEqual(1);
      }),
      { numRuns: 60 },
    );
  });

  it('of an exact sweep has the resonance of its circuit to a millionth of a step', () => {
    fc.assert(
      fc.property(antennas, ({ resistance, q, resonanceHz }) => {
        const circuit: ImpedanceOf = seriesCircuit(resistance, q, resonanceHz);
        const [found] = summarise(sweepOf(circuit, frequencyHz)).resonances;
        expect(Math.abs(found.frequencyHz - resonanceHz)).toBeLessThan(5250e-6);
      }),
      { numRuns: 30 },
    );
  });
});

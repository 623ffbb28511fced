import { describe, expect, it } from 'vitest';
import { swrCurve } from '../../../core/analysis/refined-swr.ts';
import { summarise } from '../../../core/analysis/summarise.ts';
import type { Summary } from '../../../core/analysis/summary.ts';
import type { ComplexSweep, ScalarSweep } from '../../../core/sweep.ts';
import {
  evenFrequencies,
  magnitudeOnly,
  seriesCircuit,
  sweepOf,
  withNoise,
  withoutSign,
} from '../../support/make-sweep.ts';

const antenna = seriesCircuit(40, 12, 7.1e6);

/** A sweep of which only the magnitude of the reflection is known, one megahertz apart. */
function magnitudes(values: readonly number[]): ScalarSweep {
  return {
    phase: 'none',
    frequencyHz: Float64Array.from(values, (_, i) => (i + 1) * 1e6),
    referenceOhm: 50,
    reflectionMagnitude: Float64Array.from(values),
  };
}

function points(re: readonly number[], im: readonly number[]): ComplexSweep {
  return {
    phase: 'signed',
    frequencyHz: Float64Array.from(re, (_, i) => (i + 1) * 1e6),
    referenceOhm: 50,
    reflectionRe: Float64Array.from(re),
    reflectionIm: Float64Array.from(im),
  };
}

function numbersIn(value: unknown): number[] {
  if (typeof value === 'number') return [value];
  if (typeof value !== 'object' || value === null) return [];
  return Object.values(value).flatMap(numbersIn);
}

describe('a sweep of one point', () => {
  const { minimumSwr, resonances, spans, absent, span } = summarise(points([0.2], [0.4]));

  it('has its SWR and impedance there, and calls it an edge', () => {
    expect(minimumSwr?.swr).toBeCloseTo(2.61803398875, 9);
    expect(minimumSwr?.resistanceOhm).toBeCloseTo(50, 9);
    expect(minimumSwr?.reactanceOhm).toBeCloseTo(50, 9);
    expect(minimumSwr?.atEdge).toBe(true);
  });

  it('has no resonance, no step and no half-width, and says why', () => {
    expect(resonances).toEqual([]);
    expect(span.medianStepHz).toBeNull();
    expect(absent).toContainEqual(
      expect.objectContaining({ field: 'resonances', code: 'one_point' }),
    );
    expect(absent).toContainEqual(
      expect.objectContaining({ field: 'minimum_swr.swr_u95', code: 'one_point' }),
    );
  });

  it('is a span of no width that is open on both sides, where it is usable', () => {
    expect(spans).toHaveLength(1);
    expect(spans[0]).toMatchObject({ maxSwr: 3, widthHz: 0, lowOpen: true, highOpen: true });
  });

  it('answers its extremes at the point and nothing elsewhere', () => {
    const curve = swrCurve(points([0.2], [0.4]));
    expect(curve.extremes(0.5e6, 2e6)?.worstSwr).toBeCloseTo(2.618, 3);
    expect(curve.extremes(1.5e6, 2e6)).toBeNull();
  });

  it.each(['unsigned', 'none'] as const)('with phase %s has its SWR too', (phase) => {
    const signed = points([0.2], [0.4]);
    const sweep = phase === 'none' ? magnitudeOnly(signed) : withoutSign(signed);
    const summary = summarise(sweep);
    expect(summary.minimumSwr?.swr).toBeCloseTo(2.61803398875, 9);
    expect(summary.minimumSwr?.resistanceOhm === null).toBe(phase === 'none');
    expect(summary.minimumSwr?.reactanceOhm).toBeNull();
  });
});

describe('a sweep of two points', () => {
  it('crosses zero on the straight line between them', () => {
    const { resonances, minimumSwr } = summarise(points([-0.2, -0.2], [-0.1, 0.1]));
    expect(resonances).toHaveLength(1);
    expect(resonances[0].kind).toBe('series');
    expect(resonances[0].frequencyHz / 1.5e6).toBeCloseTo(1, 1);
    expect(resonances[0].frequencyU95Hz).toBeNull();
    expect(minimumSwr?.atEdge).toBe(false);
  });

  it('has no resonance where the reactance keeps its sign', () => {
    expect(summarise(points([-0.2, -0.2], [0.3, 0.1])).resonances).toEqual([]);
  });
});

describe('the minima of SWR', () => {
  it('lie in the middle of a flat stretch', () => {
    const { swrMinima } = summarise(magnitudes([0.5, 0.3, 0.3, 0.5]));
    expect(swrMinima).toHaveLength(1);
    expect(swrMinima[0].frequencyHz).toBeCloseTo(2.5e6, 0);
  });

  it('are none on a shelf of a slope, but the end of the slope', () => {
    const { swrMinima } = summarise(magnitudes([0.5, 0.4, 0.4, 0.2]));
    expect(swrMinima).toHaveLength(1);
    expect(swrMinima[0]).toMatchObject({ frequencyHz: 4e6, atEdge: true });
  });

  it('are one in the middle of a sweep that is flat from end to end', () => {
    const { swrMinima, minimumSwr } = summarise(magnitudes([0.5, 0.5, 0.5]));
    expect(swrMinima).toHaveLength(1);
    expect(minimumSwr).toMatchObject({ frequencyHz: 2e6, atEdge: false });
  });

  it('are two where the curve rises between them', () => {
    const { swrMinima } = summarise(magnitudes([0.5, 0.2, 0.5, 0.3]));
    expect(swrMinima.map(({ atEdge }) => atEdge)).toEqual([false, true]);
    expect(summarise(magnitudes([0.5, 0.2, 0.5, 0.3])).minimumSwr?.frequencyHz).toBeCloseTo(
      2e6,
      -4,
    );
  });

  it('are not multiplied by noise', () => {
    const sweep = withNoise(sweepOf(antenna, evenFrequencies(6.8e6, 7.4e6, 301)), 0.01, 1);
    expect(summarise(sweep).swrMinima).toHaveLength(1);
  });
});

describe('a sweep that ends before its minimum', () => {
  const below = summarise(sweepOf(antenna, evenFrequencies(6.5e6, 7e6, 101)));
  const above = summarise(sweepOf(antenna, evenFrequencies(7.2e6, 7.6e6, 101)));

  it('is marked as at the edge and flagged as too narrow', () => {
    expect(below.minimumSwr).toMatchObject({ frequencyHz: 7e6, atEdge: true });
    expect(above.minimumSwr).toMatchObject({ frequencyHz: 7.2e6, atEdge: true });
    for (const { quality } of [below, above]) {
      expect(quality.flags.map(({ code }) => code)).toContain('sweep_too_narrow');
    }
  });

  it('has no offset from the resonance, and says why', () => {
    expect(below.resonanceOffsetHz).toBeNull();
    expect(below.absent.map(({ field }) => field)).toContain('resonance_offset_hz');
  });

  it('has spans that are open where the sweep ends', () => {
    const [wide] = below.spans.filter(({ maxSwr }) => maxSwr === 3);
    expect(wide).toMatchObject({ highHz: 7e6, highOpen: true, lowOpen: false, highU95Hz: null });
    expect(below.absent).toContainEqual(
      expect.objectContaining({ field: 'spans.high_u95_hz', code: 'sweep_ends' }),
    );
  });
});

describe('a usable span', () => {
  const sweep = sweepOf(antenna, evenFrequencies(6.8e6, 7.4e6, 121));

  it('is the whole sweep, open on both sides, where the SWR never passes the limit', () => {
    const [span] = summarise(sweep, { swrLimits: [50] }).spans;
    expect(span).toMatchObject({ lowHz: 6.8e6, highHz: 7.4e6, lowOpen: true, highOpen: true });
  });

  it('is none where the SWR never falls to the limit', () => {
    expect(summarise(sweep, { swrLimits: [1.1] }).spans).toEqual([]);
  });

  it('comes once for each limit, in the order of the limits', () => {
    expect(summarise(sweep).spans.map(({ maxSwr }) => maxSwr)).toEqual([1.5, 2, 3]);
  });

  it('is the same from the curve as in the summary', () => {
    expect(swrCurve(sweep).spans(2)).toEqual(summarise(sweep, { swrLimits: [2] }).spans);
    expect(swrCurve(points([0.2], [0.4])).spans(2)).toEqual([]);
  });

  it('has its worst SWR at the end that is farther in octaves and its best inside', () => {
    const curve = swrCurve(sweep);
    const extremes = curve.extremes(7e6, 7.2e6);
    expect(extremes?.worstSwrHz).toBe(7e6);
    expect(extremes?.minimumSwr).toBeCloseTo(1.25, 6);
    expect(extremes?.minimumSwrHz).toBeCloseTo(7.1e6, 0);
    expect(curve.extremes(8e6, 9e6)).toBeNull();
  });
});

describe('a total reflection', () => {
  it('has no SWR anywhere, and says why', () => {
    const summary = summarise(magnitudes([1, 1, 1, 1]));
    expect(summary.minimumSwr).toBeNull();
    expect(summary.swrMinima).toEqual([]);
    expect(summary.absent).toContainEqual(
      expect.objectContaining({ field: 'minimum_swr', code: 'total_reflection' }),
    );
  });

  it('above 1 is not turned into a negative SWR', () => {
    const summary = summarise(magnitudes([1.2, 1.1, 1.05, 1.3]));
    expect(summary.minimumSwr).toBeNull();
    expect(summary.spans).toEqual([]);
  });
});

describe('a sweep that begins at zero frequency', () => {
  it('is summarised like any other', () => {
    const sweep = sweepOf(seriesCircuit(30, 2, 5e6), evenFrequencies(0, 12e6, 241));
    const { resonances } = summarise(sweep);
    expect(resonances.filter(({ kind }) => kind === 'series')).toHaveLength(1);
    expect(resonances[0].frequencyHz).toBeCloseTo(5e6, 0);
  });
});

describe('a perfect match', () => {
  it('has SWR 1 and no finite return loss, and says why', () => {
    const summary = summarise(magnitudes([0, 0, 0]));
    expect(summary.minimumSwr?.swr).toBe(1);
    expect(summary.minimumSwr?.returnLossDb).toBeNull();
    expect(summary.absent.map(({ code }) => code)).toContain('perfect_match');
  });
});

describe('what is answered', () => {
  const sweeps: readonly [string, () => Summary][] = [
    ['one point', () => summarise(points([0.2], [0.4]))],
    ['two points', () => summarise(points([0.2, -0.3], [0.4, -0.1]))],
    ['three equal points', () => summarise(points([0.2, 0.2, 0.2], [0.4, 0.4, 0.4]))],
    ['four points', () => summarise(points([1, -1, 1, -1], [0, 0, 0, 0]))],
    ['all zero', () => summarise(points([0, 0, 0, 0, 0, 0], [0, 0, 0, 0, 0, 0]))],
    ['an open', () => summarise(points([1, 1, 1, 1, 1, 1], [0, 0, 0, 0, 0, 0]))],
    ['a short', () => summarise(points([-1, -1, -1, -1, -1, -1], [0, 0, 0, 0, 0, 0]))],
    ['a sawtooth', () => summarise(magnitudes(Array.from({ length: 99 }, (_, i) => (i % 7) / 7)))],
    [
      'nothing but noise',
      () => summarise(withNoise(points(Array(200).fill(0), Array(200).fill(0)), 0.5, 4)),
    ],
  ];

  it.each(sweeps)('for %s holds no number that is not finite', (_, summaryOf) => {
    const numbers = numbersIn(summaryOf());
    expect(numbers.length).toBeGreaterThan(3);
    expect(numbers.filter((value) => !Number.isFinite(value))).toEqual([]);
  });

  it.each(sweeps)('for %s gives a reason for every null', (_, summaryOf) => {
    const summary = summaryOf();
    const fields = summary.absent.map(({ field }) => field);
    expect(fields.length).toBeGreaterThan(0);
    for (const field of nullFields(summary)) expect(fields).toContain(field);
  });
});

/** Paths of the fields that are null, in the words of the answer, numbers of lists left out. */
function nullFields(value: unknown, path = ''): string[] {
  if (value === null) return [path];
  if (Array.isArray(value)) return value.flatMap((item) => nullFields(item, path));
  if (typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, child]) => {
    const name = key
      .replace(
        /U95(Ohm|Hz)?$/,
        (_, unit = '') => `_u95${unit === '' ? '' : `_${unit.toLowerCase()}`}`,
      )
      .replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);
    return nullFields(child, path === '' ? name : `${path}.${name}`);
  });
}

import { describe, expect, it } from 'vitest';
import type { BandBaseline } from '../../../core/record/baseline.ts';
import { changeSince } from '../../../core/record/baseline-change.ts';
import type { BandMeasures, MeasuredResonance } from '../../../core/record/measures.ts';

const baseline: BandBaseline = {
  band: '20m',
  source: 'dry',
  sweepIds: ['a', 'b', 'c'],
  resonances: [
    {
      kind: 'series',
      frequencyHz: { value: 14_100_000, u95: 3000 },
      resistanceOhm: null,
      swr: null,
      q: null,
    },
  ],
  minimumHz: { value: 14_110_000, u95: 3000 },
  minimumSwr: { value: 1.3, u95: 0.03 },
  spanWidthHz: null,
  usableFraction: { value: 1, u95: null },
};

function resonanceAt(
  frequencyHz: number,
  frequencyU95Hz: number | null = 4000,
  kind: MeasuredResonance['kind'] = 'series',
): MeasuredResonance {
  return {
    frequencyHz,
    frequencyU95Hz,
    kind,
    resistanceOhm: 40,
    resistanceU95Ohm: null,
    swr: 1.3,
    swrU95: null,
    q: null,
    qU95: null,
    grazing: false,
  };
}

function measuresWith(resonances: readonly MeasuredResonance[], swr = 1.31): BandMeasures {
  return {
    band: '20m',
    sweptFraction: 1,
    usableFraction: 0.75,
    resonances,
    minimum: { frequencyHz: 14_100_000, frequencyU95Hz: 4000, swr, swrU95: 0.04, atEdge: false },
    span: null,
    flags: [],
  };
}

describe('a sweep held against the baseline of its era', () => {
  it('is the same where no difference is beyond the half-widths of both together', () => {
    const change = changeSince(baseline, measuresWith([resonanceAt(14_104_000)]));
    expect(change.verdict).toBe('same');
    // Root sum of squares: 3, 4 and 5.
    expect(change.resonanceHz).toEqual({ value: 4000, u95: 5000 });
    expect(change.minimumSwr?.value).toBeCloseTo(0.01, 9);
    expect(change.minimumSwr?.u95).toBeCloseTo(0.05, 9);
    expect(change.usableFraction).toBeCloseTo(-0.25, 9);
  });

  it('is changed where one is beyond', () => {
    expect(changeSince(baseline, measuresWith([resonanceAt(14_094_900)])).verdict).toBe('changed');
    const high = measuresWith([resonanceAt(14_100_000)], 1.36);
    expect(changeSince(baseline, high).verdict).toBe('changed');
  });

  it('keeps to a resonance of the same kind that is not too far', () => {
    const parallel = resonanceAt(14_100_000, 4000, 'parallel');
    expect(changeSince(baseline, measuresWith([parallel])).resonanceHz).toBeNull();
    expect(changeSince(baseline, measuresWith([resonanceAt(16_000_000)])).resonanceHz).toBeNull();
    const both = measuresWith([parallel, resonanceAt(14_090_000)]);
    expect(changeSince(baseline, both).resonanceHz?.value).toBe(-10_000);
  });

  it('is not judged where no half-width is known', () => {
    const unknown = { ...baseline, minimumSwr: { value: 1.3, u95: null } };
    const change = changeSince(unknown, measuresWith([resonanceAt(14_200_000, null)]));
    expect(change).toMatchObject({
      verdict: 'unknown',
      resonanceHz: { value: 100_000, u95: null },
    });
  });

  it('has no difference of what either lacks', () => {
    const bare = { ...measuresWith([]), minimum: null };
    expect(changeSince(baseline, bare)).toMatchObject({ minimumSwr: null, resonanceHz: null });
  });
});

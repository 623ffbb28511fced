import { describe, expect, it } from 'vitest';
import type { HistoryRow } from '../../../core/record/measures.ts';
import { trimPairsOf } from '../../../core/record/trim-pairs.ts';
import { bandOf, resonanceAt, rowAt } from '../../support/history-rows.ts';

const row = (frequencyHz: number, facts: Parameters<typeof rowAt>[2] = {}): HistoryRow =>
  rowAt(0, [bandOf([resonanceAt(frequencyHz, { frequencyU95Hz: 300 })])], facts);

function pairsOf(before: readonly HistoryRow[], after: readonly HistoryRow[]) {
  return trimPairsOf([{ lengthChangeM: -0.1, before, after }]);
}

describe('what a trim did', () => {
  it('is the change of the resonance, with the half-widths of both joined', () => {
    const [pair] = pairsOf([row(14.0e6)], [row(14.14e6)]);
    expect(pair).toMatchObject({ lengthChangeM: -0.1, frequencyChangeHz: 140e3 });
    // Root sum of squares of 300 and 300 Hz.
    expect(pair.frequencyChangeU95Hz).toBeCloseTo(424.26, 2);
  });

  it('is read by one analyzer where the sweeps allow it', () => {
    const before = [row(14.01e6, { analyzerId: 'handheld' }), row(14.0e6)];
    const after = [row(14.2e6, { analyzerId: 'other' }), row(14.14e6)];
    expect(pairsOf(before, after)[0].frequencyChangeHz).toBe(140e3);
  });

  it('is that of the least SWR where a resonance is not known', () => {
    const noPhase = rowAt(0, [
      bandOf([], {
        minimum: {
          frequencyHz: 14.1e6,
          frequencyU95Hz: null,
          swr: 1.3,
          swrU95: null,
          atEdge: false,
        },
      }),
    ]);
    expect(pairsOf([row(14.0e6)], [noPhase])).toEqual([
      { lengthChangeM: -0.1, frequencyChangeHz: 100e3, frequencyChangeU95Hz: null },
    ]);
  });

  it('is not known from two planes, from one side alone, or from a minimum at the edge', () => {
    expect(pairsOf([row(14e6)], [row(14.1e6, { measures: { plane: 'feed_point' } })])).toEqual([]);
    expect(pairsOf([row(14e6)], [])).toEqual([]);
    const edge = rowAt(0, [
      bandOf([], {
        minimum: { frequencyHz: 14.35e6, frequencyU95Hz: null, swr: 2, swrU95: null, atEdge: true },
      }),
    ]);
    expect(pairsOf([row(14e6)], [edge])).toEqual([]);
  });
});

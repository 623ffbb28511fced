import { describe, expect, it } from 'vitest';
import type { HistoryRow } from '../../../core/record/measures.ts';
import { followResonances, type ResonanceTrack } from '../../../core/record/tracks.ts';
import { bandOf, resonanceAt, rowAt, yearMs } from '../../support/history-rows.ts';
import { Random } from '../../support/random.ts';

/** Sweeps every eight weeks; each path tells where a resonance is after some years, or that it is not. */
function sweepsOf(
  paths: readonly ((years: number) => number | null)[],
  { count = 20, noise = 3e-4, seed = 1, everyYears = 0.15 } = {},
): readonly HistoryRow[] {
  const random = new Random(seed);
  return Array.from({ length: count }, (_, i) => {
    const years = i * everyYears;
    const seen = paths.flatMap((path) => {
      const hz = path(years);
      return hz === null ? [] : [hz * (1 + noise * random.gaussian())];
    });
    const ascending = seen.toSorted((a, b) => a - b).map((hz) => resonanceAt(hz));
    return rowAt(years * yearMs, [bandOf(ascending)]);
  });
}

const foundHz = ({ points }: ResonanceTrack) =>
  points.map(({ resonance }) => resonance.frequencyHz);

/** How many points of a track are nearer to a path than to any other. */
function pointsOn(
  track: ResonanceTrack,
  path: (years: number) => number,
  others: readonly ((years: number) => number)[],
): number {
  return track.points.filter(({ row, resonance }) => {
    const years = row.measuredAtMs / yearMs;
    const off = Math.abs(resonance.frequencyHz - path(years));
    return others.every((other) => off <= Math.abs(resonance.frequencyHz - other(years)));
  }).length;
}

describe('a single resonance', () => {
  it('is one track through a slow drift', () => {
    const tracks = followResonances(sweepsOf([(y) => 14.1e6 * (1 - 0.004 * y)]), '20m');
    expect(tracks).toHaveLength(1);
    expect(tracks[0]).toMatchObject({ kind: 'series', standing: 'followed' });
    expect(tracks[0].points).toHaveLength(20);
    expect(tracks[0].points.some(({ jumped }) => jumped)).toBe(false);
  });

  it('is one track through the readings of an instrument that is 0.3 % off', () => {
    const rows = sweepsOf([() => 14.1e6]).map((row, i) =>
      i % 4 === 0 ? rowAt(row.measuredAtMs, [bandOf([resonanceAt(14.1e6 * 1.003)])]) : row,
    );
    const tracks = followResonances(rows, '20m');
    expect(tracks).toHaveLength(1);
    expect(tracks[0].points.some(({ jumped }) => jumped)).toBe(false);
  });

  it('keeps its track where it jumps, and the jump is marked', () => {
    const [track, ...more] = followResonances(sweepsOf([(y) => (y < 1 ? 14.1e6 : 14.4e6)]), '20m');
    expect(more).toEqual([]);
    expect(track.points.filter(({ jumped }) => jumped)).toHaveLength(1);
    const jump = track.points.find(({ jumped }) => jumped);
    expect((jump?.row.measuredAtMs ?? 0) / yearMs).toBeCloseTo(1.05, 2);
    expect(jump?.expectedHz).toBeCloseTo(14.1e6, -5);
  });

  it('may lie elsewhere after work without being a jump', () => {
    const rows = sweepsOf([(y) => (y < 1 ? 14.1e6 : 14.4e6)]).map((row) => ({
      ...row,
      eraIndex: row.measuredAtMs < yearMs ? 0 : 1,
    }));
    const tracks = followResonances(rows, '20m');
    expect(tracks).toHaveLength(1);
    expect(tracks[0].points.filter(({ jumped }) => jumped)).toEqual([]);
  });

  it('that is far from the one before is another one', () => {
    const tracks = followResonances(sweepsOf([(y) => (y < 1 ? 13.9e6 : 15.2e6)]), '20m');
    expect(tracks.map(({ standing }) => standing)).toEqual(['ended', 'followed']);
  });
});

describe('two resonances that cross', () => {
  const rising = (y: number) => 14.0e6 * (1 + 0.008 * y);
  const falling = (y: number) => 14.26e6 * (1 - 0.006 * y);

  it('go on as they went, though their order in the list changes', () => {
    const seeds = Array.from({ length: 100 }, (_, i) => i + 1);
    const right = seeds.filter((seed) => {
      const tracks = followResonances(sweepsOf([rising, falling], { seed }), '20m');
      if (tracks.length !== 2) return false;
      const [low, high] = tracks.toSorted((a, b) => foundHz(a)[0] - foundHz(b)[0]);
      // Where they are nearer than the noise neither can be told; one point each may be the other's.
      return pointsOn(low, rising, [falling]) >= 19 && pointsOn(high, falling, [rising]) >= 19;
    });
    expect(right.length).toBeGreaterThanOrEqual(98);
  });
});

describe('a resonance that vanishes', () => {
  const steady = () => 14.05e6;

  it('ends its track and no other', () => {
    const tracks = followResonances(sweepsOf([steady, (y) => (y < 1 ? 14.2e6 : null)]), '20m');
    expect(tracks).toHaveLength(2);
    const ended = tracks.find(({ standing }) => standing === 'ended');
    expect(ended?.points.map(({ resonance }) => Math.round(resonance.frequencyHz / 1e5))).toEqual(
      Array.from({ length: 7 }, () => 142),
    );
    const other = tracks.find(({ standing }) => standing === 'followed');
    expect(other?.points).toHaveLength(20);
  });

  it('is paused at first, and goes on where it comes back soon', () => {
    const gone = (y: number) => (y > 1 && y < 1.4 ? null : 14.2e6);
    const paths = [steady, gone];
    const during = followResonances(sweepsOf(paths, { count: 9 }), '20m');
    expect(during.map(({ standing }) => standing).toSorted()).toEqual(['followed', 'paused']);
    const after = followResonances(sweepsOf(paths), '20m');
    expect(after).toHaveLength(2);
    expect(after.every(({ standing }) => standing === 'followed')).toBe(true);
  });

  it('is not missed by sweeps without phase or of a small part of the band', () => {
    const rows = sweepsOf([steady], { count: 20 }).map((row, i) => {
      if (i < 5 || i > 14) return row;
      return i % 2 === 0
        ? rowAt(row.measuredAtMs, [bandOf([])], { measures: { phase: 'none' } })
        : rowAt(row.measuredAtMs, [bandOf([], { sweptFraction: 0.1 })]);
    });
    const tracks = followResonances(rows, '20m');
    expect(tracks).toHaveLength(1);
    expect(tracks[0]).toMatchObject({ standing: 'followed' });
    expect(tracks[0].points).toHaveLength(10);
  });
});

describe('the half-width of a resonance', () => {
  const before = Array.from({ length: 6 }, (_, i) =>
    rowAt(0.1 * i * yearMs, [bandOf([resonanceAt(14.1e6)])]),
  );
  const last = (frequencyU95Hz: number) => {
    const far = resonanceAt(14.25e6, { frequencyU95Hz });
    const [track] = followResonances([...before, rowAt(0.6 * yearMs, [bandOf([far])])], '20m');
    return track.points.at(-1);
  };

  it('opens the gate: far off and ill known is no jump, far off and well known is', () => {
    expect(last(100e3)?.jumped).toBe(false);
    expect(last(300)?.jumped).toBe(true);
  });
});

describe('resonances of different kinds', () => {
  it('are never one, however near', () => {
    const rows = Array.from({ length: 6 }, (_, i) =>
      rowAt(0.1 * i * yearMs, [
        bandOf([resonanceAt(14.1e6), resonanceAt(14.101e6, { kind: 'parallel' })]),
      ]),
    );
    const swapped = rowAt(0.6 * yearMs, [
      bandOf([resonanceAt(14.1e6, { kind: 'parallel' }), resonanceAt(14.101e6)]),
    ]);
    const tracks = followResonances([...rows, swapped], '20m');
    expect(tracks).toHaveLength(2);
    for (const { kind, points } of tracks) {
      expect(points).toHaveLength(7);
      expect(points.every(({ resonance }) => resonance.kind === kind)).toBe(true);
    }
  });
});

describe('what may be noise', () => {
  it('begins no track', () => {
    const rows = [rowAt(0, [bandOf([resonanceAt(14.1e6, { grazing: true })])])];
    expect(followResonances(rows, '20m')).toEqual([]);
  });
});

import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { summarise } from '../../core/analysis/summarise.ts';
import type { Summary } from '../../core/analysis/summary.ts';
import type { ComplexSweep } from '../../core/sweep.ts';

/**
 * Measured and computed files that come with a general-purpose network library (Debian's package
 * python3-scikit-rf), answered a second time by plain linear interpolation in numpy
 * (plain_interpolation.py beside this file), which shares nothing with the project.
 */
const library = '/usr/lib/python3/dist-packages/skrf';
const python = '/usr/bin/python3';

interface PlainAnswers {
  readonly frequency_hz: readonly number[];
  readonly re: readonly number[];
  readonly im: readonly number[];
  readonly reference_ohm: number;
  readonly crossings: readonly {
    readonly frequency_hz: number;
    readonly kind: 'series' | 'parallel';
    readonly bound_hz: number;
    readonly clear: boolean;
  }[];
  readonly lowest: {
    readonly frequency_hz: number;
    readonly step_hz: number;
    readonly swr: number;
    readonly spread_of_neighbours: number;
  };
}

interface NamedFile {
  readonly name: string;
  readonly path: string;
  readonly port: 1 | 2;
  /** Crossings of the reactance that are clear of noise, so that a changed file is noticed. */
  readonly clear: number;
}

const files: readonly NamedFile[] = [
  { name: 'a measured slot', path: 'data/ring slot measured.s1p', port: 1, clear: 1 },
  { name: 'the computed slot', path: 'data/ring slot.s2p', port: 1, clear: 1 },
  { name: 'the computed slot from behind', path: 'data/ring slot.s2p', port: 2, clear: 2 },
  { name: 'a measured two-port', path: 'tests/ntwk4.s2p', port: 1, clear: 15 },
  { name: 'a measured two-port from behind', path: 'tests/ntwk4.s2p', port: 2, clear: 4 },
];

function answersOf({ path, port }: NamedFile): { plain: PlainAnswers; summary: Summary } {
  const script = new URL('plain_interpolation.py', import.meta.url).pathname;
  const plain = JSON.parse(
    execFileSync(python, [script, `${library}/${path}`, String(port)], { encoding: 'utf8' }),
  ) as PlainAnswers;
  const sweep: ComplexSweep = {
    phase: 'signed',
    frequencyHz: Float64Array.from(plain.frequency_hz),
    referenceOhm: plain.reference_ohm,
    reflectionRe: Float64Array.from(plain.re),
    reflectionIm: Float64Array.from(plain.im),
  };
  return { plain, summary: summarise(sweep) };
}

interface CrossingRange {
  readonly kind: 'series' | 'parallel';
  readonly lowHz: number;
  readonly highHz: number;
}

/**
 * Where straight lines put each resonance. Crossings that are not clear of their neighbours are one
 * crossing to and fro in noise: an odd number of them in a row is one resonance somewhere between the
 * first and the last, of the kind of the first; an even number is none.
 */
function rangesOf(crossings: PlainAnswers['crossings']): readonly CrossingRange[] {
  const runs: PlainAnswers['crossings'][number][][] = [];
  for (const crossing of crossings) {
    const run = runs.at(-1);
    if (!crossing.clear && run !== undefined && !run[0].clear) run.push(crossing);
    else runs.push([crossing]);
  }
  return runs
    .filter((run) => run.length % 2 === 1)
    .map((run) => ({
      kind: run[0].kind,
      lowHz: Math.min(...run.map((at) => at.frequency_hz - at.bound_hz)),
      highHz: Math.max(...run.map((at) => at.frequency_hz + at.bound_hz)),
    }));
}

const installed = existsSync(python) && files.every(({ path }) => existsSync(`${library}/${path}`));
if (!installed) {
  console.warn("Skipped: the files of Debian's python3-scikit-rf and python3-numpy are not here.");
}

describe.skipIf(!installed).each(files)('$name ($path, port $port)', (file) => {
  it('has its clear resonances where straight lines between the points cross zero', () => {
    const { plain, summary } = answersOf(file);
    const clear = plain.crossings.filter((crossing) => crossing.clear);
    expect(clear).toHaveLength(file.clear);
    for (const { frequency_hz, kind, bound_hz } of clear) {
      const nearest = summary.resonances
        .filter((resonance) => resonance.kind === kind)
        .reduce((best, one) =>
          Math.abs(one.frequencyHz - frequency_hz) < Math.abs(best.frequencyHz - frequency_hz)
            ? one
            : best,
        );
      const distance = Math.abs(nearest.frequencyHz - frequency_hz);
      expect(distance).toBeLessThanOrEqual((nearest.frequencyU95Hz ?? 0) + bound_hz);
    }
  });

  it('has no resonance beyond doubt where straight lines show none', () => {
    const { plain, summary } = answersOf(file);
    const ranges = rangesOf(plain.crossings);
    const beyondDoubt = summary.resonances.filter((resonance) => !resonance.grazing);
    expect(beyondDoubt.length).toBeGreaterThanOrEqual(file.clear);
    for (const { frequencyHz, frequencyU95Hz, kind } of beyondDoubt) {
      const slack = frequencyU95Hz ?? 0;
      const home = ranges.find(
        (range) =>
          range.kind === kind &&
          frequencyHz >= range.lowHz - slack &&
          frequencyHz <= range.highHz + slack,
      );
      expect(home, `${kind} at ${frequencyHz} Hz`).toBeDefined();
    }
  });

  it('has its least SWR within a step of the lowest point, and about as low', () => {
    const { plain, summary } = answersOf(file);
    const { lowest } = plain;
    const { minimumSwr } = summary;
    expect(minimumSwr).not.toBeNull();
    if (minimumSwr === null) return;
    const reach = 1.5 * lowest.step_hz + (minimumSwr.frequencyU95Hz ?? 0);
    expect(Math.abs(minimumSwr.frequencyHz - lowest.frequency_hz)).toBeLessThanOrEqual(reach);
    const slack = (minimumSwr.swrU95 ?? 0) + lowest.spread_of_neighbours;
    expect(Math.abs(minimumSwr.swr - lowest.swr)).toBeLessThanOrEqual(slack);
  });
});

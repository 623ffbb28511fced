import { describe, expect, it } from 'vitest';
import { clippedRuns } from '../../../core/analysis/clipped.ts';
import { qualityFlagCodes } from '../../../core/analysis/quality.ts';
import { type SummariseOptions, summarise } from '../../../core/analysis/summarise.ts';
import type { ComplexSweep, Sweep } from '../../../core/sweep.ts';
import {
  evenFrequencies,
  type ImpedanceOf,
  rounded,
  seriesCircuit,
  sweepOf,
  withNoise,
} from '../../support/make-sweep.ts';

const antenna = seriesCircuit(40, 12, 7.1e6);
const sound = sweepOf(antenna, evenFrequencies(6.6e6, 7.6e6, 201));

function codesOf(sweep: Sweep, options: SummariseOptions = {}): string[] {
  return summarise(sweep, options).quality.flags.map(({ code }) => code);
}

function scaled(sweep: ComplexSweep, factor: number): ComplexSweep {
  return {
    ...sweep,
    reflectionRe: sweep.reflectionRe.map((x) => x * factor),
    reflectionIm: sweep.reflectionIm.map((x) => x * factor),
  };
}

/** Magnitudes above a limit cut off, as an instrument without range does. */
function clipped(sweep: ComplexSweep, limit: number): Sweep {
  const { frequencyHz, referenceOhm, reflectionRe, reflectionIm } = sweep;
  const reflectionMagnitude = reflectionRe.map((re, i) =>
    Math.min(limit, Math.hypot(re, reflectionIm[i])),
  );
  return { phase: 'none', frequencyHz, referenceOhm, reflectionMagnitude };
}

function withMagnitudeOfReactance(sweep: ComplexSweep): ComplexSweep {
  return { ...sweep, reflectionIm: sweep.reflectionIm.map(Math.abs) };
}

const coarse = sweepOf(seriesCircuit(40, 200, 7.1e6), evenFrequencies(6.95e6, 7.26e6, 17));
const tail: ImpedanceOf = (f) => ({
  resistance: 40,
  reactance: 40 * 12 * (f / 7.1e6 - 7.1e6 / f) + (f > 7.25e6 ? 4000 * ((f - 7.25e6) / 1e6) : 0),
});

/** For each code: a sweep that has the flag, one that has not, and what the text tells to do. */
const cases: readonly {
  readonly code: (typeof qualityFlagCodes)[number];
  readonly has: () => string[];
  readonly hasNot: () => string[];
  readonly detail: () => string | undefined;
  readonly advice: RegExp;
}[] = [
  flagCase('passivity_broken', scaled(sound, 2), sound, /Repeat the calibration/),
  flagCase('coarse_grid', coarse, sound, /more points or a narrower span/),
  flagCase(
    'noisy',
    withNoise(sound, 0.05, 1),
    withNoise(sound, 0.002, 1),
    /Tighten the connectors/,
  ),
  flagCase(
    'sweep_too_narrow',
    sweepOf(antenna, evenFrequencies(6.6e6, 7e6, 101)),
    sound,
    /Sweep wider/,
  ),
  flagCase(
    'looks_open_or_short',
    sweepOf(() => ({ resistance: 0.1, reactance: 2 }), evenFrequencies(6e6, 8e6, 101)),
    sound,
    /antenna and its line are connected/,
  ),
  flagCase('values_clipped', clipped(sound, 0.5), clipped(sound, 2), /wider range/),
  flagCase('reactance_never_negative', withMagnitudeOfReactance(sound), sound, /sign is unknown/),
  flagCase(
    'bandwidth_disagrees',
    withNoise(sweepOf(tail, evenFrequencies(6.6e6, 7.6e6, 401)), 0.001, 1),
    withNoise(sound, 0.001, 1),
    /Rely on the measured span/,
  ),
];

function flagCase(
  code: (typeof qualityFlagCodes)[number],
  flawed: Sweep,
  fair: Sweep,
  advice: RegExp,
) {
  return {
    code,
    has: () => codesOf(flawed),
    hasNot: () => codesOf(fair),
    detail: () => summarise(flawed).quality.flags.find((flag) => flag.code === code)?.detail,
    advice,
  };
}

describe('a quality flag', () => {
  it.each(cases)('$code appears on a sweep that has the flaw', ({ code, has }) => {
    expect(has()).toContain(code);
  });

  it.each(cases)('$code does not appear on a sweep that has it not', ({ code, hasNot }) => {
    expect(hasNot()).not.toContain(code);
  });

  it.each(cases)('$code tells what to do', ({ detail, advice }) => {
    expect(detail()).toMatch(advice);
  });

  it('has a code of the closed list', () => {
    expect(qualityFlagCodes).toHaveLength(11);
    for (const { has } of cases) for (const code of has()) expect(qualityFlagCodes).toContain(code);
  });

  it('names the stretch it concerns', () => {
    const flags = summarise(clipped(sound, 0.5)).quality.flags;
    const ofClipping = flags.filter(({ code }) => code === 'values_clipped');
    expect(ofClipping).toHaveLength(2);
    expect(ofClipping[0].lowHz).toBe(6.6e6);
    expect(ofClipping[1].highHz).toBe(7.6e6);
  });
});

describe('a sound sweep', () => {
  it('has no flag at all', () => {
    expect(codesOf(sound)).toEqual([]);
    expect(codesOf(withNoise(sound, 0.002, 3))).toEqual([]);
  });

  it('of a nearly total reflection in the noise does not break passivity', () => {
    const open = withNoise(
      sweepOf(() => ({ resistance: 2, reactance: 300 }), evenFrequencies(6e6, 8e6, 201)),
      0.01,
      1,
    );
    expect(codesOf(open)).not.toContain('passivity_broken');
  });
});

describe('a file that was not read without assumptions', () => {
  const sorted = { code: 'points_sorted', detail: 'The points were put in order.' };
  const other = { code: 'unit_assumed', detail: 'Hertz were assumed.' };

  it('is flagged, and says where to read of them', () => {
    const { flags } = summarise(sound, { assumptions: [other, other] }).quality;
    expect(flags.map(({ code }) => code)).toEqual(['assumptions_made']);
    expect(flags[0].detail).toMatch(/2 assumptions were made.*`assumptions`/);
    expect(codesOf(sound)).not.toContain('assumptions_made');
  });

  it('is flagged apart where its frequencies were mended', () => {
    expect(codesOf(sound, { assumptions: [sorted] })).toEqual([
      'frequencies_mended',
      'assumptions_made',
    ]);
    const { flags } = summarise(sound, { assumptions: [sorted] }).quality;
    expect(flags[0].detail).toMatch(/one sweep and not two joined/);
    expect(codesOf(sound, { assumptions: [other] })).not.toContain('frequencies_mended');
  });

  it('passes the assumptions on', () => {
    expect(summarise(sound, { assumptions: [sorted] }).assumptions).toEqual([sorted]);
  });
});

describe('a stretch that stands still at the greatest value', () => {
  it('is clipped where a jump leads into it', () => {
    expect(clippedRuns(Float64Array.of(0.5, 0.51, 0.8, ...Array(8).fill(0.9)))).toEqual([
      { first: 3, last: 10 },
    ]);
  });

  it('is not where rounding alone makes its values equal', () => {
    const round = rounded(sweepOf(antenna, evenFrequencies(3e6, 6e6, 301)), 2);
    const magnitude = round.reflectionRe.map(
      (re, i) => Math.round(100 * Math.hypot(re, round.reflectionIm[i])) / 100,
    );
    expect(clippedRuns(magnitude)).toEqual([]);
  });

  it('is not where it is the whole sweep or short', () => {
    expect(clippedRuns(new Float64Array(20).fill(0.4))).toEqual([]);
    expect(clippedRuns(Float64Array.of(0.1, 0.2, 0.9, 0.9, 0.9, 0.9))).toEqual([]);
  });
});

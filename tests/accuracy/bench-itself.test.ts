import { beforeAll, describe, expect, it } from 'vitest';
import { Random } from '../support/random.ts';
import { type BenchScores, benchCase, runBench } from './bench.ts';
import { estimateLinearly } from './linear-estimator.ts';
import { reportOf } from './report.ts';
import { rms } from './statistics.ts';

const SEED = 11;

describe('a case of the bench', () => {
  it('is the same again from its seed and number', () => {
    const once = benchCase(SEED, 3, 'as_in_files');
    const again = benchCase(SEED, 3, 'as_in_files');
    expect(again.sweep.reflectionRe).toEqual(once.sweep.reflectionRe);
    expect(benchCase(SEED + 1, 3, 'as_in_files').sweep).not.toEqual(once.sweep);
  });

  it('holds at least five points of the SWR-2 span and 51 to 1601 in all', () => {
    for (let index = 0; index < 60; index++) {
      const { pointsInSpan, clean } = benchCase(SEED, index, 'exact');
      expect(pointsInSpan).toBeGreaterThanOrEqual(5);
      expect(clean.length).toBeGreaterThanOrEqual(51);
      expect(clean.length).toBeLessThanOrEqual(1601);
    }
  });

  it('differs from its closed form by the noise and rounding that it names', () => {
    for (let index = 0; index < 30; index++) {
      const { sweep, clean, sigma } = benchCase(SEED, index, 'as_in_files');
      const residuals = clean.flatMap(({ re, im }, i) => [
        sweep.reflectionRe[i] - re,
        sweep.reflectionIm[i] - im,
      ]);
      // Five standard deviations of the root mean square of 102 normal values, the fewest there are.
      expect(Math.abs(rms(residuals) / sigma - 1)).toBeLessThan(5 / Math.sqrt(2 * 102));
    }
  });
});

describe('the seeded normal numbers', () => {
  it('have the moments of a standard normal', () => {
    const random = new Random(5);
    const count = 40_000;
    const drawn = Array.from({ length: count }, () => random.gaussian());
    const moment = (power: number) => drawn.reduce((sum, value) => sum + value ** power, 0) / count;
    // Five standard errors each; variances of the moments 1, 2, 15 and 96 (moments of the normal).
    expect(Math.abs(moment(1))).toBeLessThan(5 * Math.sqrt(1 / count));
    expect(Math.abs(moment(2) - 1)).toBeLessThan(5 * Math.sqrt(2 / count));
    expect(Math.abs(moment(3))).toBeLessThan(5 * Math.sqrt(15 / count));
    expect(Math.abs(moment(4) - 3)).toBeLessThan(5 * Math.sqrt(96 / count));
  });
});

describe('the bench, given straight lines between points', () => {
  let scores: BenchScores;
  beforeAll(() => {
    scores = runBench({ seed: SEED, cases: 60 }, estimateLinearly);
  }, 300_000);

  it('finds them wanting in every figure that interpolation and averaging could better', () => {
    const report = reportOf(scores);
    for (const key of [
      'noise_free_resonance_error_steps',
      'noise_free_min_swr_error_steps',
      'resonance_rms_vs_model_fit',
      'min_swr_rms_vs_model_fit',
      'coverage_95',
      'resonance_invented',
      'verdict_wrong',
    ]) {
      expect(report[key], key).toMatchObject({ met: false });
    }
  });

  it('has a yardstick whose own errors are as large as it says they are', () => {
    const { detail } = reportOf(scores)['resonance_rms_vs_model_fit'];
    expect(detail['fit_rms_over_its_own_deviation']).toBeGreaterThan(0.75);
    expect(detail['fit_rms_over_its_own_deviation']).toBeLessThan(1.25);
  });
});

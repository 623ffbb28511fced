import { beforeAll, describe, expect, it } from 'vitest';
import { benchCase, runBench } from './bench.ts';
import { addFindings } from './crossings.ts';
import type { BenchReport } from './figure.ts';
import { reportOf } from './report.ts';
import { scoreCase } from './scores.ts';
import { summaryEstimator } from './summary-estimator.ts';

/**
 * A short run of the accuracy bench with a fixed seed. The limits are loose beside those of the full
 * run, since sixty cases cannot show one part in ten thousand, and tight enough to fail where
 * a refinement, a half-width or the treatment of noise is lost.
 */
describe('a summary of sixty random antennas', () => {
  let report: BenchReport;
  beforeAll(() => {
    report = reportOf(runBench({ seed: 3, cases: 60 }, summaryEstimator));
  }, 300_000);

  const figureOf = (key: string, part?: string): number => {
    const { value } = report[key];
    if (typeof value === 'number') return value;
    return part === undefined ? Number.NaN : value[part];
  };

  it('places resonances without noise far below the step', () => {
    expect(figureOf('noise_free_resonance_error_steps', 'median')).toBeLessThan(0.001);
    expect(figureOf('noise_free_resonance_error_steps', 'p99')).toBeLessThan(0.02);
  });

  it('places the SWR minimum without noise far below the step', () => {
    expect(figureOf('noise_free_min_swr_error_steps')).toBeLessThan(0.02);
  });

  it('comes near to a fit that knows the form of the antenna', () => {
    expect(figureOf('resonance_rms_vs_model_fit')).toBeLessThan(2);
    expect(figureOf('min_swr_rms_vs_model_fit')).toBeLessThan(2);
  });

  it.each(['resonance', 'min_swr_frequency', 'min_swr', 'span_edge'])(
    'states half-widths that hold the true %s about as often as they promise',
    (quantity) => {
      expect(figureOf('coverage_95', quantity)).toBeGreaterThan(0.89);
      const { detail } = report['coverage_95'];
      expect(detail[quantity]).toHaveProperty('median_half_width_over_rms_error');
    },
  );

  it('neither misses a clear resonance nor makes one up', () => {
    const { clear, missed } = report['resonance_missed'].detail;
    expect(clear).toBeGreaterThan(60);
    expect(missed).toBe(0);
    expect(report['resonance_invented'].detail['invented']).toBe(0);
  });

  it('calls no band usable that is not, beyond the stated half-width', () => {
    expect(figureOf('verdict_wrong')).toBe(0);
  });
});

describe('noise-free sweeps of short loaded dipoles and of antennas at the end of a line', () => {
  it('keep every one of their resonances, also those that lie close together', () => {
    const indices = [69, 137, 142, 179, 284, 287, 309, 339, 364, 397, 434, 499];
    const findings = indices.map((index) => {
      const bench = benchCase(33, index, 'exact');
      return scoreCase(bench, summaryEstimator(bench.sweep), null).resonances;
    });
    const sum = findings.reduce(addFindings);
    expect(sum.clear).toBeGreaterThan(24);
    expect(sum).toMatchObject({ missed: 0, invented: 0, hedged: 0 });
  }, 300_000);
});

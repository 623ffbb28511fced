import { beforeAll, describe, expect, it } from 'vitest';
import { driftBench } from './drift-bench.ts';
import type { BenchReport } from './figure.ts';

/** A short form of the bench on a seed that nothing was tuned on. */
describe('four simulated stations over ten years', () => {
  let report: BenchReport;
  beforeAll(() => {
    report = driftBench({ seed: 4, stations: 4 });
  }, 300_000);

  it('have few false alarms', () => {
    const { value, detail } = report['drift_false_alarms_per_antenna_year'];
    expect(detail['antenna_years']).toBe(160);
    expect(value).toBeLessThan(0.08);
  });

  it('have nearly all their faults found in three tests, and named right', () => {
    expect(report['fault_found_within_3_tests'].value).toBeGreaterThan(0.8);
    expect(report['fault_named_right'].value).toBeGreaterThan(0.8);
  });
});

import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { normalCdf } from '../../core/record/statistics/distributions.ts';
import { mannKendall } from '../../core/record/statistics/mann-kendall.ts';
import { theilSen } from '../../core/record/statistics/theil-sen.ts';
import { Random } from '../support/random.ts';

const python = '/usr/bin/python3';
const script = fileURLToPath(new URL('trend_scipy.py', import.meta.url));
const installed = spawnSync(python, ['-c', 'import scipy']).status === 0;

interface Answer {
  readonly slope: number;
  readonly low: number;
  readonly high: number;
  readonly tau: number;
  readonly p: number;
  readonly exact: boolean;
}

/** Series of 6 to 60 values in the order of time; every third has ties. */
function randomSeries() {
  const random = new Random(77);
  return Array.from({ length: 1000 }, (_, i) => {
    const count = random.integer(6, 60);
    const trend = random.uniform(-0.1, 0.1);
    let time = 0;
    const x = Array.from({ length: count }, () => {
      time += random.uniform(0.1, 2);
      return time;
    });
    const y = x.map((at) => {
      const value = trend * at + random.gaussian();
      return i % 3 === 0 ? Math.round(2 * value) / 2 : value;
    });
    return { x, y };
  });
}

/** The general-purpose library SciPy, scipy.stats; not installed everywhere. */
describe.skipIf(!installed)(
  '1000 random series in SciPy (left out where it is not installed)',
  () => {
    const series = randomSeries();
    const run = spawnSync(python, [script], {
      input: JSON.stringify(series),
      encoding: 'utf8',
      maxBuffer: 1e8,
    });
    const answers: readonly Answer[] = installed ? JSON.parse(run.stdout) : [];

    it('have the same Theil–Sen slopes and limits', () => {
      expect(answers).toHaveLength(1000);
      answers.forEach(({ slope, low, high }, i) => {
        const trend = theilSen(series[i].x, series[i].y);
        expect(trend?.slope).toBeCloseTo(slope, 10);
        expect(trend?.slopeLow).toBeCloseTo(low, 10);
        expect(trend?.slopeHigh).toBeCloseTo(high, 10);
      });
    });

    it('have the same probabilities by Mann–Kendall', () => {
      expect(answers.filter(({ exact }) => exact).length).toBeGreaterThan(30);
      answers.forEach(({ p, exact, tau }, i) => {
        const { s, z, probability } = mannKendall(series[i].y);
        expect(Math.sign(s)).toBe(Math.sign(tau));
        if (exact) {
          expect(probability).toBeCloseTo(p, 10);
          return;
        }
        // SciPy makes no correction for continuity: S instead of S less its sign.
        const uncorrected = s === 0 ? 0 : (z * s) / (s - Math.sign(s));
        // Where |S| is 1 the corrected score is 0 and cannot be undone.
        if (Math.abs(s) > 1) expect(2 * normalCdf(-Math.abs(uncorrected))).toBeCloseTo(p, 9);
      });
    });
  },
);

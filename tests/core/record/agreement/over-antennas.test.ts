import { describe, expect, it } from 'vitest';
import { biasesOverAntennas } from '../../../../core/record/agreement/over-antennas.ts';
import type { DriftSweep } from '../../../../core/record/drift/drift-series.ts';
import { Random } from '../../../support/random.ts';

const monthMs = 30 * 24 * 3600 * 1000;

/** Five antennas, each measured every second month by one instrument in turn. */
function apart(biases: Readonly<Record<string, number>>) {
  const random = new Random(21);
  const ids = Object.keys(biases);
  return [1.9e6, 3.6e6, 7.1e6, 14.1e6, 28.4e6].map((hz, antenna) =>
    Array.from({ length: 9 }, (_, i): DriftSweep => {
      const analyzerId = ids[(i + antenna) % ids.length];
      const log = biases[analyzerId] + 0.0005 * random.gaussian();
      return {
        sweepId: `${antenna} ${i}`,
        measuredAtMs: 2 * i * monthMs,
        analyzerId,
        wetness: 'dry',
        eraIndex: 0,
        resonant: true,
        values: { resonance_hz: { value: hz * Math.exp(log), u95: null } },
      };
    }),
  );
}

describe('instruments that never met, on five antennas', () => {
  it('show which of them is off, and by how much', () => {
    const biases = biasesOverAntennas(apart({ a: 0, b: 0, off: 0.004 }), 'resonance_hz');
    expect(biases.map(({ off }) => off)).toEqual([false, false, true]);
    expect(biases[2].bias).toBeCloseTo(0.004, 3);
    expect(biases[2].low).toBeLessThan(0.004);
    expect(biases[2].measurements).toBe(15);
  });

  it('are all sound where they differ by chance only', () => {
    const biases = biasesOverAntennas(apart({ a: 0, b: 0.0004, c: -0.0004 }), 'resonance_hz');
    expect(biases.map(({ off }) => off)).toEqual([false, false, false]);
  });

  it('are not judged where there are two: nobody knows which is off', () => {
    expect(biasesOverAntennas(apart({ a: 0, b: 0.01 }), 'resonance_hz')).toEqual([]);
  });
});

import { describe, expect, it } from 'vitest';
import { agreementOf } from '../../../../core/record/agreement/agreement.ts';
import type { DriftSweep } from '../../../../core/record/drift/drift-series.ts';
import { Random } from '../../../support/random.ts';

const dayMs = 24 * 3600 * 1000;

/** Each antenna is measured by all instruments in one afternoon, once a month. */
function meetings(biases: Readonly<Record<string, number>>, scatter = 0.0002) {
  const random = new Random(12);
  return [3.6e6, 14.1e6, 28.4e6].map((hz) =>
    Array.from({ length: 6 }, (_, month) =>
      Object.entries(biases).map(
        ([analyzerId, bias], hour): DriftSweep => ({
          sweepId: `${hz} ${month} ${analyzerId}`,
          measuredAtMs: month * 30 * dayMs + (hour * dayMs) / 24,
          analyzerId,
          wetness: 'dry',
          eraIndex: 0,
          resonant: true,
          values: {
            resonance_hz: {
              // The antenna itself moves from month to month: that is no matter of instruments.
              value: hz * (1 + 0.002 * month) * Math.exp(bias + scatter * random.gaussian()),
              u95: 100,
            },
          },
        }),
      ),
    ).flat(),
  );
}

describe('four instruments of which one shows frequencies 0.4 % too high', () => {
  const agreement = agreementOf(meetings({ a: 0, b: 0, c: 0, off: 0.004 }), 'resonance_hz');

  it('are compared on each occasion on which they met', () => {
    expect(agreement?.occasions).toBe(18);
    expect(agreement?.instruments.map(({ measurements }) => measurements)).toEqual([
      18, 18, 18, 18,
    ]);
  });

  it('differ by the bias that was put in, within its interval', () => {
    // Biases are told from the mean of all four: 0.004 less 0.001.
    const off = agreement?.instruments[3];
    expect(off?.low).toBeLessThan(0.003);
    expect(off?.high).toBeGreaterThan(0.003);
    expect(off?.bias).toBeCloseTo(0.003, 3);
  });

  it('are worth a correction for that one only', () => {
    const worth = agreement?.instruments.map(({ correctionWorth }) => correctionWorth);
    expect(worth).toEqual([false, false, false, true]);
  });

  it('repeat as well as they scatter, and reproduce as badly as they differ', () => {
    expect(agreement?.precision?.repeatability).toBeGreaterThan(0.00014);
    expect(agreement?.precision?.repeatability).toBeLessThan(0.00026);
    // Standard deviation of 0, 0, 0, 0.004.
    expect(agreement?.precision?.reproducibility).toBeCloseTo(0.002, 4);
  });

  it('have an outlier by Grubbs, and none by Cochran', () => {
    expect(agreement?.grubbs).toMatchObject({ verdict: 'outlier', index: 3 });
    expect(agreement?.cochran?.verdict).toBe('none');
  });
});

describe('instruments that never met', () => {
  it('are not compared', () => {
    const apart = meetings({ a: 0, b: 0 }).map((sweeps) =>
      sweeps.map((sweep, i) => ({ ...sweep, measuredAtMs: i * 3 * dayMs })),
    );
    expect(agreementOf(apart, 'resonance_hz')).toBeNull();
  });

  it('are not compared across weather or work', () => {
    const other = meetings({ a: 0, b: 0 }).map((sweeps) =>
      sweeps.map((sweep, i) => ({ ...sweep, eraIndex: i % 2 })),
    );
    expect(agreementOf(other, 'resonance_hz')).toBeNull();
  });
});

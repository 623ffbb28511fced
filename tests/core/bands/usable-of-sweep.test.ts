import { describe, expect, it } from 'vitest';
import { swrCurve } from '../../../core/analysis/refined-swr.ts';
import { usableBands } from '../../../core/bands/usable.ts';
import { makeSweep } from '../../../core/sweep.ts';
import { reflectionOf, seriesResonator } from '../../../server/demo/models/lumped.ts';
import { knownPlan } from './known-plan.ts';

interface Range {
  readonly lowHz: number;
  readonly highHz: number;
}

/** The refined curve of a sweep of a series resonator of 50 ohm and Q 10 at 7.1 MHz. */
function resonatorCurve({ lowHz, highHz }: Range, points = 201) {
  const frequencyHz = Float64Array.from(
    { length: points },
    (_, i) => lowHz + ((highHz - lowHz) * i) / Math.max(1, points - 1),
  );
  const circuit = { resistanceOhm: 50, resonanceHz: 7_100_000, q: 10 };
  const reflection = Array.from(frequencyHz, (hz) =>
    reflectionOf(seriesResonator(hz, circuit), 50),
  );
  const reflectionRe = Float64Array.from(reflection, ({ re }) => re);
  const reflectionIm = Float64Array.from(reflection, ({ im }) => im);
  const sweep = makeSweep({
    phase: 'signed',
    frequencyHz,
    reflectionRe,
    reflectionIm,
    referenceOhm: 50,
  });
  if (!sweep.ok) throw new Error(sweep.error.detail);
  return swrCurve(sweep.value);
}

const wide = { lowHz: 6_500_000, highHz: 7_700_000 };

describe('the 40 m band by the sweep of a series resonator', () => {
  // SWR edges of a series circuit, |X| = k R Q: at 2:1 with R = 50 and Q = 10, 6.85341320683 and
  // 7.35545902147 MHz (exact; H. F. Pues, A. R. Van de Capelle, IEEE Trans. AP-37, 1989).
  it('is usable at 2:1, whose edges lie outside the band', () => {
    const { bands } = usableBands(resonatorCurve(wide), knownPlan('itu-r2'), { maxSwr: 2 });
    expect(bands).toHaveLength(1);
    expect(bands[0]).toMatchObject({ band: '40m', verdict: 'usable', usableFraction: 1 });
    expect(bands[0].minimumSwr).toBeCloseTo(1, 6);
    expect(Math.abs((bands[0].minimumSwrHz ?? 0) - 7_100_000)).toBeLessThan(100);
  });

  // At 1.5:1, k = (s - 1)/(Q sqrt s) = 0.0408248290464: 6.9565508695 and 7.24640715574 MHz.
  it('is partly usable at 1.5:1, up to the upper edge', () => {
    const { bands } = usableBands(resonatorCurve(wide), knownPlan('itu-r2'), { maxSwr: 1.5 });
    const upperHz = 7_100_000 * 1.02062072616;
    expect(bands[0].verdict).toBe('partly_usable');
    expect(bands[0].spans).toHaveLength(1);
    expect(bands[0].spans[0].lowHz).toBe(7_000_000);
    expect(Math.abs(bands[0].spans[0].highHz - upperHz)).toBeLessThan(20);
    expect(bands[0].usableFraction).toBeCloseTo((upperHz - 7_000_000) / 300_000, 4);
    expect(bands[0].worstSwrHz).toBe(7_300_000);
  });

  it('is partly swept where the sweep ends inside it', () => {
    const curve = resonatorCurve({ lowHz: 6_900_000, highHz: 7_150_000 });
    const { bands } = usableBands(curve, knownPlan('itu-r2'), { maxSwr: 2 });
    expect(bands[0]).toMatchObject({ verdict: 'partly_swept', sweptFraction: 0.5 });
    expect(bands[0].spans).toEqual([{ lowHz: 7_000_000, highHz: 7_150_000 }]);
  });

  it('is partly swept by a sweep of one point', () => {
    const curve = resonatorCurve({ lowHz: 7_100_000, highHz: 7_100_000 }, 1);
    const { bands } = usableBands(curve, knownPlan('itu-r2'), { maxSwr: 2 });
    expect(bands[0]).toMatchObject({ verdict: 'partly_swept', sweptFraction: 0, spans: [] });
    expect(bands[0].worstSwr).toBeCloseTo(1, 12);
  });
});

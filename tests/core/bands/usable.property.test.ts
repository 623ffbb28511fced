import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { listPlans } from '../../../core/bands/plans.ts';
import { usableBands } from '../../../core/bands/usable.ts';
import type { RangeUse } from '../../../core/bands/usable-report.ts';
import { swrPolyline } from './swr-polyline.ts';

const knots = fc
  .uniqueArray(
    fc.tuple(
      fc.integer({ min: 1_700_000, max: 60_000_000 }),
      fc.double({ min: 1, max: 9, noNaN: true }),
    ),
    { minLength: 1, maxLength: 30, selector: ([hz]) => hz },
  )
  .map((points) => points.toSorted((a, b) => a[0] - b[0]));
const plan = fc.constantFrom(...listPlans());
const maxSwr = fc.double({ min: 1.05, max: 8, noNaN: true });

function claimsHold(use: RangeUse): boolean {
  const { verdict, sweptFraction: swept, usableFraction: usable } = use;
  switch (verdict) {
    case 'usable':
      return swept === 1 && usable === 1;
    case 'partly_usable':
      return usable > 0 && usable < 1 && usable < swept;
    case 'not_usable':
      return usable === 0 && (swept === 1 || use.permission === 'national');
    case 'partly_swept':
      return swept < 1 && (usable === 0 || usable === swept);
    case 'not_swept':
      return swept === 0 && use.worstSwr === null;
  }
}

describe('a usable-band report of any curve against any plan', () => {
  it('never counts what was not swept, and no verdict claims more than its fractions', () => {
    fc.assert(
      fc.property(knots, plan, maxSwr, (points, judgedBy, limit) => {
        const { bands } = usableBands(swrPolyline(points), judgedBy, { maxSwr: limit });
        for (const use of bands.flatMap((band) => [band, ...band.segments])) {
          expect(use.usableFraction).toBeLessThanOrEqual(use.sweptFraction);
          expect(claimsHold(use), JSON.stringify(use)).toBe(true);
        }
      }),
    );
  });

  it('finds no less usable at a higher limit', () => {
    fc.assert(
      fc.property(knots, plan, maxSwr, maxSwr, (points, judgedBy, one, other) => {
        const at = (limit: number) =>
          usableBands(swrPolyline(points), judgedBy, { maxSwr: limit }).bands;
        const strict = at(Math.min(one, other));
        const lax = at(Math.max(one, other));
        expect(lax.map(({ band }) => band)).toEqual(strict.map(({ band }) => band));
        lax.forEach((use, i) => {
          expect(use.usableFraction).toBeGreaterThanOrEqual(strict[i].usableFraction - 1e-12);
        });
      }),
    );
  });

  it('keeps spans inside the sweep, within a hertz, and inside what is permitted', () => {
    fc.assert(
      fc.property(knots, plan, maxSwr, (points, judgedBy, limit) => {
        const curve = swrPolyline(points);
        for (const { spans, ranges } of usableBands(curve, judgedBy, { maxSwr: limit }).bands) {
          for (const span of spans) {
            expect(span.lowHz).toBeGreaterThanOrEqual(curve.lowHz - 1);
            expect(span.highHz).toBeLessThanOrEqual(curve.highHz + 1);
            const home = ranges.find(
              ({ lowHz, highHz }) => lowHz <= span.lowHz && span.highHz <= highHz,
            );
            expect(home).toBeDefined();
          }
        }
      }),
    );
  });
});

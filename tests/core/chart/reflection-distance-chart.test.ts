import { describe, expect, it } from 'vitest';
import { reflectionDistanceChart } from '../../../core/chart/reflection-distance-chart.ts';
import { heightAt, linearReader, markPlace, pathPoints } from '../../support/read-chart.ts';
import { plainStyle } from '../../support/sweep-chart.ts';

/** A fault of a tenth at 6 m, the open end at 20 m, and nothing else above a thousandth. */
const magnitude = Array.from(
  { length: 601 },
  (_, i) =>
    0.001 + 0.099 * Math.exp(-(((i - 120) / 20) ** 2)) + 0.949 * Math.exp(-(((i - 400) / 20) ** 2)),
);
const chart = {
  heading: { title: 'A line', subtitle: 'invented', tableUrl: null },
  stepM: 0.05,
  magnitude,
  velocityFactor: 0.66,
  reflectionFloor: 0.003,
  places: [
    { distanceM: 6, distanceU95M: 0.1, magnitude: 0.1, kind: 'on_line' },
    { distanceM: 20, distanceU95M: 0.2, magnitude: 0.95, kind: 'end' },
  ],
} as const;

describe('a chart of reflection against distance', () => {
  const svg = reflectionDistanceChart(chart, plainStyle);
  const metres = linearReader(svg, 'axis-x');
  const decibels = linearReader(svg, 'axis-y');

  it('has every step above its foot within half a pixel, in decibels', () => {
    const points = pathPoints(svg, 'reflection');
    const xOf = (m: number) => (m - metres(0)) / (metres(1) - metres(0));
    let compared = 0;
    for (let i = 1; i < magnitude.length; i++) {
      // 20 log10 of the magnitude: any handbook, return loss.
      const db = 20 * Math.log10(magnitude[i]);
      const drawn = decibels(heightAt(points, xOf(i * 0.05)));
      if (db < decibels(plainStyle.heightPx - 48)) continue;
      expect(Math.abs(drawn - db)).toBeLessThan(Math.abs(decibels(1) - decibels(0)) / 2);
      compared += 1;
    }
    expect(compared).toBeGreaterThan(25);
  });

  it('marks a fault and the end at their distances, with different marks', () => {
    expect(metres(markPlace(svg, 'place on_line').x)).toBeCloseTo(6, 1);
    expect(decibels(markPlace(svg, 'place on_line').y)).toBeCloseTo(-20, 0);
    expect(metres(markPlace(svg, 'place end').x)).toBeCloseTo(20, 1);
    expect(svg).toContain('reflection 6.00 m');
    expect(svg).toContain('end 20.00 m');
  });

  it('says in words what it shows, and that nothing was found where nothing was', () => {
    expect(svg).toContain('end at 20.00 m (± 0.2 m), −0.4 dB.');
    expect(reflectionDistanceChart({ ...chart, places: [] }, plainStyle)).toContain(
      'Nothing stands out from the floor.',
    );
  });

  it('stands on a trace of one step', () => {
    const one = reflectionDistanceChart({ ...chart, magnitude: [0.5], places: [] }, plainStyle);
    expect(one).toContain('Distance (m)');
    expect(one).not.toContain('NaN');
  });
});

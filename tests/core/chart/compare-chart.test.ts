import { describe, expect, it } from 'vitest';
import { compareChart } from '../../../core/chart/compare-chart.ts';
import { sweepSwr } from '../../../core/network/swr.ts';
import { evenFrequencies, seriesCircuit, sweepOf } from '../../support/make-sweep.ts';
import {
  axisTicks,
  heightAt,
  linearReader,
  markPlace,
  partOf,
  pathPoints,
} from '../../support/read-chart.ts';
import { plainStyle } from '../../support/sweep-chart.ts';

const before = sweepOf(seriesCircuit(40, 12, 14.1e6), evenFrequencies(13.5e6, 15e6, 301));
const after = sweepOf(seriesCircuit(60, 12, 14.3e6), evenFrequencies(13.8e6, 14.8e6, 201));
const change = (first: number, second: number) => ({
  first,
  second,
  difference: second - first,
  u95: 0,
  verdict: 'changed' as const,
});
const chart = {
  heading: { title: 'A dipole', subtitle: 'two sweeps', tableUrl: null },
  first: { name: 'before', sweep: before },
  second: { name: 'after', sweep: after },
  referenceOhm: 50,
  comparison: {
    obstacles: [],
    verdict: 'changed' as const,
    bands: [
      {
        band: '20m',
        resonances: [],
        onlyFirstHz: [],
        onlySecondHz: [],
        minimumHz: change(14.1e6, 14.3e6),
        // At zero reactance SWR is 50/40 and 60/50 (any handbook).
        minimumSwr: change(1.25, 1.2),
        spanLowHz: null,
        spanHighHz: null,
        spanWidthHz: null,
        verdict: 'changed' as const,
      },
    ],
  },
};

describe('a chart of two sweeps', () => {
  const svg = compareChart(chart, plainStyle);

  it('has both within half a pixel on one axis, over all that either swept', () => {
    const mhz = linearReader(svg, 'axis-x');
    const ticks = axisTicks(svg, 'axis-y');
    const place = (text: string) => ticks.find((tick) => tick.text === text)?.at ?? Number.NaN;
    const sides = [
      ['first', before],
      ['second', after],
    ] as const;
    for (const [name, sweep] of sides) {
      const points = pathPoints(svg, name);
      const swr = sweepSwr(sweep);
      let worst = 0;
      sweep.frequencyHz.forEach((f, i) => {
        const x = (f / 1e6 - mhz(0)) / (mhz(1) - mhz(0));
        // |reflection| = (SWR - 1)/(SWR + 1), on which the axis is linear.
        const wanted = place('1') - ((swr[i] - 1) / (swr[i] + 1)) * (place('1') - place('∞'));
        if (x < points[0].x || x > points[points.length - 1].x) return;
        worst = Math.max(worst, Math.abs(heightAt(points, x) - wanted));
      });
      expect(points.length).toBeGreaterThan(5);
      expect(worst).toBeLessThan(0.5);
    }
    expect(mhz(pathPoints(svg, 'first')[0].x)).toBeCloseTo(13.5, 2);
    expect(mhz(pathPoints(svg, 'second')[0].x)).toBeCloseTo(13.8, 2);
  });

  it('tells the two apart without colour, and by name', () => {
    expect(partOf(svg, 'first')).toContain('stroke-dasharray');
    expect(partOf(svg, 'second')).not.toContain('stroke-dasharray');
    expect(partOf(svg, 'legend')).toMatch(/>before<.*>after</);
  });

  it('marks least SWR where it was', () => {
    const mhz = linearReader(svg, 'axis-x');
    expect(mhz(markPlace(svg, 'marks').x)).toBeCloseTo(14.1, 2);
    expect(svg).toContain('least SWR 1.25 at 14.100 MHz, then 1.20 at 14.300 MHz');
  });

  it('of sweeps that cannot be compared says why, and draws neither', () => {
    const detail = 'They are of different antennas.';
    const refused = compareChart(
      {
        ...chart,
        comparison: {
          obstacles: [{ code: 'antennas_differ', detail }],
          verdict: 'cannot_tell',
          bands: [],
        },
      },
      plainStyle,
    );
    expect(refused).not.toContain('class="first"');
    expect(partOf(refused, 'obstacles')).toContain(detail);
  });
});

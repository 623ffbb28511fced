import { describe, expect, it } from 'vitest';
import { type HistoryPoint, historyChart } from '../../../core/chart/history-chart.ts';
import { axisTicks, linearReader, partOf } from '../../support/read-chart.ts';
import { plainStyle } from '../../support/sweep-chart.ts';

const pointAt = (day: string, mhz: number, rest: Partial<HistoryPoint> = {}): HistoryPoint => ({
  atMs: Date.parse(`${day}T12:00:00Z`),
  value: mhz * 1e6,
  u95: 4000,
  weather: 'dry',
  eraIndex: 0,
  ...rest,
});

const points = [
  pointAt('2025-03-01', 14.1),
  pointAt('2025-06-01', 14.11, { weather: 'rain' }),
  pointAt('2025-09-01', 14.2, { eraIndex: 1, weather: 'snow_or_ice' }),
  pointAt('2025-12-01', 14.21, { eraIndex: 1, u95: null, weather: 'unknown' }),
];
const chart = {
  heading: { title: 'A dipole', subtitle: '20m', tableUrl: null },
  measure: 'Resonance (MHz)',
  unit: 1e6,
  series: [{ name: 'series resonance', points }],
  eras: [{ atMs: Date.parse('2025-07-15T00:00:00Z'), name: 'trimmed' }],
  note: null,
};
const svg = historyChart(chart, plainStyle);

/** From pixels back to milliseconds by the first and last date of the axis. */
function dateReader(drawn: string): (x: number) => number {
  const ticks = axisTicks(drawn, 'axis-x');
  const [first, last] = [ticks[0], ticks[ticks.length - 1]];
  const from = Date.parse(first.text);
  const perPx = (Date.parse(last.text) - from) / (last.at - first.at);
  return (x) => from + (x - first.at) * perPx;
}

const linePoints = () => {
  const d = / d="([^"]*)"/.exec(partOf(svg, 'series'))?.[1] ?? '';
  return [...d.matchAll(/([ML])([\d.]+) ([\d.]+)/g)].map(([, step, x, y]) => ({
    step,
    x: Number(x),
    y: Number(y),
  }));
};

describe('a chart of a measure over time', () => {
  it('has every sweep at its date and value within half a pixel', () => {
    const ms = dateReader(svg);
    const mhz = linearReader(svg, 'axis-y');
    const drawn = linePoints();
    expect(drawn).toHaveLength(points.length);
    drawn.forEach(({ x, y }, i) => {
      expect(Math.abs(ms(x) - points[i].atMs)).toBeLessThan((ms(1) - ms(0)) / 2);
      expect(Math.abs(mhz(y) * 1e6 - points[i].value)).toBeLessThan((mhz(0) - mhz(1)) * 5e5);
    });
  });

  it('joins the sweeps of an era and never across work on the antenna', () => {
    expect(linePoints().map(({ step }) => step)).toEqual(['M', 'L', 'M', 'L']);
    expect(partOf(svg, 'eras')).toContain('trimmed');
    const x = Number(/x1="([\d.]+)"/.exec(partOf(svg, 'eras'))?.[1]);
    expect(Math.abs(dateReader(svg)(x) - chart.eras[0].atMs)).toBeLessThan(86_400_000);
  });

  it('draws half-widths to scale, and none where there is none', () => {
    const mhz = linearReader(svg, 'axis-y');
    const bars = [...partOf(svg, 'bars').matchAll(/M[\d.]+ ([\d.]+)V([\d.]+)/g)];
    expect(bars).toHaveLength(3);
    for (const [, top, bottom] of bars) {
      expect(mhz(Number(top)) - mhz(Number(bottom))).toBeCloseTo(0.008, 3);
    }
  });

  it('tells the weather by shape, and names the shapes that are there', () => {
    const marks = partOf(svg, 'marks').match(/<(circle|path)/g);
    expect(marks).toEqual(['<circle', '<circle', '<path', '<path']);
    const legend = partOf(svg, 'legend');
    for (const name of ['dry', 'rain', 'snow or ice', 'weather not told']) {
      expect(legend).toContain(`>${name}<`);
    }
    expect(legend).not.toContain('wet after rain');
  });

  it('says its ends in words', () => {
    expect(svg).toContain('first 14.1 ± 0.004 on 2025-03-01 (dry)');
    expect(svg).toContain('2025-07-15: trimmed.');
  });

  it('keeps its values apart when one half-width is huge', () => {
    const wide = points.map((point, i) => (i === 1 ? { ...point, u95: 1e9 } : point));
    const drawn = historyChart({ ...chart, series: [{ name: 'a', points: wide }] }, plainStyle);
    const ticks = axisTicks(drawn, 'axis-y').map(({ text }) => Number(text));
    expect(ticks[ticks.length - 1] - ticks[0]).toBeLessThan(1);
  });

  it('of nothing, or of one sweep, is still a chart', () => {
    const none = historyChart({ ...chart, series: [{ name: 'a', points: [] }] }, plainStyle);
    expect(none).toContain('Nothing was measured of this.');
    const one = historyChart(
      { ...chart, series: [{ name: 'a', points: points.slice(0, 1) }] },
      plainStyle,
    );
    expect(none + one).not.toMatch(/NaN|Infinity/);
  });
});

import { describe, expect, it } from 'vitest';
import { impedanceChart } from '../../../core/chart/impedance-chart.ts';
import { themeNames } from '../../../core/chart/palettes.ts';
import { smithChart } from '../../../core/chart/smith-chart.ts';
import { swrChart } from '../../../core/chart/swr-chart.ts';
import { sweepImpedances } from '../../../core/network/impedance.ts';
import { sweepSwr } from '../../../core/network/swr.ts';
import type { ComplexSweep } from '../../../core/sweep.ts';
import {
  evenFrequencies,
  magnitudeOnly,
  parallelCircuit,
  seriesCircuit,
  sweepOf,
  withNoise,
  withoutSign,
} from '../../support/make-sweep.ts';
import {
  axisTicks,
  heightAt,
  linearReader,
  markPlace,
  numberIn,
  partOf,
  pathPoints,
} from '../../support/read-chart.ts';
import { chartOf, plainStyle } from '../../support/sweep-chart.ts';

const dipole = sweepOf(seriesCircuit(38, 12, 14.15e6), evenFrequencies(13.5e6, 15e6, 301));
const noisy = withNoise(dipole, 0.01, 7);

/** From pixels back to SWR by the ticks 1 and ∞, between which |reflection| runs evenly. */
function swrReader(svg: string): (y: number) => number {
  const ticks = axisTicks(svg, 'axis-y');
  const place = (text: string) => ticks.find((tick) => tick.text === text)?.at ?? Number.NaN;
  return (y) => {
    const magnitude = (place('1') - y) / (place('1') - place('∞'));
    return (1 + magnitude) / (1 - magnitude);
  };
}

/** The same the other way round, in pixels. */
function swrPlace(svg: string, swr: number): number {
  const ticks = axisTicks(svg, 'axis-y');
  const place = (text: string) => ticks.find((tick) => tick.text === text)?.at ?? Number.NaN;
  // |reflection| = (SWR - 1)/(SWR + 1): any handbook.
  return place('1') - ((swr - 1) / (swr + 1)) * (place('1') - place('∞'));
}

function expectWithinHalfAPixel(
  svg: string,
  path: string,
  { frequencyHz }: ComplexSweep,
  placeOf: (i: number) => number,
): void {
  const mhz = linearReader(svg, 'axis-x');
  const points = pathPoints(svg, path);
  const perPx = mhz(1) - mhz(0);
  let worst = 0;
  frequencyHz.forEach((f, i) => {
    const x = (f / 1e6 - mhz(0)) / perPx;
    if (x < points[0].x || x > points[points.length - 1].x) return;
    worst = Math.max(worst, Math.abs(heightAt(points, x) - placeOf(i)));
  });
  expect(points.length).toBeGreaterThan(5);
  expect(worst).toBeLessThan(0.5);
}

describe('a chart of SWR', () => {
  const svg = swrChart(chartOf(noisy), plainStyle);

  it('has every point of the sweep within half a pixel', () => {
    const swr = sweepSwr(noisy);
    expectWithinHalfAPixel(svg, 'swr', noisy, (i) => swrPlace(svg, swr[i]));
  });

  it('has ticks where their SWR is', () => {
    const ticks = axisTicks(svg, 'axis-y');
    expect(ticks.map(({ text }) => text)).toEqual(['1', '1.2', '1.5', '2', '3', '5', '10', '∞']);
    const read = swrReader(svg);
    for (const { text, at } of ticks.slice(0, -1)) {
      expect(read(at)).toBeCloseTo(numberIn(text), 1);
    }
  });

  it('gives SWR 1 to 3 half of its height', () => {
    expect(swrPlace(svg, 1) - swrPlace(svg, 3)).toBeCloseTo(
      (swrPlace(svg, 1) - swrPlace(svg, Number.MAX_VALUE)) / 2,
      6,
    );
  });

  it('marks least SWR and resonance as two things, each at its own frequency', () => {
    // A load whose resistance grows with frequency: SWR is least above the resonance.
    const skewed = sweepOf((f) => {
      const { reactance } = seriesCircuit(30, 10, 14.1e6)(f);
      return { resistance: 30 + 60 * (f / 14.1e6 - 1) * 4, reactance };
    }, dipole.frequencyHz);
    const chart = chartOf(skewed);
    const drawn = swrChart(chart, plainStyle);
    const mhz = linearReader(drawn, 'axis-x');
    const { minimumSwr, resonances } = chart.summary;
    const perHalfPixel = (mhz(1) - mhz(0)) / 2;
    const off = (name: string, hz: number) => Math.abs(mhz(markPlace(drawn, name).x) - hz / 1e6);
    expect(off('minimum', minimumSwr?.frequencyHz ?? 0)).toBeLessThan(perHalfPixel);
    expect(off('resonance', resonances[0].frequencyHz)).toBeLessThan(perHalfPixel);
    expect(markPlace(drawn, 'minimum').x).not.toBeCloseTo(markPlace(drawn, 'resonance').x, 0);
    expect(partOf(drawn, 'minimum')).toContain('<circle');
    expect(partOf(drawn, 'resonance')).toContain('<path');
  });

  it('draws the usable part of the band and nothing beyond its edges', () => {
    const bar = /x="([\d.]+)" y="[\d.]+" width="([\d.]+)"/.exec(partOf(svg, 'usable'));
    const mhz = linearReader(svg, 'axis-x');
    const left = Number(bar?.[1]);
    // IARU region 1 band plan: 14 000 to 14 350 kHz, all of it at or below SWR 2 here.
    expect(mhz(left)).toBeCloseTo(14.0, 2);
    expect(mhz(left + Number(bar?.[2]))).toBeCloseTo(14.35, 2);
  });

  it('keeps the one deep point of a long noisy sweep', () => {
    const long = sweepOf(seriesCircuit(200, 2, 14.15e6), evenFrequencies(1e6, 30e6, 100_001));
    const spiked = withNoise(long, 0.01, 3);
    spiked.reflectionRe[61_803] = 0;
    spiked.reflectionIm[61_803] = 0;
    const { summary, ...chart } = chartOf(withNoise(dipole, 0.01, 7));
    const drawn = swrChart({ ...chart, summary, sweep: spiked }, plainStyle);
    const lowest = Math.max(...pathPoints(drawn, 'swr').map(({ y }) => y));
    expect(swrReader(drawn)(lowest)).toBeCloseTo(1, 2);
    expect(drawn.length).toBeLessThan(60_000);
  });

  it('shows a sweep of one point, and one of total reflection', () => {
    const one = sweepOf(() => ({ resistance: 75, reactance: 0 }), Float64Array.of(7.1e6));
    const drawn = swrChart(chartOf(one), plainStyle);
    const place = /M([\d.]+) ([\d.]+)h0/.exec(partOf(drawn, 'points'));
    expect(swrReader(drawn)(Number(place?.[2]))).toBeCloseTo(1.5, 1);
    const open = sweepOf(() => ({ resistance: 1e12, reactance: 0 }), dipole.frequencyHz);
    expect(pathPoints(swrChart(chartOf(open), plainStyle), 'swr')[0].y).toBeCloseTo(
      swrPlace(drawn, Number.MAX_VALUE),
      0,
    );
  });

  it('of a sweep without phase has its SWR and no resonance', () => {
    const drawn = swrChart(chartOf(magnitudeOnly(dipole)), plainStyle);
    expect(drawn).not.toContain('class="resonance"');
    expect(drawn).toContain('class="minimum"');
  });

  it('writes the decimal sign of the language that is asked for', () => {
    const german = swrChart(chartOf(noisy), { ...plainStyle, numbers: 'de' });
    expect(axisTicks(german, 'axis-y').map(({ text }) => text)).toContain('1,5');
    expect(german).toMatch(/least SWR 1,\d\d at 14,\d/);
  });

  it('is in kilohertz up to 3000 kHz, as the Radio Regulations (No. 2.1) write them', () => {
    const low = sweepOf(seriesCircuit(38, 12, 1.85e6), evenFrequencies(1.8e6, 2e6, 101));
    const drawn = swrChart(chartOf(low), plainStyle);
    expect(drawn).toContain('Frequency (kHz)');
    expect(axisTicks(drawn, 'axis-x').map(({ text }) => text)).toContain('1900');
  });
});

describe('a chart of R and X', () => {
  it('has both at every point within half a pixel, on a linear axis', () => {
    const svg = impedanceChart(chartOf(noisy), plainStyle);
    const ohms = linearReader(svg, 'axis-y');
    const perPx = ohms(1) - ohms(0);
    const { resistanceOhm, reactanceOhm } = sweepImpedances(noisy);
    expectWithinHalfAPixel(svg, 'resistance', noisy, (i) => (resistanceOhm[i] - ohms(0)) / perPx);
    expectWithinHalfAPixel(svg, 'reactance', noisy, (i) => (reactanceOhm[i] - ohms(0)) / perPx);
  });

  it('marks the resonance on the line of zero reactance', () => {
    const svg = impedanceChart(chartOf(dipole), plainStyle);
    const zero = Number(/y1="([\d.]+)"/.exec(partOf(svg, 'zero'))?.[1]);
    expect(markPlace(svg, 'resonance').y).toBeCloseTo(zero, 1);
    expect(linearReader(svg, 'axis-y')(zero)).toBeCloseTo(0, 1);
    expect(linearReader(svg, 'axis-x')(markPlace(svg, 'resonance').x)).toBeCloseTo(14.15, 2);
  });

  it('reaches thousands of ohms and still tells 20 from 100, where a parallel resonance is swept', () => {
    const trap = sweepOf(parallelCircuit(4000, 20, 14e6), evenFrequencies(12e6, 16e6, 801));
    const svg = impedanceChart(chartOf(trap), plainStyle);
    const ticks = axisTicks(svg, 'axis-y');
    const place = (text: string) => ticks.find((tick) => tick.text === text)?.at ?? Number.NaN;
    const points = pathPoints(svg, 'resistance');
    const top = Math.min(...points.map(({ y }) => y));
    // Parallel resonance: the reactances cancel and all 4000 ohm are left.
    expect(top).toBeLessThan(place('2000'));
    expect(place('20') - place('100')).toBeGreaterThan(20);
    expect(svg).toContain('logarithmic beyond');
  });

  it('names a reactance without its sign as a magnitude', () => {
    const svg = impedanceChart(chartOf(withoutSign(dipole)), plainStyle);
    expect(svg).toContain('R and |X| (Ω');
    expect(svg).not.toContain('class="resonance"');
    expect(svg).toContain('class="reactance"');
  });
});

describe('a Smith chart', () => {
  const svg = smithChart(chartOf(dipole), { ...plainStyle, heightPx: 720 });
  const rim = /cx="([\d.]+)" cy="([\d.]+)" r="([\d.]+)"/.exec(partOf(svg, 'rim')) ?? [];
  const [centreX, centreY, radius] = rim.slice(1).map(Number);

  it('has the reflections of the sweep where re and im are', () => {
    const points = pathPoints(svg, 'reflection');
    const last = points[points.length - 1];
    const end = dipole.frequencyHz.length - 1;
    expect((points[0].x - centreX) / radius).toBeCloseTo(dipole.reflectionRe[0], 2);
    expect((centreY - points[0].y) / radius).toBeCloseTo(dipole.reflectionIm[0], 2);
    expect((last.x - centreX) / radius).toBeCloseTo(dipole.reflectionRe[end], 2);
    expect((centreY - last.y) / radius).toBeCloseTo(dipole.reflectionIm[end], 2);
  });

  it('has its circles and arcs where Smith put them', () => {
    // Smith 1939: constant r is a circle about r/(1+r) of radius 1/(1+r).
    const circles = [
      ...partOf(svg, 'smith-grid').matchAll(/cx="([\d.]+)" cy="[\d.]+" r="([\d.]+)"/g),
    ];
    const rOne = circles.find(([, x]) => Math.abs((Number(x) - centreX) / radius - 0.5) < 1e-3);
    expect(Number(rOne?.[2]) / radius).toBeCloseTo(0.5, 3);
    // Constant x = 1: from the rim at +j, with radius 1, to 1.
    const arcs = [...svg.matchAll(/M([\d.]+) ([\d.]+)A([\d.]+) /g)].map((arc) => arc.map(Number));
    const xOne = arcs.find(([, x, y]) => Math.abs(x - centreX) < 0.2 && y < centreY);
    expect((centreY - (xOne?.[2] ?? 0)) / radius).toBeCloseTo(1, 3);
    expect((xOne?.[3] ?? 0) / radius).toBeCloseTo(1, 3);
  });

  it('marks the resonance on the real axis', () => {
    const { x, y } = markPlace(svg, 'resonance');
    expect(y).toBeCloseTo(centreY, 0);
    // (38 - 50)/(38 + 50)
    expect((x - centreX) / radius).toBeCloseTo(-12 / 88, 2);
  });

  it('of a long noisy sweep stays small', () => {
    const long = withNoise(
      sweepOf(seriesCircuit(38, 12, 14.15e6), evenFrequencies(1e6, 30e6, 100_001)),
      0.02,
      5,
    );
    expect(smithChart({ ...chartOf(dipole), sweep: long }, plainStyle).length).toBeLessThan(60_000);
  });
});

describe('any chart of a sweep', () => {
  const hostile = `"><script>alert(1)</script>&\u0000\u001b\ud800'<!--]]>`;
  const draw = { swr: swrChart, impedance: impedanceChart, smith: smithChart };

  it.each(Object.entries(draw))('%s is safe whatever its antenna is called', (_, chart) => {
    const svg = chart(chartOf(dipole, 2, hostile), plainStyle);
    expect(svg).not.toMatch(/<script|<!--|]]>|<style|<a[ >]|href|url\(|\son\w+=/i);
    expect(svg).toMatch(/^[\n\u0020-\ud7ff\ue000-\ufffd]*$/);
    expect(svg.match(/<title>/g)).toHaveLength(1);
    expect(svg).toContain('&lt;script&gt;');
  });

  it.each(Object.entries(draw))('%s is the same each time, with the facts in words', (_, chart) => {
    const svg = chart(chartOf(dipole), plainStyle);
    expect(chart(chartOf(dipole), plainStyle)).toBe(svg);
    expect(svg).toContain('role="img"');
    const words = /<desc>([^<]*)<\/desc>/.exec(svg)?.[1] ?? '';
    expect(words).toContain('Resonance (series; X = 0) at 14.150 MHz, R 38 ohm');
    expect(words).toContain('SWR is least at 14.150 MHz: 1.32');
    expect(words).toContain('20m: usable.');
  });

  it.each(Object.entries(draw))(
    '%s has all its texts inside, at every size and theme',
    (_, chart) => {
      let texts = 0;
      for (const theme of themeNames) {
        for (const widthPx of [280, 360, 900]) {
          const svg = chart(chartOf(noisy), { ...plainStyle, theme, widthPx });
          for (const [, x] of svg.matchAll(/<text x="([-\d.]+)"/g)) {
            texts += 1;
            expect(Number(x)).toBeGreaterThanOrEqual(0);
            expect(Number(x)).toBeLessThanOrEqual(widthPx);
          }
        }
      }
      expect(texts).toBeGreaterThan(100);
    },
  );
});

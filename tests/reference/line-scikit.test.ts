import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { fromFeedPoint, toFeedPoint } from '../../core/line/line.ts';
import {
  accepted,
  evenly,
  exactCable,
  impedanceSweep,
  lineOf,
  resonator,
  section,
} from '../core/line/builders.ts';

const python = '/usr/bin/python3';
const script = fileURLToPath(new URL('line-scikit.py', import.meta.url));
const installed = spawnSync(python, ['-c', 'import skrf']).status === 0;

const cases = [
  { name: 'one lossy coax', lowHz: 1e6, highHz: 30e6, sections: [[50, 0.66, 1.41, 0.02, 31]] },
  {
    name: 'coax, ladder line and coax',
    lowHz: 3e6,
    highHz: 15e6,
    sections: [
      [50, 0.66, 0.62, 0.008, 12.5],
      [400, 0.91, 0.065, 0.0035, 20.3],
      [75, 0.8, 1.07, 0.005, 3.1],
    ],
  },
  {
    name: 'a thin cable far down',
    lowHz: 1.8e6,
    highHz: 8e6,
    sections: [[50, 0.66, 2.75, 0.018, 60]],
  },
  {
    name: 'a wire pair on vhf',
    lowHz: 140e6,
    highHz: 150e6,
    sections: [[300, 0.82, 0.28, 0.0118, 9.7]],
  },
] as const;

describe('lossy cascades', () => {
  it.skipIf(!installed)('agree with a general-purpose network library to 1e-9 (scikit-rf)', () => {
    const antenna = resonator(38, 7.1e6, 14);
    const asked = cases.map(({ lowHz, highHz, sections }) => {
      const frequencyHz = evenly(lowHz, highHz, 101);
      const loads = Array.from(frequencyHz, antenna);
      return {
        frequency_hz: Array.from(frequencyHz),
        reference_ohm: 50,
        load_re: loads.map((z) => z.re),
        load_im: loads.map((z) => z.im),
        sections: sections.map(([ohm, velocity_factor, k1, k2, length_m]) => ({
          ohm,
          velocity_factor,
          k1,
          k2,
          length_m,
        })),
      };
    });
    const run = spawnSync(python, [script], { input: JSON.stringify(asked), encoding: 'utf8' });
    expect(run.status, run.stderr).toBe(0);
    const answers: { re: number[]; im: number[] }[] = JSON.parse(run.stdout.split('answers ')[1]);
    expect(answers).toHaveLength(cases.length);
    for (const [index, { name, lowHz, highHz, sections }] of cases.entries()) {
      const line = lineOf(
        ...sections.map(([characteristicOhm, velocityFactor, k1, k2, lengthM]) =>
          section(exactCable({ characteristicOhm, velocityFactor, k1, k2 }), lengthM),
        ),
      );
      const feed = impedanceSweep(evenly(lowHz, highHz, 101), antenna);
      const measured = accepted(fromFeedPoint(feed, line));
      const theirs = {
        ...measured,
        reflectionRe: Float64Array.from(answers[index].re),
        reflectionIm: Float64Array.from(answers[index].im),
      };
      const back = accepted(toFeedPoint(theirs, line));
      for (let i = 0; i < 101; i++) {
        const { reflectionRe: re, reflectionIm: im } = measured;
        const apart = Math.hypot(re[i] - theirs.reflectionRe[i], im[i] - theirs.reflectionIm[i]);
        expect(apart, name).toBeLessThan(1e-9);
        const left = Math.hypot(
          back.reflectionRe[i] - feed.reflectionRe[i],
          back.reflectionIm[i] - feed.reflectionIm[i],
        );
        expect(left, name).toBeLessThan(1e-9);
      }
    }
  });

  it.runIf(!installed)('were not compared: the network library is not installed here', () => {
    console.warn('line cascades: python3-scikit-rf is not installed, comparison skipped');
    expect(installed).toBe(false);
  });
});

import { describe, expect, it } from 'vitest';
import { findCable } from '../../../core/line/cables.ts';
import { judgeRemoval } from '../../../core/line/conditioning.ts';
import type { FeedLine } from '../../../core/line/feed-line.ts';
import { fromFeedPoint, toFeedPoint } from '../../../core/line/line.ts';
import { removeLine } from '../../../core/line/removal-half-width.ts';
import type { ComplexSweep } from '../../../core/sweep.ts';
import {
  accepted,
  evenly,
  exactCable,
  impedanceSweep,
  lineOf,
  reflectionSweep,
  refusalOf,
  resonator,
  section,
} from './builders.ts';

const antenna = impedanceSweep(evenly(14e6, 14.35e6, 71), resonator(60, 14.1e6, 9));
const thin = findCable('m17-28-rg58') ?? exactCable();

function judged(measured: ComplexSweep, line: FeedLine, measuredU95 = 0.005) {
  return judgeRemoval(accepted(removeLine(measured, line, measuredU95)));
}
const codes = (judgement: ReturnType<typeof judged>) => judgement.reasons.map((each) => each.code);

describe('the half-width of the reflection at the feed point', () => {
  it('is the measured one where the line is known exactly and lossless', () => {
    const line = lineOf(section(exactCable(), 12));
    const { reflectionU95, magnitudeU95 } = accepted(removeLine(antenna, line, 0.01));
    expect(reflectionU95[10]).toBeCloseTo(0.01, 12);
    expect(magnitudeU95[10]).toBeCloseTo(0.01, 12);
  });

  it('grows by the loss of the line', () => {
    const line = lineOf(section(exactCable(), 12, { extraLossDb: 10 }));
    const { reflectionU95, magnification } = accepted(removeLine(antenna, line, 0.01));
    expect(magnification[0]).toBeCloseTo(10, 10);
    expect(reflectionU95[0]).toBeCloseTo(0.1, 10);
  });

  it('of an uncertain length turns the reflection and leaves its size alone', () => {
    const line = lineOf(section(exactCable(), 12, { lengthU95M: 0.1 }));
    const removal = accepted(removeLine(antenna, line, 0));
    const { reflectionRe: re, reflectionIm: im } = removal.sweep;
    const beta = (2 * Math.PI * antenna.frequencyHz[70]) / (0.66 * 299_792_458);
    const expected = Math.hypot(re[70], im[70]) * Math.sin(2 * beta * 0.1);
    expect(removal.reflectionU95[70]).toBeCloseTo(expected, 9);
    expect(removal.magnitudeU95[70]).toBeCloseTo(0, 12);
  });

  it('of an uncertain loss changes its size and hardly turns it', () => {
    const cable = exactCable({ k1: 1, lossU95Fraction: 0.1 });
    const line = lineOf(section(cable, 30, { extraLossDb: 0.5 }));
    const removal = accepted(removeLine(antenna, line, 0));
    expect(removal.reflectionU95[5]).toBeGreaterThan(0.004);
    expect(removal.magnitudeU95[5] / removal.reflectionU95[5]).toBeCloseTo(1, 1);
  });

  it('covers removals by lines inside the stated intervals', () => {
    const line = lineOf(section(thin, 18, { lengthU95M: 0.2 }));
    const measured = accepted(fromFeedPoint(antenna, line));
    const { sweep, reflectionU95 } = accepted(removeLine(measured, line, 0));
    const truth = [
      lineOf(section({ ...thin, velocityFactor: 0.667 }, 18.1)),
      lineOf(section({ ...thin, characteristicOhm: 51 }, 17.9)),
    ];
    for (const other of truth) {
      const moved = accepted(toFeedPoint(measured, other));
      for (let i = 0; i < 71; i++) {
        const apart = Math.hypot(
          moved.reflectionRe[i] - sweep.reflectionRe[i],
          moved.reflectionIm[i] - sweep.reflectionIm[i],
        );
        expect(apart).toBeLessThan(reflectionU95[i]);
      }
    }
  });

  it('is not known where a removal fails', () => {
    const line = lineOf(section(thin, 2000));
    expect(refusalOf(removeLine(antenna, line, 0))).toBe('line_loss_too_great');
  });
});

describe('a removed line', () => {
  it('that is short and known leaves a good answer', () => {
    const line = lineOf(section(thin, 8, { lengthU95M: 0.05 }));
    const judgement = judged(accepted(fromFeedPoint(antenna, line)), line);
    expect(judgement).toMatchObject({ swr: 'good', impedance: 'good', reasons: [] });
  });

  it('of a loosely known length spoils the impedance before the SWR', () => {
    const mismatched = impedanceSweep(evenly(14e6, 14.35e6, 71), resonator(200, 14.1e6, 9));
    const weak = lineOf(section(thin, 20, { lengthU95M: 0.2 }));
    const judgement = judged(accepted(fromFeedPoint(mismatched, weak)), weak);
    expect(judgement).toMatchObject({ swr: 'good', impedance: 'weak' });
    expect(codes(judgement)).toEqual(['feed_point_uncertain']);
    const worse = lineOf(section(thin, 20, { lengthU95M: 1 }));
    expect(codes(judged(accepted(fromFeedPoint(mismatched, worse)), worse))).toEqual([
      'feed_point_worthless',
    ]);
  });

  it('that is long and lossy hides the antenna', () => {
    const line = lineOf(section(thin, 230, { lengthU95M: 0.1 }));
    const judgement = judged(accepted(fromFeedPoint(antenna, line)), line, 0.01);
    expect(codes(judgement)).toEqual(['line_hides_antenna', 'feed_point_worthless']);
    expect(judgement.swr).toBe('weak');
  });

  it('before a reflection it cannot let through contradicts itself', () => {
    // an open measured at the shack end, through a line said to lose 3 dB
    const open = reflectionSweep(evenly(14e6, 14.35e6, 71), () => ({ re: 0.98, im: 0 }));
    const line = lineOf(section(exactCable({ lossU95Fraction: 0.15 }), 5, { extraLossDb: 3 }));
    const judgement = judged(open, line);
    expect(codes(judgement)).toEqual(['line_loss_impossible']);
    expect(judgement).toMatchObject({ swr: 'worthless', impedance: 'worthless' });
  });

  it('whose loss is a little too great for the reflection is doubtful only', () => {
    const open = reflectionSweep(evenly(14e6, 14.35e6, 70), () => ({ re: 0.8, im: 0 }));
    const line = lineOf(section(exactCable({ lossU95Fraction: 0.15 }), 5, { extraLossDb: 1 }));
    const judgement = judged(open, line);
    expect(codes(judgement)).toContain('line_loss_doubtful');
    expect(judgement.swr).toBe('good');
  });
});

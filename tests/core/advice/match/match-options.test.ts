import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandMatch, throughNetwork } from '../../../../core/advice/match/band-swr.ts';
import type { MatchElement } from '../../../../core/advice/match/element.ts';
import { type MatchAdvice, matchOptions } from '../../../../core/advice/match/match-options.ts';
import type { MatchRequest } from '../../../../core/advice/match/match-request.ts';
import { nearestElement, nearestLineOhm } from '../../../../core/advice/match/standard-values.ts';
import {
  accepted,
  evenly,
  impedanceSweep,
  reflectionSweep,
  refusalOf,
  resonator,
} from '../../line/builders.ts';

const request: MatchRequest = {
  place: 'feed_point',
  lowHz: 7e6,
  highHz: 7.2e6,
  maxSwr: 2,
  targetOhm: 50,
  designHz: null,
  componentQ: { inductor: 200, capacitor: 1000 },
  velocityFactor: 0.66,
};
const low = impedanceSweep(evenly(6.8e6, 7.4e6, 121), resonator(18, 7.1e6, 14));
const advice: MatchAdvice = accepted(matchOptions(low, request));

describe('matches of an antenna of 18 ohm on 40 m', () => {
  it('come in every kind', () => {
    expect(new Set(advice.options.map((option) => option.kind))).toEqual(
      new Set([
        'l_network',
        'quarter_wave',
        'series_section',
        'open_stub',
        'short_stub',
        'transformer',
      ]),
    );
  });

  it('are in order of the widest usable span', () => {
    const widths = advice.options.map((option) => option.nearest.usableWidthHz);
    expect(widths.length).toBeGreaterThan(10);
    for (let i = 1; i < widths.length; i++) expect(widths[i]).toBeLessThanOrEqual(widths[i - 1]);
    expect(widths[0]).toBeGreaterThan(advice.unmatched.usableWidthHz);
  });

  it('with exact parts have the least SWR at the design frequency, but for transformers', () => {
    expect(advice.designHz).toBeCloseTo(Math.sqrt(7e6 * 7.2e6), 6);
    const middle = advice.frequencyHz.findIndex((f) => f >= advice.designHz);
    for (const option of advice.options) {
      if (option.kind === 'transformer') continue;
      expect(option.exact.swr[middle], option.kind).toBeLessThan(1.1);
    }
  });

  it('lose what the stated Q of the parts makes them lose', () => {
    const network = advice.options.find((option) => option.kind === 'l_network');
    expect(network?.exact.designLossDb).toBeGreaterThan(0.005);
    expect(network?.exact.designLossDb).toBeLessThan(0.2);
    const poor = { ...request, componentQ: { inductor: 20, capacitor: 100 } };
    const lossy = accepted(matchOptions(low, poor)).options.find(
      (option) => option.kind === 'l_network',
    );
    expect(lossy?.exact.designLossDb).toBeGreaterThan(5 * (network?.exact.designLossDb ?? 1));
  });

  it('offer a transformer only where it does better than nothing', () => {
    const transformers = advice.options.filter((option) => option.kind === 'transformer');
    expect(transformers.length).toBeGreaterThan(0);
    for (const { exact } of transformers) {
      expect(
        exact.usableWidthHz > advice.unmatched.usableWidthHz ||
          exact.worstSwr < advice.unmatched.worstSwr,
      ).toBe(true);
    }
  });

  it('say what was assumed, and that voltages are high', () => {
    expect(advice.assumptions.map((each) => each.code)).toEqual([
      'component_q',
      'lossless_lines_and_transformers',
      'main_line_of_target_impedance',
    ]);
    expect(advice.cautions.map((each) => each.code)).toEqual(['network_voltage']);
  });

  it('at the end of the line leave the loss of the line as it is', () => {
    const atEnd = accepted(matchOptions(low, { ...request, place: 'line_end' }));
    expect(atEnd.cautions.map((each) => each.code)).toEqual(['line_loss_stays', 'network_voltage']);
  });

  it('on a balanced line include stubs in series', () => {
    const wide = accepted(matchOptions(low, { ...request, targetOhm: 400 }));
    const kinds = wide.options.flatMap((option) => option.elements.map((element) => element.kind));
    expect(kinds).toContain('series_stub');
    expect(kinds).toContain('shunt_stub');
    const coax = advice.options.flatMap((option) => option.elements.map((element) => element.kind));
    expect(coax).not.toContain('series_stub');
  });

  it('of a band that was swept in part are made for that part', () => {
    const part = accepted(matchOptions(low, { ...request, lowHz: 7.3e6, highHz: 8e6 }));
    expect(part.designHz).toBeCloseTo(Math.sqrt(7.3e6 * 7.4e6), 0);
  });

  it('can be made for another frequency of the band, a point of the sweep or between two', () => {
    const other = accepted(matchOptions(low, { ...request, designHz: 7.05e6 }));
    expect(other.designHz).toBe(7.05e6);
    expect(accepted(matchOptions(low, { ...request, designHz: 7e6 })).load.re).toBeCloseTo(18, 6);
  });
});

describe('a match that cannot be made', () => {
  it.each([
    ['limit_out_of_range', { maxSwr: 1 }],
    ['target_not_positive', { targetOhm: 0 }],
    ['component_q_not_positive', { componentQ: { inductor: 0, capacitor: 1 } }],
    ['velocity_factor_out_of_range', { velocityFactor: 0 }],
    ['band_not_swept', { lowHz: 14e6, highHz: 14.35e6 }],
    ['design_outside_band', { designHz: 8e6 }],
    ['design_outside_band', { designHz: 6.9e6 }],
  ])('is refused as %s', (code, change) => {
    expect(refusalOf(matchOptions(low, { ...request, ...change }))).toBe(code);
  });

  it('is refused without phase, and for a load that gives power back', () => {
    expect(refusalOf(matchOptions({ ...low, phase: 'unsigned' }, request))).toBe('phase_needed');
    const active = reflectionSweep(evenly(7e6, 7.2e6, 5), () => ({ re: 1.2, im: 0 }));
    expect(refusalOf(matchOptions(active, request))).toBe('load_not_passive');
  });
});

describe('any passive antenna', () => {
  it('gets options with parts, an SWR of 1 or more everywhere, and never a figure that is none', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.tuple(
            fc.double({ min: 0, max: 1, noNaN: true }),
            fc.double({ min: 0, max: 7, noNaN: true }),
          ),
          { minLength: 2, maxLength: 12 },
        ),
        (polar) => {
          const sweep = reflectionSweep(evenly(7e6, 7.2e6, polar.length), (hz) => {
            const [size, angle] = polar[Math.round(((hz - 7e6) / 0.2e6) * (polar.length - 1))];
            return { re: size * Math.cos(angle), im: size * Math.sin(angle) };
          });
          const result = matchOptions(sweep, { ...request, targetOhm: 75 });
          if (!result.ok) {
            expect(result.error.code).toBe('load_not_passive');
            return;
          }
          for (const { elements, exact, nearest } of result.value.options) {
            expect(elements.length).toBeGreaterThan(0);
            for (const match of [exact, nearest]) {
              for (const swr of match.swr) expect(swr).toBeGreaterThanOrEqual(1);
              expect(match.designLossDb).toBeGreaterThanOrEqual(0);
              expect(match.usableWidthHz).toBeGreaterThanOrEqual(0);
              expect(match.usableWidthHz).toBeLessThanOrEqual(0.2e6 + 1);
            }
          }
        },
      ),
    );
  });

  it('that is matched already needs none', () => {
    const matched = reflectionSweep(evenly(7e6, 7.2e6, 5), () => ({ re: 0, im: 0 }));
    expect(accepted(matchOptions(matched, request)).options).toEqual([]);
  });
});

describe('a network over a band', () => {
  const q = request.componentQ;
  it('has the widest of several usable spans, with edges between the points', () => {
    // SWR 3, 1.5, 3, 1, 1.5, 3 against 50 ohm
    const loads = {
      frequencyHz: Float64Array.of(1, 2, 3, 4, 5, 6),
      resistanceOhm: Float64Array.of(150, 75, 150, 50, 75, 150),
      reactanceOhm: new Float64Array(6),
    };
    const match = bandMatch(loads, [], 50, 2, q, { frequencyHz: 4, load: { re: 50, im: 0 } });
    // 1/SWR runs 1/3 to 1 and 2/3 to 1/3: 1/2 lies a quarter and a half of the way
    expect(match.widestSpan?.lowHz).toBeCloseTo(3.25, 12);
    expect(match.widestSpan?.highHz).toBeCloseTo(5.5, 12);
    expect(match.worstSwr).toBeCloseTo(3, 12);
    expect(match.designLossDb).toBeCloseTo(0, 12);
  });

  it('has no usable span where SWR stays above the limit, even with an open in the band', () => {
    const open = reflectionSweep(evenly(7e6, 7.2e6, 5), (hz) =>
      hz > 7.14e6 ? { re: 1, im: 0 } : { re: 0.8, im: 0 },
    );
    const result = accepted(matchOptions(open, { ...request, designHz: 7.05e6 }));
    expect(result.unmatched.widestSpan).toBeNull();
    expect(result.unmatched.usableWidthHz).toBe(0);
    expect(result.unmatched.swr[4]).toBeGreaterThan(1e6);
  });

  it('takes the power a lossy part takes, and none where there is none', () => {
    const series: MatchElement = { kind: 'series_inductor', inductanceH: 50 / (2 * Math.PI * 1e6) };
    const { impedance, lossDb } = throughNetwork([series], { re: 50, im: 0 }, 1e6, {
      inductor: 50,
      capacitor: 1000,
    });
    expect(impedance.re).toBeCloseTo(51, 9);
    expect(lossDb).toBeCloseTo(10 * Math.log10(51 / 50), 9);
    expect(throughNetwork([series], { re: -50, im: 0 }, 1e6, q).lossDb).toBeGreaterThanOrEqual(0);
    expect(throughNetwork([series], { re: -0.1, im: 0 }, 1e6, q).lossDb).toBe(0);
  });
});

describe('parts as they can be had', () => {
  it('are preferred values, lines that exist, and everything else as it is', () => {
    expect(nearestElement({ kind: 'shunt_capacitor', capacitanceF: 4.6e-10 })).toEqual({
      kind: 'shunt_capacitor',
      capacitanceF: 4.7e-10,
    });
    expect(nearestElement({ kind: 'series_inductor', inductanceH: 5.2e-7 })).toEqual({
      kind: 'series_inductor',
      inductanceH: 5.1e-7,
    });
    const transformer: MatchElement = { kind: 'transformer', impedanceRatio: 4 };
    expect(nearestElement(transformer)).toBe(transformer);
    expect(nearestLineOhm(22.36)).toBe(25);
    expect(nearestLineOhm(1000)).toBe(600);
  });
});

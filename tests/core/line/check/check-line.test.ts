import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findCable } from '../../../../core/line/cables.ts';
import { checkLine } from '../../../../core/line/check/check-line.ts';
import type { LineUnderTest } from '../../../../core/line/check/checked-line.ts';
import { fromFeedPoint } from '../../../../core/line/line.ts';
import type { ComplexSweep } from '../../../../core/sweep.ts';
import { Random } from '../../../support/random.ts';
import {
  accepted,
  evenly,
  exactCable,
  impedanceSweep,
  lineOf,
  reflectionSweep,
  refusalOf,
  section,
} from '../builders.ts';

const coax = findCable('m17-28-rg58') ?? exactCable();
const wide = evenly(1e6, 101e6, 401);

function test(facts: Partial<LineUnderTest> = {}): LineUnderTest {
  return {
    farEnd: 'open',
    cable: coax,
    velocityFactor: null,
    velocityFactorU95: null,
    lengthM: null,
    lengthU95M: null,
    window: 'kaiser_6',
    compensateLoss: false,
    ...facts,
  };
}

function intoLine(lengthM: number, end: 1 | -1 | 0 = 1, cable = coax, frequencyHz = wide) {
  const reflection = reflectionSweep(frequencyHz, () => ({ re: end, im: 0 }));
  return accepted(fromFeedPoint(reflection, lineOf(section(cable, lengthM))));
}

describe('a line check', () => {
  it.each([
    ['phase_needed', { ...intoLine(20), phase: 'unsigned' } as const, {}],
    ['velocity_factor_out_of_range', intoLine(20), { velocityFactor: 1.5 }],
    ['velocity_factor_out_of_range', intoLine(20), { cable: null }],
    ['line_length_invalid', intoLine(20), { lengthM: 0 }],
    ['sweep_too_few_points', intoLine(20, 1, coax, evenly(1e6, 50e6, 15)), {}],
    [
      'sweep_steps_uneven',
      intoLine(
        20,
        1,
        coax,
        wide.map((f) => f ** 1.01),
      ),
      {},
    ],
    ['sweep_too_narrow', intoLine(20), { lengthM: 1.5 }],
    ['sweep_too_coarse', intoLine(20), { lengthM: 450 }],
    ['no_end_found', intoLine(20, 0), {}],
    ['no_end_found', intoLine(0.3), {}],
  ])('is refused as %s', (code, sweep, facts) => {
    expect(refusalOf(checkLine(sweep, test(facts)))).toBe(code);
  });

  it('says how wide or how fine the sweep must be', () => {
    const narrow = checkLine(intoLine(20), test({ lengthM: 1.5 }));
    expect(narrow.ok ? '' : narrow.error.detail).toContain('132 MHz');
    const coarse = checkLine(intoLine(20), test({ lengthM: 500 }));
    expect(coarse.ok ? '' : coarse.error.detail).toContain('0.198 MHz');
  });

  it('gives the length with the velocity factor, and its half-width', () => {
    const check = accepted(checkLine(intoLine(23.4), test()));
    expect(check.lengthM).toBeCloseTo(23.4, 8);
    expect(check.lengthU95M).toBeCloseTo((23.4 * 0.01) / 0.66, 4);
    expect(check.measuredVelocityFactor).toBeNull();
    expect(check.absent.map((each) => each.field)).toEqual(['measured_velocity_factor']);
  });

  it('gives the velocity factor of a known length, and its half-width', () => {
    const check = accepted(checkLine(intoLine(23.4), test({ lengthM: 23.4, lengthU95M: 0.1 })));
    expect(check.measuredVelocityFactor).toBeCloseTo(0.66, 8);
    expect(check.measuredVelocityFactorU95).toBeCloseTo((0.66 * 0.1) / 23.4, 6);
    expect(check.absent).toEqual([]);
    const unsure = accepted(checkLine(intoLine(23.4), test({ lengthM: 23.4 })));
    expect(unsure.measuredVelocityFactorU95).toBeNull();
  });

  it('takes a stated velocity factor before that of the cable, with its half-width', () => {
    const facts = { velocityFactor: 0.7, velocityFactorU95: 0.01 };
    const check = accepted(checkLine(intoLine(20), test(facts)));
    expect(check.lengthM).toBeCloseTo((20 * 0.7) / 0.66, 6);
    expect(check.velocityFactorU95).toBe(0.01);
    const assumed = accepted(checkLine(intoLine(20), test({ velocityFactor: 0.7 })));
    expect(assumed.velocityFactorU95).toBeCloseTo(0.014, 12);
    expect(assumed.assumptions.map((each) => each.code)).toContain(
      'velocity_factor_half_width_assumed',
    );
  });

  it('finds nothing to say of a line in order', () => {
    const check = accepted(checkLine(intoLine(20, -1), test({ farEnd: 'short', lengthM: 20 })));
    expect(check.findings).toEqual([]);
  });

  it('leaves the half-width of the length to the ripples where a line is not of its cable', () => {
    const other = { ...coax, characteristicOhm: 54 };
    const check = accepted(checkLine(intoLine(20, 1, other), test({ lengthM: 20 })));
    const { electricalLengthM, electricalLengthU95M } = check;
    expect(electricalLengthM).not.toBeNull();
    expect(electricalLengthU95M).toBeGreaterThan(0);
    expect(Math.abs((electricalLengthM ?? 0) - 20 / 0.66)).toBeLessThan(electricalLengthU95M ?? 0);
  });
});

describe('a line that is not as stated', () => {
  it('ends too soon: it is broken there', () => {
    const check = accepted(checkLine(intoLine(12), test({ lengthM: 30 })));
    expect(check.findings.map((each) => each.code)).toContain('line_shorter_than_stated');
  });

  it('ends too late', () => {
    const check = accepted(checkLine(intoLine(30), test({ lengthM: 25, lengthU95M: 0.2 })));
    expect(check.findings.map((each) => each.code)).toContain('line_longer_than_stated');
  });

  it('loses more than its cable', () => {
    const { attenuation } = coax;
    const wet = {
      ...coax,
      attenuation: { ...attenuation, dielectricDbPer100M: 0.15 },
    };
    const check = accepted(checkLine(intoLine(20, 1, wet), test({ lengthM: 20 })));
    expect(check.findings.map((each) => each.code)).toEqual(['line_loss_above_cable']);
    expect(check.loss?.ratio).toBeGreaterThan(1.4);
  });

  it('loses less than its cable', () => {
    const better = findCable('coax-50-pe-10mm') ?? exactCable();
    const check = accepted(checkLine(intoLine(20, 1, better), test({ lengthM: 20 })));
    expect(check.findings.map((each) => each.code)).toEqual(['line_loss_below_cable']);
  });
});

describe('the smooth loss of a line', () => {
  it('follows k1 sqrt(f) + k2 f and never falls below zero in either part', () => {
    const pure = [exactCable({ k1: 1.4 }), exactCable({ k2: 0.1 }), exactCable()];
    for (const cable of pure) {
      const check = accepted(checkLine(intoLine(20, 1, cable), test({ cable, lengthM: 20 })));
      expect(check.loss?.smoothLossDb[400]).toBeCloseTo(check.loss?.lossDb[400] ?? -1, 6);
    }
    // a reflection that grows with frequency, as no line makes it
    const rising = reflectionSweep(wide, (hz) => {
      const size = 0.9 + (0.1 * hz) / 101e6;
      const angle = (-4 * Math.PI * hz * 20) / (0.66 * 299_792_458);
      return { re: size * Math.cos(angle), im: size * Math.sin(angle) };
    });
    const facts = { cable: null, velocityFactor: 0.66 };
    const loss = accepted(checkLine(rising, test(facts))).loss;
    for (const value of loss?.smoothLossDb ?? [-1]) expect(value).toBeGreaterThanOrEqual(0);
    // one that falls faster than f
    const steep = reflectionSweep(wide, (hz) => {
      const size = Math.exp(-((hz / 101e6) ** 2));
      const angle = (-4 * Math.PI * hz * 20) / (0.66 * 299_792_458);
      return { re: size * Math.cos(angle), im: size * Math.sin(angle) };
    });
    const smooth = accepted(checkLine(steep, test(facts))).loss?.smoothLossDb;
    expect((smooth?.[200] ?? 0) / (smooth?.[400] ?? 1)).toBeCloseTo(51 / 101, 6);
  });
});

describe('a line with a load at its far end', () => {
  const loaded = (lengthM: number): ComplexSweep =>
    accepted(
      fromFeedPoint(
        impedanceSweep(wide, () => ({ re: 100, im: 0 })),
        lineOf(section(coax, lengthM)),
      ),
    );

  it('hides its end unless a length is stated', () => {
    const check = accepted(checkLine(loaded(20), test({ farEnd: 'loaded' })));
    expect(check.lengthM).toBeNull();
    expect(check.loss).toBeNull();
    expect(check.absent.map((each) => each.code)).toContain('end_hidden');
    expect(check.discontinuities.length).toBeGreaterThan(0);
  });

  it('shows its end as a peak at the stated length', () => {
    const check = accepted(checkLine(loaded(20), test({ farEnd: 'loaded', lengthM: 20 })));
    expect(check.lengthMethod).toBe('peak');
    expect(Math.abs((check.lengthM ?? 0) - 20)).toBeLessThan(check.lengthU95M ?? 0);
    expect(check.absent.map((each) => each.code)).toEqual(['end_not_total']);
  });

  it('that is matched shows nothing', () => {
    const check = accepted(checkLine(intoLine(20, 0), test({ farEnd: 'loaded' })));
    expect(check.discontinuities).toEqual([]);
  });
});

describe('a noisy line check', () => {
  it('spreads its places within their stated half-widths', () => {
    const random = new Random(7);
    const clean = intoLine(20, 1, exactCable());
    const runs = 60;
    let within = 0;
    for (let run = 0; run < runs; run++) {
      const noise = () => 0.02 * random.gaussian();
      const sweep = {
        ...clean,
        reflectionRe: clean.reflectionRe.map((re) => re + noise()),
        reflectionIm: clean.reflectionIm.map((im) => im + noise()),
      };
      const check = accepted(checkLine(sweep, test({ cable: exactCable(), window: 'hann' })));
      const end = check.discontinuities.find((place) => place.kind === 'end');
      if (Math.abs((end?.distanceM ?? 0) - 20) <= (end?.distanceU95M ?? 0)) within++;
      expect(check.discontinuities).toHaveLength(1);
      const off = Math.abs((check.electricalLengthM ?? 0) - 20 / 0.66);
      expect(off).toBeLessThan(check.electricalLengthU95M ?? 0);
      expect(check.electricalLengthU95M).toBeLessThan(0.1);
    }
    expect(within / runs).toBeGreaterThan(0.85);
  });
});

describe('the analyzer end', () => {
  it('is told apart from the line, also where it folds round to the far end of the trace', () => {
    // a poor connector before the cable: it reflects at zero distance
    const poor = { ...coax, characteristicOhm: 20 };
    const open = reflectionSweep(wide, () => ({ re: 1, im: 0 }));
    const measured = accepted(fromFeedPoint(open, lineOf(section(poor, 0.1), section(coax, 20))));
    const check = accepted(checkLine(measured, test({ lengthM: 20 })));
    const [first] = check.discontinuities;
    expect(first.kind).toBe('near_end');
    expect(Math.abs(first.distanceM)).toBeLessThan(1);
    // moved a little behind the analyzer's plane, its place is below zero
    const turned = reflectionSweep(wide, (hz) => {
      const angle = (4 * Math.PI * hz * 0.4) / (0.66 * 299_792_458);
      return { re: 0.4 * Math.cos(angle), im: 0.4 * Math.sin(angle) };
    });
    const behind = accepted(
      checkLine(turned, test({ farEnd: 'loaded', cable: null, velocityFactor: 0.66 })),
    );
    expect(behind.discontinuities[0].distanceM).toBeCloseTo(-0.4, 2);
    expect(behind.discontinuities[0].kind).toBe('near_end');
  });
});

describe('any sweep at all', () => {
  it('is refused with a code or answered with finite figures', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 2 ** 30 }),
        fc.integer({ min: 16, max: 90 }),
        fc.double({ min: 0, max: 1.2, noNaN: true }),
        fc.constantFrom('open' as const, 'short' as const, 'loaded' as const),
        fc.constantFrom('rectangular' as const, 'hann' as const, 'kaiser_3pi' as const),
        (seed, points, size, farEnd, window) => {
          const random = new Random(seed);
          const sweep = reflectionSweep(evenly(1e6, 60e6, points), () => ({
            re: random.uniform(-size, size),
            im: random.uniform(-size, size),
          }));
          const result = checkLine(sweep, test({ farEnd, window, lengthM: 15 }));
          if (!result.ok) {
            expect(['no_end_found', 'sweep_too_coarse']).toContain(result.error.code);
            return;
          }
          const { discontinuities, lengthM, lengthU95M, trace, reflectionFloor } = result.value;
          for (const value of [lengthM ?? 0, lengthU95M ?? 0, reflectionFloor]) {
            expect(Number.isFinite(value)).toBe(true);
          }
          for (const place of discontinuities) {
            expect(place.distanceM).toBeLessThanOrEqual(trace.aliasFreeM);
            expect(place.magnitude).toBeGreaterThanOrEqual(reflectionFloor * 0.99);
            expect(Number.isFinite(place.distanceU95M)).toBe(true);
          }
        },
      ),
    );
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cables, findCable } from '../../../core/line/cables.ts';
import {
  electricalLength,
  fromFeedPoint,
  matchedLossDb,
  toFeedPoint,
} from '../../../core/line/line.ts';
import { propagation } from '../../../core/line/propagation.ts';
import { throughLine } from '../../../server/demo/models/lumped.ts';
import {
  accepted,
  evenly,
  exactCable,
  impedanceOf,
  impedanceSweep,
  lineOf,
  reflectionSweep,
  refusalOf,
  resonator,
  section,
} from './builders.ts';

const aSection = fc.record({
  cable: fc.constantFrom(...cables),
  lengthM: fc.double({ min: 0, max: 25, noNaN: true }),
  lengthU95M: fc.constant(0),
  extraLossDb: fc.double({ min: 0, max: 0.5, noNaN: true }),
});

describe('a line added to a known antenna and removed again', () => {
  it('leaves the antenna as it was, to 1e-10, whatever the sections', () => {
    fc.assert(
      fc.property(
        fc.array(aSection, { minLength: 1, maxLength: 4 }),
        fc.double({ min: 5, max: 300, noNaN: true }),
        fc.double({ min: 2, max: 60, noNaN: true }),
        fc.constantFrom(50, 75, 300),
        (sections, resistance, q, reference) => {
          const antenna = impedanceSweep(
            evenly(6.5e6, 7.8e6, 27),
            resonator(resistance, 7.1e6, q),
            reference,
          );
          const line = lineOf(...sections);
          const back = accepted(toFeedPoint(accepted(fromFeedPoint(antenna, line)), line));
          for (let i = 0; i < 27; i++) {
            expect(Math.abs(back.reflectionRe[i] - antenna.reflectionRe[i])).toBeLessThan(1e-10);
            expect(Math.abs(back.reflectionIm[i] - antenna.reflectionIm[i])).toBeLessThan(1e-10);
          }
        },
      ),
      { numRuns: 300 },
    );
  });

  it('holds for a total reflection and at 0 Hz', () => {
    const open = reflectionSweep(Float64Array.of(0, 5e6), () => ({ re: 1, im: 0 }));
    const line = lineOf(section(exactCable({ k1: 1, k2: 0.02 }), 17));
    const there = accepted(fromFeedPoint(open, line));
    expect(there.reflectionRe[0]).toBe(1);
    const back = accepted(toFeedPoint(there, line));
    expect(back.reflectionRe[1]).toBeCloseTo(1, 12);
    expect(back.reflectionIm[1]).toBeCloseTo(0, 12);
  });
});

describe('a line without length or sections', () => {
  it('changes nothing', () => {
    const antenna = impedanceSweep(evenly(6e6, 8e6, 5), resonator(40, 7e6, 10));
    for (const line of [lineOf(), lineOf(section(exactCable({ characteristicOhm: 75 }), 0))]) {
      const moved = accepted(toFeedPoint(antenna, line));
      for (let i = 0; i < 5; i++) {
        expect(moved.reflectionRe[i]).toBeCloseTo(antenna.reflectionRe[i], 14);
        expect(moved.reflectionIm[i]).toBeCloseTo(antenna.reflectionIm[i], 14);
      }
    }
  });
});

describe('a line whose loss is all in its conductors', () => {
  it('is that of the closed-form model of the tests and the demonstration', () => {
    const cable = exactCable({ characteristicOhm: 52, velocityFactor: 0.7, k1: 1.41 });
    const antenna = resonator(35, 14.2e6, 12);
    const f = evenly(13e6, 15e6, 41);
    const moved = accepted(fromFeedPoint(impedanceSweep(f, antenna), lineOf(section(cable, 23.4))));
    const model = { characteristicOhm: 52, velocityFactor: 0.7, lengthM: 23.4 };
    for (let i = 0; i < f.length; i++) {
      const z = throughLine(antenna(f[i]), f[i], { ...model, lossDbAt1Mhz: 0.0141 * 23.4 });
      const got = impedanceOf(moved, i);
      expect(Math.abs(got.re - z.re)).toBeLessThan(1e-9);
      expect(Math.abs(got.im - z.im)).toBeLessThan(1e-9);
    }
  });
});

describe('the impedance of a cable', () => {
  it('leans to the capacitive side where conductors lose more than the dielectric', () => {
    expect(propagation(exactCable({ k1: 1.4 }), 3e6).characteristic.im).toBeLessThan(0);
    expect(propagation(exactCable({ k2: 0.2 }), 3e6).characteristic.im).toBeGreaterThan(0);
  });

  it('is real where both lose alike: the line does not distort (Heaviside)', () => {
    // k1 sqrt(f) = k2 f at 4 MHz for k1 = 2 k2
    const { re, im } = propagation(exactCable({ k1: 0.4, k2: 0.2 }), 4e6).characteristic;
    expect(im).toBeCloseTo(0, 12);
    expect(re).toBeCloseTo(50, 12);
  });
});

describe('the length and loss of a line', () => {
  const line = lineOf(
    section(exactCable({ velocityFactor: 0.5, k1: 1 }), 10, { extraLossDb: 0.3 }),
    section(exactCable({ velocityFactor: 1, k1: 2 }), 20),
  );
  it('add up over its sections', () => {
    expect(matchedLossDb(line, 4e6)).toBeCloseTo(0.2 + 0.3 + 0.8, 12);
    expect(electricalLength(line, 29_979_245.8)).toBeCloseTo(2 + 2, 12);
  });
});

describe('a line that cannot be removed', () => {
  const antenna = impedanceSweep(evenly(6e6, 8e6, 5), resonator(40, 7e6, 10));
  const coax = findCable('m17-28-rg58') ?? exactCable();

  it('is one in front of a sweep without signed phase', () => {
    const line = lineOf(section(coax, 10));
    const unsigned = { ...antenna, phase: 'unsigned' } as const;
    const scalar = {
      phase: 'none',
      referenceOhm: 50,
      frequencyHz: antenna.frequencyHz,
      reflectionMagnitude: antenna.reflectionRe.map(Math.abs),
    } as const;
    expect(refusalOf(toFeedPoint(unsigned, line))).toBe('phase_needed');
    expect(refusalOf(toFeedPoint(scalar, line))).toBe('phase_needed');
  });

  it('is one that loses more than any analyzer sees through', () => {
    expect(refusalOf(toFeedPoint(antenna, lineOf(section(coax, 2000))))).toBe(
      'line_loss_too_great',
    );
  });

  it('is one whose impedance makes an impossible reflection infinite', () => {
    const impossible = reflectionSweep(Float64Array.of(7e6), () => ({ re: 5, im: 0 }));
    const line = lineOf(section(exactCable({ characteristicOhm: 75 }), 1));
    expect(refusalOf(toFeedPoint(impossible, line))).toBe('line_removal_not_finite');
  });
});

describe('an error of the measured reflection', () => {
  it('grows on its way by what the removal itself does to a small change', () => {
    const line = lineOf(
      section(exactCable({ k1: 1.4, k2: 0.02 }), 30),
      section(exactCable({ characteristicOhm: 300, velocityFactor: 0.8, k1: 0.3 }), 12),
    );
    const antenna = impedanceSweep(evenly(6.5e6, 7.5e6, 9), resonator(60, 7e6, 10));
    const measured = accepted(fromFeedPoint(antenna, line));
    const growth = new Float64Array(9);
    const moved = accepted(toFeedPoint(measured, line, growth));
    const step = 1e-6;
    const nudged = { ...measured, reflectionRe: measured.reflectionRe.map((re) => re + step) };
    const other = accepted(toFeedPoint(nudged, line));
    for (let i = 0; i < 9; i++) {
      const change = Math.hypot(
        other.reflectionRe[i] - moved.reflectionRe[i],
        other.reflectionIm[i] - moved.reflectionIm[i],
      );
      expect(change / step / growth[i]).toBeCloseTo(1, 4);
    }
  });
});

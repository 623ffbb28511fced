import { describe, expect, it } from 'vitest';
import { cables, findCable } from '../../core/line/cables.ts';
import { checkLine } from '../../core/line/check/check-line.ts';
import type { LineUnderTest } from '../../core/line/check/checked-line.ts';
import { findDiscontinuities } from '../../core/line/check/discontinuities.ts';
import { reflectometryGrid } from '../../core/line/check/grid.ts';
import { reflectionTrace } from '../../core/line/check/trace.ts';
import { besselI0, type WindowId, windows } from '../../core/line/check/windows.ts';
import { fromFeedPoint } from '../../core/line/line.ts';
import {
  accepted,
  evenly,
  exactCable,
  impedanceSweep,
  lineOf,
  reflectionSweep,
  section,
} from '../core/line/builders.ts';

const LIGHT = 299_792_458;
const windowIds = Object.keys(windows) as WindowId[];

/** The lossless open of the published simulation: e^(-j 4 pi f l/(c VF)). */
function openLine(lengthM: number, velocityFactor: number, frequencyHz: Float64Array) {
  return reflectionSweep(frequencyHz, (hz) => {
    const angle = (-4 * Math.PI * hz * lengthM) / (LIGHT * velocityFactor);
    return { re: Math.cos(angle), im: Math.sin(angle) };
  });
}

function test(facts: Partial<LineUnderTest>): LineUnderTest {
  return {
    farEnd: 'open',
    cable: null,
    velocityFactor: null,
    velocityFactorU95: null,
    lengthM: null,
    lengthU95M: null,
    window: 'kaiser_6',
    compensateLoss: false,
    ...facts,
  };
}

describe('published windows', () => {
  // numpy agrees; F. J. Harris, Proc. IEEE 66(1) (1978) for the definitions (memory)
  it('have their published weights at nine points', () => {
    const hann = [0, 0.146446609407, 0.5, 0.853553390593, 1];
    const kaiser = [0.0148733371048, 0.163607564598, 0.482955606411, 0.840684747096, 1];
    const published = [
      [windows.hann.weights(9), hann],
      [windows.kaiser_6.weights(9), kaiser],
    ] as const;
    for (const [weights, half] of published) {
      for (let n = 0; n < 9; n++) expect(weights[n]).toBeCloseTo(half[n < 5 ? n : 8 - n], 11);
    }
    expect(Array.from(windows.rectangular.weights(3))).toEqual([1, 1, 1]);
  });

  it('rest on I0(6) = 67.2344069764780 and I0(8.6) = 750.4611595631663 (recomputed)', () => {
    expect(besselI0(6)).toBeCloseTo(67.234406976478, 11);
    expect(besselI0(8.6)).toBeCloseTo(750.4611595631663, 9);
    expect(besselI0(0)).toBe(1);
  });

  it.each(windowIds)('%s: width and sidelobes are as stated', (id) => {
    const window = windows[id];
    const grid = accepted(reflectometryGrid(openLine(300, 1, evenly(1e6, 65e6, 257)), 1, null));
    const { magnitude, binM, resolutionM } = reflectionTrace(grid, window, null);
    const centre = 300;
    const width = magnitude.filter((value) => value >= 0.5).length * binM;
    expect(width / resolutionM).toBeCloseTo(window.widthAtHalf, 0);
    const outside = magnitude.filter(
      (_, m) => Math.abs(m * binM - centre) > 1.02 * window.firstNull * resolutionM,
    );
    const sidelobe = 20 * Math.log10(outside.reduce((most, value) => Math.max(most, value), 0));
    expect(Math.abs(sidelobe - window.sidelobeDb)).toBeLessThan(0.5);
  });
});

describe('what a sweep can see', () => {
  it.each([
    // VF, step, alias-free range: recomputed; two instrument guides give the same formula (read)
    [0.66, 0.25e6, 395.72604456],
    [0.66, 0.1e6, 989.3151114],
    [1, 1e6, 149.896229],
  ])(
    'VF %d with steps of %d Hz is free of aliases to %d m',
    (velocityFactor, stepHz, aliasFreeM) => {
      const sweep = openLine(20, velocityFactor, evenly(1e6, 1e6 + 200 * stepHz, 201));
      const grid = accepted(reflectometryGrid(sweep, velocityFactor, null));
      expect(grid.aliasFreeM).toBeCloseTo(aliasFreeM, 6);
    },
  );

  it.each([
    [0.66, 50e6, 1.9786302228],
    [0.66, 29e6, 3.41143142068966],
    [1, 100e6, 1.49896229],
  ])('VF %d over %d Hz resolves %d m', (velocityFactor, spanHz, resolutionM) => {
    const sweep = openLine(20, velocityFactor, evenly(1e6, 1e6 + spanHz, 201));
    const grid = accepted(reflectometryGrid(sweep, velocityFactor, null));
    expect(grid.resolutionM).toBeCloseTo(resolutionM, 7);
  });
});

describe('an open of 20 m, VF 0.66, 1 to 51 MHz in 201 points', () => {
  const sweep = openLine(20, 0.66, evenly(1e6, 51e6, 201));

  // recomputed simulation: refined place 20.0000000 m, magnitude 1.0000
  it.each(windowIds)('is found at 20 m with magnitude 1 through the %s window', (id) => {
    const grid = accepted(reflectometryGrid(sweep, 0.66, null));
    const { found } = findDiscontinuities(reflectionTrace(grid, windows[id], null), 201);
    expect(found[0].distanceM).toBeCloseTo(20, 3);
    expect(found[0].magnitude).toBeCloseTo(1, 3);
  });

  it('is 20 m long to nine digits by its phase, without loss', () => {
    const check = accepted(checkLine(sweep, test({ velocityFactor: 0.66 })));
    expect(check.lengthM).toBeCloseTo(20, 9);
    expect(check.electricalLengthM).toBeCloseTo(20 / 0.66, 9);
    expect(check.lengthMethod).toBe('phase');
    for (const loss of check.loss?.lossDb ?? [Number.NaN]) expect(loss).toBeCloseTo(0, 9);
  });

  it('at 420 m appears folded at 24.27 m (recomputed: 420 - 395.726)', () => {
    const far = openLine(420, 0.66, evenly(1e6, 51e6, 201));
    const check = accepted(checkLine(far, test({ velocityFactor: 0.66 })));
    expect(check.lengthM).toBeCloseTo(24.27395544, 6);
    expect(check.assumptions.map((each) => each.code)).toContain('within_alias_free_range');
  });
});

describe('synthetic lossy lines without noise', () => {
  const coaxes = cables.filter((cable) => cable.characteristicOhm <= 75);

  it.each(['open', 'short'] as const)(
    'are measured within 0.2 %% of their length, end %s',
    (farEnd) => {
      let checked = 0;
      let worst = 0;
      for (const cable of coaxes) {
        for (const lengthM of [8.3, 20, 47.7]) {
          const end = reflectionSweep(evenly(1e6, 101e6, 401), () => ({
            re: farEnd === 'open' ? 1 : -1,
            im: 0,
          }));
          const measured = accepted(fromFeedPoint(end, lineOf(section(cable, lengthM))));
          const check = accepted(checkLine(measured, test({ farEnd, cable, lengthM })));
          worst = Math.max(worst, Math.abs((check.lengthM ?? 0) / lengthM - 1));
          expect(check.loss?.ratio).toBeCloseTo(1, 6);
          expect(check.measuredVelocityFactor).toBeCloseTo(cable.velocityFactor, 4);
          checked++;
        }
      }
      expect(checked).toBeGreaterThanOrEqual(30);
      expect(worst).toBeLessThan(0.002);
      expect(worst).toBeLessThan(1e-9);
    },
  );

  it('are measured within 0.2 % by the trace alone, cable unknown', () => {
    for (const cable of coaxes.filter((each) => each.characteristicOhm === 50)) {
      const end = reflectionSweep(evenly(1e6, 101e6, 401), () => ({ re: 1, im: 0 }));
      const measured = accepted(fromFeedPoint(end, lineOf(section(cable, 20))));
      const check = accepted(checkLine(measured, test({ velocityFactor: cable.velocityFactor })));
      const found = check.discontinuities.find((place) => place.kind === 'end');
      expect(Math.abs((found?.distanceM ?? 0) / 20 - 1)).toBeLessThan(0.002);
      expect(Math.abs((check.lengthM ?? 0) / 20 - 1)).toBeLessThan(0.002);
    }
  });

  it('without a listed cable give half the return loss (common practice)', () => {
    // RL 18 dB of an open 200 ft long is 9 dB one way (RG-213 at 432 MHz, a posted measurement; read)
    const cable = exactCable({ k1: (9 / (200 * 0.3048) / Math.sqrt(432)) * 100 });
    const end = reflectionSweep(evenly(402e6, 462e6, 401), () => ({ re: 1, im: 0 }));
    const measured = accepted(fromFeedPoint(end, lineOf(section(cable, 200 * 0.3048))));
    const check = accepted(checkLine(measured, test({ velocityFactor: 0.66 })));
    expect(check.loss?.lossDb[200]).toBeCloseTo(9, 1);
    expect(check.loss?.expectedLossDb).toBeNull();
  });
});

describe('faults on synthetic lines', () => {
  const cable = findCable('m17-74-rg213') ?? exactCable();
  const frequencyHz = evenly(1e6, 101e6, 401);

  /** Splices of another impedance, 30 cm long, at known places of a 50 ohm line of 40 m. */
  function faulty(places: readonly number[], ohm: number) {
    const splice = { ...cable, characteristicOhm: ohm };
    const sections = [];
    let from = 0;
    for (const place of places) {
      sections.push(section(cable, place - from), section(splice, 0.3));
      from = place + 0.3;
    }
    sections.push(section(cable, 40 - from));
    const open = reflectionSweep(frequencyHz, () => ({ re: 1, im: 0 }));
    return accepted(fromFeedPoint(open, lineOf(...sections)));
  }

  it.each([
    [[12.5], 75],
    [[7, 22.4], 75],
    [[9, 14.5, 31], 30],
    [[25], 100],
  ])('at %j m (%d ohm) are found within the stated resolution', (places, ohm) => {
    const check = accepted(checkLine(faulty(places, ohm), test({ cable, lengthM: 40 })));
    const found = check.discontinuities.filter((place) => place.kind === 'on_line');
    expect(found).toHaveLength(places.length);
    for (const [index, place] of places.entries()) {
      // the middle of the splice
      expect(Math.abs(found[index].distanceM - (place + 0.15))).toBeLessThan(check.separableM / 2);
      expect(Math.abs(found[index].distanceM - (place + 0.15))).toBeLessThan(0.3);
    }
    expect(check.findings.filter((each) => each.code === 'line_discontinuity').length).toBe(
      places.length,
    );
    const end = check.discontinuities.find((place) => place.kind === 'end');
    expect(end?.distanceM).toBeCloseTo(40, 0);
  });

  it('nearer to each other than the stated resolution are seen as one', () => {
    const check = accepted(checkLine(faulty([20, 20.8], 75), test({ cable, lengthM: 40 })));
    expect(check.separableM).toBeGreaterThan(1.1);
    expect(check.discontinuities.filter((place) => place.kind === 'on_line')).toHaveLength(1);
  });

  it('that are not there are not found', () => {
    const check = accepted(checkLine(faulty([], 50), test({ cable, lengthM: 40 })));
    expect(check.discontinuities.map((place) => place.kind)).toEqual(['end']);
    expect(check.findings).toEqual([]);
  });

  it('read as they are when the loss on the way is compensated', () => {
    const lossy = findCable('m17-119-rg174') ?? exactCable();
    const end = impedanceSweep(frequencyHz, () => ({ re: 1e9, im: 0 }));
    const measured = accepted(fromFeedPoint(end, lineOf(section(lossy, 25))));
    const facts = { cable: lossy, lengthM: 25 };
    const raw = accepted(checkLine(measured, test(facts)));
    const compensated = accepted(checkLine(measured, test({ ...facts, compensateLoss: true })));
    const at = Math.round(25 / raw.trace.binM);
    expect(raw.trace.magnitude[at]).toBeLessThan(0.35);
    expect(compensated.trace.magnitude[at]).toBeGreaterThan(0.9);
    expect(compensated.trace.magnitude[at]).toBeLessThan(1.15);
    expect(compensated.discontinuities[0].magnitudeThere).toBeCloseTo(1, 0);
    expect(raw.trace.lossCompensated).toBe(false);
    expect(compensated.trace.lossCompensated).toBe(true);
  });
});

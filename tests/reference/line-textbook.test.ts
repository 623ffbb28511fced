import { describe, expect, it } from 'vitest';
import { attenuationDbPer100M, fitAttenuation } from '../../core/line/attenuation.ts';
import { findCable } from '../../core/line/cables.ts';
import { fromFeedPoint } from '../../core/line/line.ts';
import { handbookTotalLossDb, lossThroughLine, swrAtLoad } from '../../core/line/loss-with-swr.ts';
import { propagation } from '../../core/line/propagation.ts';
import {
  accepted,
  exactCable,
  impedanceOf,
  impedanceSweep,
  lineOf,
  reflectionOf,
  section,
} from '../core/line/builders.ts';

const FOOT = 0.3048;
const LIGHT = 299_792_458;
const rhoOf = (swr: number) => (swr - 1) / (swr + 1);

/** A cable of stated loss per 100 ft at one frequency, all of it shared so that Z0 is real. */
function realCable(ohm: number, velocityFactor: number, dbPer100Ft: number, mhz: number) {
  const half = dbPer100Ft / FOOT / 2;
  return exactCable({
    characteristicOhm: ohm,
    velocityFactor,
    k1: half / Math.sqrt(mhz),
    k2: half / mhz,
  });
}

describe('a lossless line', () => {
  // D. M. Pozar, Microwave Engineering, the basic Smith-chart example: Z0 100, ZL 40 + j70, 0.3 lambda.
  // Published (value from memory): 0.59 at 104 deg, SWR 3.87, RL 4.6 dB, Zin 36.5 - j61.1; recomputed.
  it('turns 40 + j70 ohm into 36.53 - j61.12 ohm over 0.3 wavelengths', () => {
    const hz = 100e6;
    const load = { re: 40, im: 70 };
    const reflection = reflectionOf(load, 100);
    const rho = Math.hypot(reflection.re, reflection.im);
    expect(rho).toBeCloseTo(0.589015089374, 10);
    expect((Math.atan2(reflection.im, reflection.re) * 180) / Math.PI).toBeCloseTo(
      104.036243468,
      7,
    );
    expect((1 + rho) / (1 - rho)).toBeCloseTo(3.86635871121, 9);
    const cable = exactCable({ characteristicOhm: 100, velocityFactor: 1 });
    const line = lineOf(section(cable, (0.3 * LIGHT) / hz));
    const z = impedanceOf(
      accepted(
        fromFeedPoint(
          impedanceSweep(Float64Array.of(hz), () => load, 50),
          line,
        ),
      ),
      0,
    );
    expect(z.re).toBeCloseTo(36.5339609247, 8);
    expect(z.im).toBeCloseTo(-61.1189707096, 8);
  });

  // recomputed (T3): 11.5 ft of VF 0.66 at 14.1 MHz before 73.13 + j42.5 ohm
  it('of 0.25 wavelengths inverts a dipole', () => {
    const line = lineOf(section(exactCable(), 11.5 * FOOT));
    const sweep = impedanceSweep(Float64Array.of(14.1e6), () => ({ re: 73.13, im: 42.5 }));
    const z = impedanceOf(accepted(fromFeedPoint(sweep, line)), 0);
    expect(z.re).toBeCloseTo(25.575254863794, 8);
    expect(z.im).toBeCloseTo(-14.907048493179, 8);
  });
});

describe('a line between a resonant antenna and the analyzer', () => {
  // exact algebra: 25 ohm behind an eighth wavelength of 50 ohm reads 40 + j30, SWR 2 at both ends
  it('shows reactance where the antenna has none', () => {
    const hz = 7e6;
    const line = lineOf(section(exactCable({ velocityFactor: 1 }), LIGHT / hz / 8));
    const sweep = impedanceSweep(Float64Array.of(hz), () => ({ re: 25, im: 0 }));
    const z = impedanceOf(accepted(fromFeedPoint(sweep, line)), 0);
    expect(z.re).toBeCloseTo(40, 9);
    expect(z.im).toBeCloseTo(30, 9);
  });
});

describe('the complex impedance of a lossy line', () => {
  // J. Bird, Electrical Circuit Theory and Technology, problem 44.10 (statement read, recomputed):
  // 8 ohm, 3 mH, 7.5 nF, 0.25 uS per km at 1 kHz -> gamma 0.00627307887796 + j0.0304239365419 per km,
  // Z0 646.304012645 - j129.690118966 ohm
  it('is that of a published telephone line, from its attenuation, speed and conductance', () => {
    const omega = 2 * Math.PI * 1000;
    const alpha = 0.00627307887796 / 1000;
    const beta = 0.0304239365419 / 1000;
    const highFrequencyOhm = beta / (omega * 7.5e-12);
    const dielectric = (0.25e-9 * highFrequencyOhm) / 2;
    const dbPer100M = (100 * 20) / Math.LN10;
    const cable = exactCable({
      characteristicOhm: highFrequencyOhm,
      velocityFactor: omega / (beta * LIGHT),
      k1: (dbPer100M * (alpha - dielectric)) / Math.sqrt(1e-3),
      k2: (dbPer100M * dielectric) / 1e-3,
    });
    const line = propagation(cable, 1000);
    expect(line.alpha).toBeCloseTo(alpha, 16);
    expect(line.beta).toBeCloseTo(beta, 16);
    expect(line.characteristic.re).toBeCloseTo(646.304012645, 5);
    expect(line.characteristic.im).toBeCloseTo(-129.690118966, 5);
  });
});

describe('an open line', () => {
  it.each([
    // f1 = c VF/(4 l), spacing c VF/(2 l): recomputed
    [0.66, 15.24, 3.24578448622047e6],
    [0.66, 20, 2.4732877785e6],
    [0.85, 30, 2.12352991083333e6],
    [1, 10, 7.49481145e6],
  ])('of VF %d and %d m is a short at %d Hz and at three times that', (vf, lengthM, hz) => {
    const line = lineOf(section(exactCable({ velocityFactor: vf }), lengthM));
    const open = impedanceSweep(Float64Array.of(hz, 3 * hz), () => ({ re: 1e12, im: 0 }));
    const input = accepted(fromFeedPoint(open, line));
    for (const i of [0, 1]) {
      expect(input.reflectionRe[i]).toBeCloseTo(-1, 9);
      expect(input.reflectionIm[i]).toBeCloseTo(0, 8);
    }
  });
});

describe('total loss with SWR', () => {
  it.each([
    // matched dB, SWR at the load, total dB, SWR at the input
    [2, 8, 4.836739275, 2.927302499], // 4.837 read in: a posted worked example, 1999
    [0.08, 20, 0.7366243226, 16.89679367], // 0.737 read in: the same
    [1.193, 4, 2.119399225, 2.675664821], // 2.12: an association's antenna book (value from memory)
    [1, 2, 1.195857944, 1.720259693], // recomputed
    [3, 3, 3.967723322, 1.668778976], // recomputed
    [0.5, 10, 2.012120794, 6.385669277], // recomputed
  ])('of a line of %d dB with SWR %d is the published figure', (matched, swr, total, swrIn) => {
    const rho = rhoOf(swr);
    expect(handbookTotalLossDb(matched, rho)).toBeCloseTo(total, 8);
    const rhoIn = rho * 10 ** (-matched / 10);
    expect((1 + rhoIn) / (1 - rhoIn)).toBeCloseTo(swrIn, 7);
    expect(swrAtLoad(swrIn, matched)).toBeCloseTo(swr, 5);
  });

  it.each([
    // recomputed
    [1.5, 1.15, 1.70501789],
    [1.5, 1, 1.673028769],
    [2, 3, 4.971707929],
    [1.2, 6, 2.134381643],
  ])('SWR %d behind %d dB is %d at the antenna', (swrIn, matched, swr) => {
    expect(swrAtLoad(swrIn, matched)).toBeCloseTo(swr, 7);
  });

  it('has no antenna that explains SWR 3 behind 3.02 dB', () => {
    // rho 0.5 grows to 1 at 3.01 dB
    expect(swrAtLoad(3, 3.02)).toBeNull();
    expect(handbookTotalLossDb(1, 1)).toBeNull();
  });

  it('is the same by the general formula where the impedance of the line is real', () => {
    const line = lineOf(section(realCable(50, 0.66, 2, 10), 100 * FOOT));
    for (const degrees of [0, 40, 130, 270]) {
      const angle = (degrees * Math.PI) / 180;
      const load = { re: rhoOf(8) * Math.cos(angle), im: rhoOf(8) * Math.sin(angle) };
      expect(lossThroughLine(line, 10e6, load, 50).totalLossDb).toBeCloseTo(4.836739275, 8);
    }
  });
});

describe('a lossy line of real impedance', () => {
  // T1 (recomputed; cross-checked with a general-purpose network library) and T4 (recomputed)
  it.each([
    [50, 0.66, 2.5, 28.5, 100, [100, 50], [39.096155732006, 20.224400734351], 3.18535776385],
    [450, 0.91, 0.08, 10, 66, [35, -900], [11.314412312028, 181.68991386191], 1.43432623411],
  ])(
    'of %d ohm, VF %d, %d dB per 100 ft at %d MHz, %d ft long',
    (ohm, vf, db, mhz, feet, load, zin, loss) => {
      const line = lineOf(section(realCable(ohm, vf, db, mhz), feet * FOOT));
      const z = { re: load[0], im: load[1] };
      const sweep = impedanceSweep(Float64Array.of(mhz * 1e6), () => z);
      const input = impedanceOf(accepted(fromFeedPoint(sweep, line)), 0);
      expect(input.re).toBeCloseTo(zin[0], 8);
      expect(input.im).toBeCloseTo(zin[1], 7);
      const through = lossThroughLine(line, mhz * 1e6, reflectionOf(z, 50), 50);
      expect(through.totalLossDb).toBeCloseTo(loss, 9);
    },
  );
});

describe('a short line whose loss is in its conductors', () => {
  // 15 ft, VF 0.66, 0.055 dB at 3.8 MHz before 100 + j100 ohm: the sign is confirmed by a posted
  // calculation that was read (0.025 dB with undisclosed cable data); the value is recomputed
  it('can lose less with the mismatch than when matched', () => {
    const db = (0.055 / (15 * FOOT)) * 100;
    const cable = exactCable({ k1: db / Math.sqrt(3.8) });
    const line = lineOf(section(cable, 15 * FOOT));
    const { totalLossDb } = lossThroughLine(
      line,
      3.8e6,
      reflectionOf({ re: 100, im: 100 }, 50),
      50,
    );
    expect(totalLossDb).toBeCloseTo(0.0184831435, 7);
    expect(handbookTotalLossDb(0.055, rhoOf(4.26556443707))).toBeCloseTo(0.1223615205, 8);
  });
});

describe('the loss law k1 sqrt(f) + k2 f', () => {
  const perFoot = (db: number) => db / FOOT;
  const fitOf = (at30: number, at150: number) =>
    accepted(
      fitAttenuation([
        { frequencyHz: 30e6, lossDbPer100M: perFoot(at30) },
        { frequencyHz: 150e6, lossDbPer100M: perFoot(at150) },
      ]),
    );

  it.each([
    // 30 and 150 MHz, dB per 100 ft, read in: a national amateur association's table; k1, k2 recomputed
    ['RG-58', 2.47, 5.63, 0.443896, 0.00128937],
    ['RG-213', 1.08, 2.53, 0.18958061, 0.00138747],
    ['RG-174', 4.56, 10.3, 0.8256995, 0.00124858],
    ['RG-59', 1.79, 4.11, 0.31971085, 0.00129572],
    ['RG-8X', 1.96, 4.53, 0.34811491, 0.00177654],
  ])('through two printed points of %s', (_, at30, at150, k1, k2) => {
    const fit = fitOf(at30, at150);
    expect(fit.conductorDbPer100M * FOOT).toBeCloseTo(k1, 5);
    expect(fit.dielectricDbPer100M * FOOT).toBeCloseTo(k2, 7);
  });

  it('gives 4.566 dB per 100 ft at 100 MHz for a published pair of constants', () => {
    // k1 0.444, k2 0.00126: read, and recomputed
    const fit = { ...fitOf(2.47, 5.63), conductorDbPer100M: 0.444, dielectricDbPer100M: 0.00126 };
    expect(attenuationDbPer100M(fit, 100e6)).toBeCloseTo(4.566, 3);
  });
});

describe('the built-in military cables', () => {
  it.each([
    // dB per 100 ft; sources as in the table of cables, MIL-DTL-17 types, nominal +-15 %
    ['m17-28-rg58', 10, 1.4],
    ['m17-28-rg58', 30, 2.47],
    ['m17-28-rg58', 150, 5.63],
    ['m17-74-rg213', 30, 1.08],
    ['m17-74-rg213', 50, 1.5],
    ['m17-74-rg213', 150, 2.53],
    ['m17-74-rg213', 432, 4.5], // measured by return loss, posted; read
    ['m17-84-rg223', 10, 1.2],
    ['m17-119-rg174', 30, 4.56],
    ['m17-119-rg174', 150, 10.3],
    ['m17-6-rg11', 10, 0.7],
    ['m17-60-rg142', 100, 3.9],
  ])('%s at %d MHz loses %d dB per 100 ft within 15 per cent', (id, mhz, db) => {
    const cable = findCable(id);
    expect(cable).not.toBeNull();
    if (cable === null) return;
    const fitted = attenuationDbPer100M(cable.attenuation, mhz * 1e6) * FOOT;
    expect(Math.abs(fitted / db - 1)).toBeLessThan(0.15);
  });

  it.each([
    // MIL-C-17/28 and /74 limits at 1 GHz, dB per 100 ft, read in: a posted summary, 2004
    ['m17-28-rg58', 28],
    ['m17-74-rg213', 9],
  ])('%s stays below its specified limit at 1 GHz', (id, limit) => {
    const cable = findCable(id);
    expect(cable).not.toBeNull();
    if (cable === null) return;
    expect(attenuationDbPer100M(cable.attenuation, 1e9) * FOOT).toBeLessThan(limit);
  });

  it.each([
    // Z0 = 101 670/(VF% C[pF/ft]), MIL-DTL-28830E para. 4.7.10.2 (read); C of the sheets
    ['m17-28-rg58', 30.8],
    ['m17-74-rg213', 30.8],
    ['m17-60-rg142', 29.4],
    ['m17-119-rg174', 30.8],
    ['m17-84-rg223', 30.8],
    ['m17-6-rg11', 20.6],
    ['rg8x-foam', 25.3],
    ['half-inch-foam', 23.1],
  ])('%s has the impedance of its velocity factor and capacitance', (id, picofaradPerFoot) => {
    const cable = findCable(id);
    expect(cable).not.toBeNull();
    if (cable === null) return;
    const ohm = 101_670 / (100 * cable.velocityFactor * picofaradPerFoot);
    expect(Math.abs(ohm - cable.characteristicOhm)).toBeLessThan(0.5);
  });
});

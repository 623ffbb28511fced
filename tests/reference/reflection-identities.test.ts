import { describe, expect, it } from 'vitest';
import { impedanceOf, reflectionOf } from '../../core/network/impedance.ts';
import { renormalise } from '../../core/network/renormalise.ts';
import {
  magnitudeOfReturnLoss,
  mismatchLossDb,
  returnLossDb,
} from '../../core/network/return-loss.ts';
import { magnitudeOfSwr, swrOf } from '../../core/network/swr.ts';

function relative(actual: number | null | undefined, expected: number): number {
  return Math.abs((actual ?? Number.NaN) - expected) / Math.max(1, Math.abs(expected));
}

// Values recomputed in 25 to 40 digits from the textbook formulas (for instance D. M. Pozar,
// Microwave Engineering, sections 2.3 and 2.7); 100 + j50 also with a general-purpose network library.
const loads: readonly (readonly number[])[] = [
  // R, X, Z0 ohm; Γ re, im; SWR; return loss dB; mismatch loss dB
  [25, 0, 50, -1 / 3, 0, 2, 9.54242509439, 0.511525224474],
  [75, 0, 50, 0.2, 0, 1.5, 13.9794000867, 0.177287669604],
  [100, 50, 50, 0.4, 0.2, 2.61803398875, 6.98970004336, 0.969100130081],
  [50, 50, 50, 0.2, 0.4, 2.61803398875, 6.98970004336, 0.969100130081],
  [73.13, 42.5, 50, 0.274307725197, 0.250482593025, 2.18200267024, 8.60164164209, 0.644858104636],
  [73.13, 42.5, 75, 0.0643927406545, 0.268435215839, 1.76262371623, 11.1802285769, 0.344238709213],
  [37.5, 12.5, 50, -0.12, 0.16, 1.5, 13.9794000867, 0.177287669604],
  [10, -200, 50, 0.862385321101, -0.45871559633, 85.1882612935, 0.203931586418, 13.384564936],
];

describe('a load', () => {
  it.each(loads)(
    'of %d + j%d ohm at %d ohm has the handbook figures',
    (r, x, z0, re, im, swr, returnLoss, mismatchLoss) => {
      const reflection = reflectionOf({ resistanceOhm: r, reactanceOhm: x }, z0);
      expect(relative(reflection?.re, re)).toBeLessThan(1e-11);
      expect(relative(reflection?.im, im)).toBeLessThan(1e-11);
      const magnitude = Math.hypot(reflection?.re ?? Number.NaN, reflection?.im ?? Number.NaN);
      expect(relative(swrOf(magnitude), swr)).toBeLessThan(1e-10);
      expect(relative(returnLossDb(magnitude), returnLoss)).toBeLessThan(1e-10);
      expect(relative(mismatchLossDb(magnitude), mismatchLoss)).toBeLessThan(1e-10);
      const back = impedanceOf({ re, im }, z0);
      expect(relative(back?.resistanceOhm, r)).toBeLessThan(1e-8);
      expect(relative(back?.reactanceOhm, x)).toBeLessThan(1e-8);
    },
  );

  it.each(loads)('of %d + j%d ohm at %d ohm has an SWR of F + sqrt(F² - 1)', (r, x, z0, re, im) => {
    // F = (R² + X² + Z0²)/(2 R Z0) = (SWR + 1/SWR)/2.
    const f = (r * r + x * x + z0 * z0) / (2 * r * z0);
    expect(relative(swrOf(Math.hypot(re, im)), f + Math.sqrt(f * f - 1))).toBeLessThan(1e-8);
  });

  it('without resistance reflects all: no SWR, no return loss', () => {
    const reflection = reflectionOf({ resistanceOhm: 0, reactanceOhm: 30 }, 50);
    expect(reflection?.re).toBeCloseTo(-0.470588235294, 11);
    expect(reflection?.im).toBeCloseTo(0.882352941176, 11);
    expect(swrOf(1)).toBeNull();
    expect(mismatchLossDb(1)).toBeNull();
    expect(returnLossDb(1)).toBeCloseTo(0, 12);
  });
});

// The usual conversion table of handbooks; values recomputed from the formulas.
describe('the conversion table', () => {
  it.each([
    [1.1, 26.4443858947, 0.00985912982],
    [1.2, 20.8278537032, 0.0360412427],
    [1.5, 13.9794000867, 0.17728767],
    [2, 9.54242509439, 0.511525224],
    [3, 6.02059991328, 1.24938736608],
    [5, 3.52182518111, 2.55272505103],
    [10, 1.74300351438, 4.80725378988],
  ])('gives SWR %d a return loss of %d dB and a mismatch loss of %d dB', (swr, loss, mismatch) => {
    const magnitude = magnitudeOfSwr(swr) ?? Number.NaN;
    expect(relative(returnLossDb(magnitude), loss)).toBeLessThan(1e-10);
    expect(relative(mismatchLossDb(magnitude), mismatch)).toBeLessThan(1e-9);
    // T. S. Bird, "Definition and misuse of return loss", IEEE Antennas and Propagation Magazine
    // 51(2), 2009: 20 log10 ((SWR + 1)/(SWR - 1)).
    expect(20 * Math.log10((swr + 1) / (swr - 1))).toBeCloseTo(loss, 8);
  });

  it.each([
    [20, 1.22222222],
    [30, 1.06531086407],
    [40, 1.0202020202],
  ])('gives %d dB an SWR of %d', (loss, swr) => {
    expect(swrOf(magnitudeOfReturnLoss(loss))).toBeCloseTo(swr, 8);
  });
});

describe('a change of reference', () => {
  it('moves 0.2 + j0.3 from 50 to 75 ohm', () => {
    // Recomputed from the formula, also with a general-purpose network library.
    const impedance = impedanceOf({ re: 0.2, im: 0.3 }, 50);
    expect(impedance?.resistanceOhm).toBeCloseTo(59.5890410959, 10);
    expect(impedance?.reactanceOhm).toBeCloseTo(41.095890411, 10);
    const moved = renormalise({ re: 0.2, im: 0.3 }, 50, 75);
    expect(moved?.re).toBeCloseTo(-0.0194552529183, 12);
    expect(moved?.im).toBeCloseTo(0.311284046693, 12);
  });
});

// J. Bird, Electrical Circuit Theory and Technology, problems 44.16 and 44.17.
describe('worked examples of a textbook', () => {
  it('400 + j250 ohm on a line of 600 ohm', () => {
    const reflection = reflectionOf({ resistanceOhm: 400, reactanceOhm: 250 }, 600);
    const magnitude = Math.hypot(reflection?.re ?? Number.NaN, reflection?.im ?? Number.NaN);
    expect(magnitude).toBeCloseTo(0.310597147822, 11);
    expect(swrOf(magnitude)).toBeCloseTo(1.90106139492, 10);
  });

  it('0.2 at -120 degrees on a line of 80 ohm, as the reflection of the current', () => {
    const angle = (-120 * Math.PI) / 180;
    expect(swrOf(0.2)).toBeCloseTo(1.5, 14);
    // The book reflects currents, (Z0 - Z)/(Z0 + Z): the voltage's reflection is its negative.
    const load = impedanceOf({ re: -0.2 * Math.cos(angle), im: -0.2 * Math.sin(angle) }, 80);
    expect(load?.resistanceOhm).toBeCloseTo(91.4286, 4);
    expect(load?.reactanceOhm).toBeCloseTo(32.9914, 4);
  });
});

import { describe, expect, it } from 'vitest';
import { dipoleImpedance } from '../../server/demo/models/induced-emf.ts';
import {
  coil,
  inParallel,
  inSeries,
  parallelResonator,
  reflectionOf,
  seriesResonator,
  throughLine,
} from '../../server/demo/models/lumped.ts';
import { sineIntegrals } from '../../server/demo/models/sine-integrals.ts';
import { bisect, trueAnswers } from '../accuracy/true-answers.ts';

const LIGHT_M_PER_S = 299_792_458;

/** A dipole measured in wavelengths. */
function inWavelengths(length: number, radius: number) {
  return dipoleImpedance(LIGHT_M_PER_S, { lengthM: length, radiusM: radius });
}

describe('the sine and cosine integrals', () => {
  // Computed with 30 digits by mpmath (python3-mpmath); 1, 2 and 10 agree with Abramowitz & Stegun,
  // Handbook of Mathematical Functions, Table 5.1 (value from memory).
  it.each([
    [0.001, 0.0009999999444444462, -6.330539864080594],
    [0.5, 0.4931074180430667, -0.1777840788066129],
    [1, 0.946083070367183, 0.33740392290096816],
    [2, 1.6054129768026948, 0.422980828774865],
    [3.9, 1.7765013604478055, -0.12349934920781515],
    [4, 1.7582031389490531, -0.1409816978869304],
    [4.1, 1.7387436264917688, -0.15616539182812111],
    [6.5, 1.4217942744358818, 0.011101519514930108],
    [10, 1.6583475942188741, -0.04545643300445537],
    [20, 1.54824170104344, 0.044419820845353314],
    [50, 1.551617072485936, -0.005628386324116306],
  ])('at %d agree with multiple-precision values', (x, si, ci) => {
    const found = sineIntegrals(x);
    expect(Math.abs(found.si - si)).toBeLessThan(1e-14);
    expect(Math.abs(found.ci - ci)).toBeLessThan(1e-14);
  });

  it('refuse an argument that is not positive', () => {
    expect(() => sineIntegrals(0)).toThrow(RangeError);
    expect(() => sineIntegrals(Number.NaN)).toThrow(RangeError);
  });
});

describe('the induced-EMF dipole', () => {
  it('of half a wavelength shows 73 + j42.5 ohm whatever its radius', () => {
    // S. J. Orfanidis, Electromagnetic Waves and Antennas: 73.079 + j42.515. C. A. Balanis, Antenna
    // Theory: 73.13 + j42.5 with 120 pi for the impedance of space (value from memory). Closed form:
    // R = eta/(4 pi) Cin(2 pi), X = eta/(4 pi) Si(2 pi), recomputed to 15 digits.
    for (const radius of [1e-5, 1e-3]) {
      const z = inWavelengths(0.5, radius);
      expect(z.re).toBeCloseTo(73.079010236, 8);
      expect(z.im).toBeCloseTo(42.5151146769, 8);
    }
  });

  // Formula of C. A. Balanis, Antenna Theory, ch. 8, recomputed with 25 digits (mpmath).
  it.each([
    [0.1, 1e-4, 1.998852784, -1920.236828],
    [0.25, 1e-3, 13.43119097, -446.6778917],
    [0.4, 1e-4, 39.91574735, -231.1249096],
    [0.47, 1e-3, 61.19374618, -13.94998603],
    [0.48, 1e-3, 64.93697252, 4.655666415],
    [0.6, 1e-4, 132.3760984, 345.6848373],
  ])('of %d wavelengths and radius %d agrees with the tabled formula', (length, radius, r, x) => {
    const z = inWavelengths(length, radius);
    expect(z.re / r).toBeCloseTo(1, 8);
    expect(z.im / x).toBeCloseTo(1, 8);
  });

  // Zeros of the formula's reactance, recomputed; they bracket the handbooks' "0.47 to 0.48
  // wavelengths" (value from memory).
  it.each([
    [1e-6, 0.490570752617, 69.126],
    [1e-4, 0.484632279689, 66.742],
    [1e-3, 0.47750719939, 63.984],
    [5e-3, 0.466527018607, 59.941],
  ])('with radius %d is resonant at %d wavelengths', (radius, length, r) => {
    const found = bisect((l) => inWavelengths(l, radius).im, 0.4, 0.5);
    expect(found).toBeCloseTo(length, 11);
    expect(inWavelengths(found, radius).re).toBeCloseTo(r, 3);
  });

  it('that is short has the resistance and reactance of the short-dipole formulas', () => {
    // R = 20 pi^2 (l/lambda)^2, X = -120 (ln(l/2a) - 1)/tan(pi l/lambda) (C. A. Balanis, Antenna
    // Theory, value from memory); the two models differ by 0.3 % at l = 0.05 wavelengths.
    const z = inWavelengths(0.05, 1e-4);
    expect(z.re / (20 * Math.PI ** 2 * 0.05 ** 2)).toBeCloseTo(1, 2);
    const shortForm = (-120 * (Math.log(0.05 / 2e-4) - 1)) / Math.tan(Math.PI * 0.05);
    expect(z.im / shortForm).toBeCloseTo(1, 2);
  });
});

describe('a wire dipole of 10 m length and 1 mm radius', () => {
  const curve = (f: number) => dipoleImpedance(f, { lengthM: 10, radiusM: 1e-3 });

  // Recomputed with 25 digits (mpmath) from the induced-EMF formula, CODATA 2022 constants.
  it('is resonant at 14.57036522 MHz with 67.29 ohm', () => {
    const { resonances } = trueAnswers(curve, 50, 13e6, 16e6, []);
    expect(resonances).toHaveLength(1);
    expect(resonances[0].kind).toBe('series');
    expect(resonances[0].frequencyHz / 1e6).toBeCloseTo(14.57036522, 8);
    expect(curve(resonances[0].frequencyHz).re).toBeCloseTo(67.2903409, 6);
  });

  it.each([
    [50, 14.55121612, 1.34325502],
    [75, 14.58074729, 1.11342827],
    [100, 14.62231767, 1.47848931],
  ])('has its SWR minimum against %d ohm elsewhere: at %d MHz', (referenceOhm, mhz, swr) => {
    const { minima } = trueAnswers(curve, referenceOhm, 13e6, 16e6, []);
    expect(minima).toHaveLength(1);
    expect(minima[0].frequencyHz / 1e6).toBeCloseTo(mhz, 8);
    expect(minima[0].swr).toBeCloseTo(swr, 8);
  });

  it('stays below 2:1 against 50 ohm from 14.19991877 to 14.92770758 MHz', () => {
    const { edges } = trueAnswers(curve, 50, 13e6, 16e6, [2]);
    expect(edges.map((edge) => edge.side)).toEqual(['low', 'high']);
    expect(edges[0].frequencyHz / 1e6).toBeCloseTo(14.19991877, 8);
    expect(edges[1].frequencyHz / 1e6).toBeCloseTo(14.92770758, 8);
  });

  it('shortens its frequency by 0.9965 % for each per cent of length', () => {
    // Elasticity -0.99642638 from the same formula, recomputed (mpmath): 14.4266165167 MHz at 10.1 m.
    const longer = (f: number) => dipoleImpedance(f, { lengthM: 10.1, radiusM: 1e-3 });
    const { resonances } = trueAnswers(longer, 50, 13e6, 16e6, []);
    expect(resonances[0].frequencyHz / 1e6).toBeCloseTo(14.4266165167, 9);
  });
});

describe('a short dipole with a loading coil', () => {
  it('of 10 m is brought to 3.65 MHz by 97.47 uH', () => {
    // The reactance of the induced-EMF formula at 3.65 MHz, recomputed (mpmath).
    const wire = dipoleImpedance(3.65e6, { lengthM: 10, radiusM: 1e-3 });
    expect(-wire.im / (2 * Math.PI * 3.65e6)).toBeCloseTo(97.47181742e-6, 13);
    const loaded = inSeries(wire, coil(3.65e6, 97.47181742e-6, 200));
    expect(loaded.im).toBeCloseTo(0, 4);
    expect(loaded.re - wire.re).toBeCloseTo(-wire.im / 200, 6);
  });
});

describe('lumped circuits and lines', () => {
  it('give a series resonator of Q 10 its 2:1 edges at 6.85341320683 and 7.35545902147 MHz', () => {
    // u = sqrt(1 + k^2/4) -+ k/2, k = (s - 1)/(Q sqrt s): exact for R = Z0 (H. F. Pues, A. R. Van de
    // Capelle, IEEE Trans. AP-37, 1989, value from memory; recomputed).
    const curve = (f: number) =>
      seriesResonator(f, { resistanceOhm: 50, resonanceHz: 7.1e6, q: 10 });
    const { edges, minima } = trueAnswers(curve, 50, 6e6, 8e6, [2]);
    expect(edges[0].frequencyHz / 1e6).toBeCloseTo(6.85341320683, 10);
    expect(edges[1].frequencyHz / 1e6).toBeCloseTo(7.35545902147, 10);
    expect(minima[0].frequencyHz / 1e6).toBeCloseTo(7.1, 9);
  });

  it('put the SWR minimum 0.2 MHz above the resonance where resistance rises with frequency', () => {
    // Z = 28.125 + (f - 7)(46.875 + j62.5), MHz and ohm: X = 0 at 7.0 with SWR 16/9, minimum at 7.2
    // with SWR 1.5 exactly, 2:1 edges 7.264 -+ 0.064 sqrt 26 (own derivation, exact algebra).
    const curve = (f: number) => ({
      re: 28.125 + (f / 1e6 - 7) * 46.875,
      im: (f / 1e6 - 7) * 62.5,
    });
    const { resonances, minima, edges } = trueAnswers(curve, 50, 6.85e6, 7.8e6, [2]);
    const stepHz = 0.95e6 / 1600;
    expect(Math.abs(resonances[0].frequencyHz - 7e6) / stepHz).toBeLessThan(1e-9);
    expect(Math.abs(minima[0].frequencyHz - 7.2e6) / stepHz).toBeLessThan(1e-7);
    expect(minima[0].swr).toBeCloseTo(1.5, 12);
    expect(edges[0].frequencyHz / 1e6).toBeCloseTo(7.264 - 0.064 * Math.sqrt(26), 12);
    expect(edges[1].frequencyHz / 1e6).toBeCloseTo(7.264 + 0.064 * Math.sqrt(26), 12);
  });

  it('turn 25 ohm into 40 + j30 through an eighth of a wavelength of lossless 50 ohm line', () => {
    // Zin = Z0 (ZL + j Z0)/(Z0 + j ZL) (transmission-line theory, exact).
    const frequencyHz = 7e6;
    const z = throughLine({ re: 25, im: 0 }, frequencyHz, {
      characteristicOhm: 50,
      lengthM: LIGHT_M_PER_S / frequencyHz / 8,
      velocityFactor: 1,
      lossDbAt1Mhz: 0,
    });
    expect(z.re).toBeCloseTo(40, 9);
    expect(z.im).toBeCloseTo(30, 9);
  });

  it('make a lossy matched line show its own characteristic impedance', () => {
    // Z0 = R0 (1 - j alpha/beta): 0.055 dB over 15 ft, VF 0.66, 3.8 MHz -> 50 - j0.5739 (own
    // computation from R, L and C).
    const line = {
      characteristicOhm: 50,
      lengthM: 15 * 0.3048,
      velocityFactor: 0.66,
      lossDbAt1Mhz: 0.055 / Math.sqrt(3.8),
    };
    const own = { re: 50, im: -0.573869758 };
    const z = throughLine(own, 3.8e6, line);
    expect(z.re).toBeCloseTo(own.re, 8);
    expect(z.im).toBeCloseTo(own.im, 7);
  });

  it('lower the reflection of a short by twice the loss of the line', () => {
    // |reflection| = 10^(-2 L/20) for real characteristic impedance (transmission-line theory); the
    // small imaginary part of Z0 costs the rest.
    const z = throughLine({ re: 0, im: 0 }, 100e6, {
      characteristicOhm: 50,
      lengthM: 30,
      velocityFactor: 0.66,
      lossDbAt1Mhz: 0.3,
    });
    const { re, im } = reflectionOf(z, 50);
    expect(-20 * Math.log10(Math.hypot(re, im))).toBeCloseTo(6, 1);
  });

  it('make a trap look like its resistance at resonance and like a coil below', () => {
    const trap = { resistanceOhm: 9000, resonanceHz: 14.1e6, q: 90 };
    expect(parallelResonator(14.1e6, trap)).toEqual({ re: 9000, im: 0 });
    expect(parallelResonator(13e6, trap).im).toBeGreaterThan(0);
    expect(parallelResonator(15e6, trap).im).toBeLessThan(0);
  });

  it('halve two equal impedances side by side', () => {
    const both = inParallel({ re: 100, im: 40 }, { re: 100, im: 40 });
    expect(both.re).toBeCloseTo(50, 12);
    expect(both.im).toBeCloseTo(20, 12);
  });
});

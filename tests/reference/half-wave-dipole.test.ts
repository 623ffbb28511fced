import { describe, expect, it } from 'vitest';
import { dipoleImpedance } from '../../server/demo/models/induced-emf.ts';
import { evenly, summaryOfFile, touchstoneFile } from './summary-of-file.ts';

const lightMPerS = 299_792_458;

/** A file of an induced-EMF dipole over a grid. */
function dipoleFile(
  lengthM: number,
  radiusM: number,
  frequenciesHz: readonly number[],
  referenceOhm = 50,
): Uint8Array {
  const impedanceAt = (hz: number) => dipoleImpedance(hz, { lengthM, radiusM });
  return touchstoneFile(impedanceAt, frequenciesHz, referenceOhm);
}

describe('a dipole of exactly half a wavelength', () => {
  // C. A. Balanis, Antenna Theory, ch. 8: 73.1 + j42.5 ohm (value from memory). With the impedance
  // of free space as 376.73 ohm instead of 120 pi it is 73.079 + j42.515 (S. J. Orfanidis,
  // Electromagnetic Waves and Antennas, toolbox notes): hence 0.06 and 0.04 ohm.
  it('reads as 73.1 + j42.5 ohm, whatever its thickness', () => {
    const halfWaveHz = lightMPerS / 2 / 10;
    for (const radiusM of [0.0001, 0.001, 0.01]) {
      const { minimumSwr } = summaryOfFile(dipoleFile(10, radiusM, [halfWaveHz]));
      expect(Math.abs((minimumSwr?.resistanceOhm ?? 0) - 73.1)).toBeLessThan(0.06);
      expect(Math.abs((minimumSwr?.reactanceOhm ?? 0) - 42.5)).toBeLessThan(0.04);
    }
  });

  // SWR of 73.13 + j42.5 ohm against 50 ohm is 2.18200 (identity, recomputed).
  it('has an SWR of 2.18 against 50 ohm and is not resonant', () => {
    const { minimumSwr, resonances } = summaryOfFile(dipoleFile(10, 0.001, [lightMPerS / 2 / 10]));
    expect(minimumSwr?.swr).toBeCloseTo(2.182, 2);
    expect(resonances).toEqual([]);
  });
});

describe('a dipole near half a wavelength, swept', () => {
  // Induced EMF, l = 10 m, a = 1 mm, evaluated with 25 digits: resonance 14.57036522 MHz with
  // 67.2903409 ohm and Q 11.05548655; least SWR 1.34325502 at 14.55121612 MHz against 50 ohm;
  // 2:1 edges 14.19991877 and 14.92770758 MHz (recomputed from Balanis's formula).
  const swept = (referenceOhm: number) =>
    summaryOfFile(dipoleFile(10, 0.001, evenly(13_800_000, 15_300_000, 301), referenceOhm));

  it('is resonant a little short of half a wavelength', () => {
    const { resonances } = swept(50);
    expect(resonances).toHaveLength(1);
    const [resonance] = resonances;
    expect(resonance.kind).toBe('series');
    expect(Math.abs(resonance.frequencyHz - 14_570_365.22)).toBeLessThan(50);
    expect(resonance.resistanceOhm).toBeCloseTo(67.29, 2);
    expect(resonance.q).toBeCloseTo(11.055, 1);
    // Balanis, Antenna Theory: thin dipoles resonate at 0.47 to 0.48 wavelengths (from memory);
    // this thinner one (a = 5e-5 wavelengths) at 0.486.
    expect((10 * resonance.frequencyHz) / lightMPerS).toBeCloseTo(0.486, 3);
  });

  // The same model against three references (recomputed): the least SWR moves, the resonance stays.
  it.each([
    [50, 14_551_216.12, 1.34325502],
    [75, 14_580_747.29, 1.11342827],
    [100, 14_622_317.67, 1.47848931],
  ])('has its least SWR against %i ohm at %f Hz', (referenceOhm, frequencyHz, swr) => {
    const { minimumSwr, resonances } = swept(referenceOhm);
    expect(Math.abs((minimumSwr?.frequencyHz ?? 0) - frequencyHz)).toBeLessThan(200);
    expect(minimumSwr?.swr).toBeCloseTo(swr, 4);
    expect(minimumSwr?.atEdge).toBe(false);
    expect(Math.abs(resonances[0].frequencyHz - 14_570_365.22)).toBeLessThan(50);
  });

  it('is usable at 2:1 between the edges that follow from the formula', () => {
    const [span, ...others] = swept(50).spans;
    expect(others).toEqual([]);
    expect(Math.abs(span.lowHz - 14_199_918.77)).toBeLessThan(50);
    expect(Math.abs(span.highHz - 14_927_707.58)).toBeLessThan(50);
    expect([span.lowOpen, span.highOpen]).toEqual([false, false]);
  });
});

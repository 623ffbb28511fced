import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { dipoleImpedance } from '../../server/demo/models/induced-emf.ts';
import { addAntenna, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';
import { evenly, touchstoneFile } from './summary-of-file.ts';

const lightMPerS = 299_792_458;
const lengthM = 10;
const halfWaveHz = lightMPerS / 2 / lengthM;

let club: TestApp;
beforeAll(async () => {
  club = await makeTestApp();
  await addAntenna(club);
});
afterAll(() => club.close());

async function summaryOf(frequenciesHz: readonly number[], radiusM: number) {
  const impedanceAt = (hz: number) => dipoleImpedance(hz, { lengthM, radiusM });
  const file = Buffer.from(touchstoneFile(impedanceAt, frequenciesHz, 50));
  const { id } = (await upload(club, file)).json();
  return (await club.call({ url: `/v1/sweeps/${id}/summary` })).json();
}

describe('a half-wave dipole put through the whole service', () => {
  // C. A. Balanis, Antenna Theory, ch. 8: 73.1 + j42.5 ohm (value from memory); 73.079 + j42.515
  // with the impedance of free space as 376.73 ohm (S. J. Orfanidis, Electromagnetic Waves and
  // Antennas, toolbox notes).
  it('is answered as 73.1 + j42.5 ohm at exactly half a wavelength', async () => {
    const { minimum_swr, resonances } = await summaryOf([halfWaveHz], 0.001);
    expect(Math.abs(minimum_swr.resistance_ohm - 73.1)).toBeLessThan(0.06);
    expect(Math.abs(minimum_swr.reactance_ohm - 42.5)).toBeLessThan(0.04);
    expect(resonances).toEqual([]);
  });

  // Induced EMF, l = 10 m, a = 1 mm, evaluated with 25 digits (recomputed from Balanis's formula).
  it('is answered with its resonance and, elsewhere, its least SWR', async () => {
    const summary = await summaryOf(evenly(13_800_000, 15_300_000, 301), 0.001);
    expect(summary.resonances).toHaveLength(1);
    expect(Math.abs(summary.resonances[0].frequency_hz - 14_570_365.22)).toBeLessThan(50);
    expect(Math.abs(summary.minimum_swr.frequency_hz - 14_551_216.12)).toBeLessThan(500);
    expect(summary.minimum_swr.swr).toBeCloseTo(1.343255, 4);
    expect(summary.resonance_offset_hz).toBeCloseTo(
      summary.minimum_swr.frequency_hz - summary.resonances[0].frequency_hz,
      3,
    );
  });
});

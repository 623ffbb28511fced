import { dipoleImpedance } from '../../../server/demo/models/induced-emf.ts';
import type { AntennaFamily } from './antenna-model.ts';

const LIGHT_M_PER_S = 299_792_458;

/** A wire or tube dipole near half a wavelength with some loss. Parameters length, radius, loss ohm. */
export const dipole: AntennaFamily = {
  name: 'dipole',
  scales: ([length, radius]) => [0.1 * length, radius, 10],
  impedance(frequencyHz, [lengthM, radiusM, lossOhm]) {
    const z = dipoleImpedance(frequencyHz, { lengthM, radiusM });
    return { re: z.re + lossOhm, im: z.im };
  },
  draw(random) {
    const lengthM = random.logUniform(0.3, 80);
    const halfWaveHz = LIGHT_M_PER_S / (2 * lengthM);
    const radiusM = 2 * lengthM * random.logUniform(1e-6, 3e-3);
    return {
      family: dipole,
      parameters: [lengthM, radiusM, random.uniform(0.2, 15)],
      nominalHz: 0.96 * halfWaveHz,
      bandwidthHz: 0.1 * halfWaveHz,
      validHz: [0.4 * halfWaveHz, 1.6 * halfWaveHz],
    };
  },
};

import { divide, inSeries, seriesResonator } from '../../../server/demo/models/lumped.ts';
import type { AntennaFamily } from './antenna-model.ts';

/**
 * Two magnetically coupled series resonators, fed at the first: Z = Z1 + (w M)^2/Z2 with
 * (w M)^2 = k^2 wL1 wL2 (circuit theory; the second resistance cancels).
 * Parameters R1, f1, Q1, f2, Q2, k.
 */
export const coupledResonators: AntennaFamily = {
  name: 'coupled_resonators',
  scales: ([resistance, f1, q1, f2, q2, k]) => [resistance, f1 / q1, q1, f2 / q2, q2, k],
  impedance(frequencyHz, [resistanceOhm, f1, q1, f2, q2, k]) {
    const first = seriesResonator(frequencyHz, { resistanceOhm, resonanceHz: f1, q: q1 });
    const second = seriesResonator(frequencyHz, { resistanceOhm: 1, resonanceHz: f2, q: q2 });
    const mutual = k * k * resistanceOhm * q1 * q2 * (frequencyHz / f1) * (frequencyHz / f2);
    return inSeries(first, divide({ re: mutual, im: 0 }, second));
  },
  draw(random) {
    const f1 = random.logUniform(1.8e6, 450e6);
    const q1 = random.logUniform(5, 200);
    const q2 = Math.min(200, q1 * random.logUniform(0.7, 3));
    const f2 = f1 * (1 + random.uniform(-1.2, 1.2) / q1);
    return {
      family: coupledResonators,
      parameters: [
        random.logUniform(12, 60),
        f1,
        q1,
        f2,
        q2,
        random.logUniform(0.3, 2.5) / Math.sqrt(q1 * q2),
      ],
      nominalHz: f1,
      bandwidthHz: f1 / q1,
      validHz: [0.5 * f1, 1.7 * f1],
    };
  },
};

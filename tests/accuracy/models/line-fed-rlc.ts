import {
  capacitor,
  inParallel,
  seriesResonator,
  throughLine,
} from '../../../server/demo/models/lumped.ts';
import type { AntennaFamily } from './antenna-model.ts';

const VELOCITY_FACTOR = 0.66;
const LIGHT_M_PER_S = 299_792_458;

/**
 * A series resonator with a stray capacitance across its feed, seen through a lossy line.
 * Parameters R, f0, Q, stray farad, line characteristic ohm, line length metres, line loss dB at 1 MHz.
 */
export const lineFedRlc: AntennaFamily = {
  name: 'line_fed_rlc',
  scales: ([resistance, resonance, q, stray, characteristic, length, loss]) => [
    resistance,
    resonance / q,
    q,
    stray,
    0.3 * characteristic,
    Math.min(length, (0.1 * VELOCITY_FACTOR * LIGHT_M_PER_S) / resonance),
    loss,
  ],
  impedance(
    frequencyHz,
    [resistanceOhm, resonanceHz, q, stray, characteristicOhm, lengthM, lossDbAt1Mhz],
  ) {
    const antenna = inParallel(
      seriesResonator(frequencyHz, { resistanceOhm, resonanceHz, q }),
      capacitor(frequencyHz, stray),
    );
    return throughLine(antenna, frequencyHz, {
      characteristicOhm,
      lengthM,
      velocityFactor: VELOCITY_FACTOR,
      lossDbAt1Mhz,
    });
  },
  draw(random) {
    const resonance = random.logUniform(1.8e6, 450e6);
    const q = random.logUniform(5, 200);
    const resistance = random.logUniform(22, 110);
    const wavelengthM = (VELOCITY_FACTOR * LIGHT_M_PER_S) / resonance;
    const strayOhm = resistance * random.logUniform(2.5, 60);
    const lossDb = random.logUniform(0.05, 3);
    return {
      family: lineFedRlc,
      parameters: [
        resistance,
        resonance,
        q,
        1 / (2 * Math.PI * resonance * strayOhm),
        random.pick([50, 50, 50, 75]),
        wavelengthM * random.logUniform(0.02, 1.5),
        lossDb / Math.sqrt(resonance / 1e6),
      ],
      nominalHz: resonance,
      bandwidthHz: resonance / q,
      validHz: [0.35 * resonance, 2 * resonance],
    };
  },
};

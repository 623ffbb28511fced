import type { AntennaFamily } from './antenna-model.ts';

/**
 * Series R, L and C of which R and L follow powers of frequency:
 * R = R0 u^a, X = R0 Q (u^(1+b) - 1/u), u = f/f0. Parameters R0, a, f0, Q, b.
 */
export const varyingRlc: AntennaFamily = {
  name: 'varying_rlc',
  scales: ([resistance, , resonance, q]) => [resistance, 1, resonance / q, q, 0.3],
  impedance(frequencyHz, [resistance, a, resonance, q, b]) {
    const u = frequencyHz / resonance;
    return {
      re: resistance * u ** a,
      im: resistance * q * (u ** (1 + b) - 1 / u),
    };
  },
  draw(random) {
    const resonance = random.logUniform(1.8e6, 450e6);
    const q = random.logUniform(5, 200);
    return {
      family: varyingRlc,
      parameters: [
        random.logUniform(18, 140),
        random.uniform(-1, 4),
        resonance,
        q,
        random.uniform(-0.3, 0.3),
      ],
      nominalHz: resonance,
      bandwidthHz: resonance / q,
      validHz: [0.35 * resonance, 2 * resonance],
    };
  },
};

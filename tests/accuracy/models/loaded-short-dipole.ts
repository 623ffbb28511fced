import { dipoleImpedance } from '../../../server/demo/models/induced-emf.ts';
import { coil, inParallel, inSeries } from '../../../server/demo/models/lumped.ts';
import type { AntennaFamily } from './antenna-model.ts';

const LIGHT_M_PER_S = 299_792_458;

/**
 * A short dipole brought to resonance by a coil at its centre, with a small shunt coil across the
 * feed that raises its resistance. Parameters length, radius, loading henry, loading coil Q, shunt
 * henry, shunt coil Q.
 */
export const loadedShortDipole: AntennaFamily = {
  name: 'loaded_short_dipole',
  scales: ([length, radius, loading, loadingQ, shunt, shuntQ]) => [
    0.1 * length,
    radius,
    0.1 * loading,
    loadingQ,
    shunt,
    shuntQ,
  ],
  impedance(frequencyHz, [lengthM, radiusM, loadingH, loadingQ, shuntH, shuntQ]) {
    const wire = dipoleImpedance(frequencyHz, { lengthM, radiusM });
    const loaded = inSeries(wire, coil(frequencyHz, loadingH, loadingQ));
    return inParallel(loaded, coil(frequencyHz, shuntH, shuntQ));
  },
  draw(random) {
    const tuned = random.logUniform(1.8e6, 50e6);
    const wavelengthM = LIGHT_M_PER_S / tuned;
    const lengthM = wavelengthM * random.uniform(0.08, 0.38);
    const radiusM = lengthM * random.logUniform(2e-5, 2e-3);
    const wire = dipoleImpedance(tuned, { lengthM, radiusM });
    const loadingQ = random.logUniform(60, 400);
    const resistance = wire.re - wire.im / loadingQ;
    const target = Math.max(random.uniform(32, 80), 1.05 * resistance);
    // An L match: the series arm is left capacitive by as much as the shunt coil takes up.
    const leftOver = Math.sqrt(resistance * (target - resistance));
    const shuntOhm = (resistance * resistance + leftOver * leftOver) / leftOver;
    const omega = 2 * Math.PI * tuned;
    const loadingOhm = -wire.im - leftOver;
    return {
      family: loadedShortDipole,
      parameters: [
        lengthM,
        radiusM,
        loadingOhm / omega,
        loadingQ,
        shuntOhm / omega,
        random.logUniform(100, 400),
      ],
      nominalHz: tuned,
      bandwidthHz: (tuned * resistance) / -wire.im,
      validHz: [0.6 * tuned, 1.4 * tuned],
    };
  },
};

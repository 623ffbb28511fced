import {
  type Impedance,
  inSeries,
  parallelResonator,
  type SeriesResonator,
  throughLine,
} from './lumped.ts';

/** Each arm as a line of the wire's mean characteristic impedance, open at its end. */
export interface TrapDipole {
  readonly innerM: number;
  readonly outerM: number;
  readonly trap: SeriesResonator;
}

/** Mean characteristic impedance of one arm of thin wire, 60 (ln(2l/a) - 1), about; ohm. */
const armOhm = 450;
const openEnd: Impedance = { re: 2e5, im: 0 };

/**
 * Impedance at the centre of a dipole with a trap in each arm, ohm. The loss of the line stands for
 * what the arm radiates (the equivalent-line view of an antenna; common practice, no source).
 */
export function trapDipoleImpedance(frequencyHz: number, dipole: TrapDipole): Impedance {
  const outer = throughLine(openEnd, frequencyHz, armSection(dipole.outerM));
  const trapped = inSeries(outer, parallelResonator(frequencyHz, dipole.trap));
  const arm = throughLine(trapped, frequencyHz, armSection(dipole.innerM));
  return { re: 2 * arm.re, im: 2 * arm.im };
}

function armSection(lengthM: number) {
  return {
    characteristicOhm: armOhm,
    lengthM,
    velocityFactor: 0.97,
    lossDbAt1Mhz: 0.03 * lengthM,
  };
}

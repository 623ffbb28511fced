import type { AntennaKind } from './antenna-kind.ts';

/** Radiators whose current distribution is known from published theory. */
export type RadiatorKind =
  | 'half_wave_dipole'
  | 'half_wave_vertical'
  | 'quarter_wave_over_radials'
  | 'five_eighths_vertical'
  | 'loaded_short_dipole';

/** The feed resistance that theory expects, with where from. */
export interface ExpectedResistance {
  readonly lowOhm: number;
  readonly highOhm: number;
  readonly source: string;
}

/**
 * The radiator that a kind of antenna is, or null where its distribution is not known. A plain
 * `vertical` is taken for a half-wave dipole stood upright: say so beside the answer.
 */
export function radiatorOf(kind: AntennaKind): RadiatorKind | null {
  switch (kind) {
    case 'dipole':
      return 'half_wave_dipole';
    case 'vertical':
      return 'half_wave_vertical';
    case 'vertical_with_radials':
      return 'quarter_wave_over_radials';
    case 'five_eighths_vertical':
      return 'five_eighths_vertical';
    case 'loaded_dipole':
      return 'loaded_short_dipole';
    default:
      return null;
  }
}

/** Height of one arm (or of the vertical) in wavelengths where no length is given. */
export function usualArm(kind: RadiatorKind): number {
  switch (kind) {
    case 'five_eighths_vertical':
      return 0.625;
    case 'loaded_short_dipole':
      return 0.125;
    default:
      return 0.25;
  }
}

/** True for a vertical over radials or ground, whose other half is its image. */
export function isMonopole(kind: RadiatorKind): boolean {
  return kind === 'quarter_wave_over_radials' || kind === 'five_eighths_vertical';
}

/**
 * Feed resistance by sinusoidal-current theory, without loss. Half wave 73.08 ohm, at the shorter
 * length of resonance 60 to 69 (induced EMF, C. A. Balanis, Antenna Theory, ch. 8; recomputed);
 * half of that over a perfect ground; five eighths 106 ohm over perfect ground (the same);
 * short dipole 20 pi^2 (l/lambda)^2. What ground does to them: values from memory.
 */
export function expectedResistance(kind: RadiatorKind, armWavelengths: number): ExpectedResistance {
  switch (kind) {
    case 'half_wave_dipole':
      return {
        lowOhm: 60,
        highOhm: 73.1,
        source:
          'induced EMF, half-wave dipole in free space; below half a wavelength of height the ground makes it about 30 to 100 ohm (value from memory)',
      };
    case 'half_wave_vertical':
      return {
        lowOhm: 60,
        highOhm: 100,
        source:
          'induced EMF, half-wave dipole in free space, 60 to 73 ohm; near ground up to about 100 ohm (value from memory)',
      };
    case 'quarter_wave_over_radials':
      return {
        lowOhm: 22,
        highOhm: 36.5,
        source:
          'induced EMF, quarter wave over perfect ground, 30 to 36.5 ohm; about 22 ohm with raised horizontal radials (value from memory). What is measured above it is mostly loss in ground and radials',
      };
    case 'five_eighths_vertical':
      return {
        lowOhm: 85,
        highOhm: 107,
        source:
          'induced EMF, five eighths of a wavelength over perfect ground, 106 ohm in series with a capacitive reactance; thick or lossy ones differ (value from memory)',
      };
    case 'loaded_short_dipole': {
      const radiation = 20 * Math.PI ** 2 * (2 * armWavelengths) ** 2;
      return {
        lowOhm: radiation,
        highOhm: 4 * radiation,
        source:
          'short dipole with current falling evenly to the ends, 20 pi^2 (l/lambda)^2; up to four times that where loading towards the ends keeps the current up (C. A. Balanis, Antenna Theory; value from memory). Loss of the coils comes on top',
      };
    }
  }
}

/** A measured feed resistance beside the expected one. */
export interface ResistanceComparison {
  readonly standing: 'below' | 'within' | 'above';
  readonly detail: string;
}

/** Says on which side of theory a measured feed resistance lies, and what usually makes it so. */
export function compareResistance(
  kind: RadiatorKind,
  expected: ExpectedResistance,
  measuredOhm: number,
): ResistanceComparison {
  const { lowOhm, highOhm } = expected;
  const said = `Measured are ${measuredOhm.toPrecision(3)} ohm, theory expects ${lowOhm.toPrecision(2)} to ${highOhm.toPrecision(3)} ohm`;
  if (measuredOhm < lowOhm) {
    return {
      standing: 'below',
      detail: `${said}: low height, conductors close by or loading lower it.`,
    };
  }
  if (measuredOhm <= highOhm) return { standing: 'within', detail: `${said}: as it should be.` };
  const cause = isMonopole(kind)
    ? 'most of the rest is loss in ground and radials'
    : 'loss in coils and ground, the height above ground or a longer conductor raise it';
  return { standing: 'above', detail: `${said}: ${cause}.` };
}

import type { Caution } from '../analysis/summary.ts';
import { type Complex, magnitude } from '../line/complex.ts';
import { fail, ok, type Result } from '../result.ts';

/** What a power makes of an impedance. Peak is that of the sine, sqrt(2) times rms. */
export interface FeedPointStress {
  readonly powerW: number;
  readonly currentA: number;
  readonly currentPeakA: number;
  readonly voltageV: number;
  readonly voltagePeakV: number;
}

/** Largest values on a line of real impedance, where it is long enough for them to occur. */
export interface LineStress {
  readonly powerW: number;
  readonly largestVoltageV: number;
  readonly largestVoltagePeakV: number;
  readonly smallestVoltageV: number;
  readonly largestCurrentA: number;
}

export type PowerErrorCode = 'power_not_positive' | 'resistance_not_positive' | 'swr_below_one';

export interface PowerError {
  readonly code: PowerErrorCode;
  readonly detail: string;
}

/** Stands beside every figure of voltage and current; none of them says that anything is safe. */
export const powerCautions: readonly Caution[] = [
  {
    code: 'power_arc',
    detail:
      'Peaks of modulation, wet or sharp ends, thin insulation and height above sea let voltages arc that the figures would not suggest. Parts need ratings well above them.',
  },
  {
    code: 'power_burns',
    detail:
      'Conductors under power burn whoever touches them, at ends and coils from a few watts. Keep people and animals out of reach.',
  },
  {
    code: 'power_exposure_local',
    detail:
      'Limits for the exposure of people to radio-frequency fields are set locally and differ by country. These figures are no evaluation of exposure and declare nothing safe: evaluate the station by the rules that hold there.',
  },
  {
    code: 'power_licensed_practice',
    detail:
      'Permitted power depends on licence, band and country; who transmits answers for it. Ask an experienced licensed operator when in doubt.',
  },
];

/** I = sqrt(P/R), V = I |Z| for a net power P into Z (circuit theory); rms and peak. */
export function feedPointStress(
  impedance: Complex,
  powerW: number,
): Result<FeedPointStress, PowerError> {
  if (!isPositive(powerW)) return fail(powerNotPositive);
  if (!isPositive(impedance.re)) {
    return fail({
      code: 'resistance_not_positive',
      detail: 'An antenna that takes power has a positive resistance.',
    });
  }
  const currentA = Math.sqrt(powerW / impedance.re);
  const voltageV = currentA * magnitude(impedance);
  return ok({
    powerW,
    currentA,
    currentPeakA: Math.SQRT2 * currentA,
    voltageV,
    voltagePeakV: Math.SQRT2 * voltageV,
  });
}

/**
 * Vmax = sqrt(P Z0 s), Vmin = sqrt(P Z0/s), Imax = sqrt(P s/Z0) for a net power P on a lossless line
 * of impedance Z0 and SWR s (transmission-line theory).
 */
export function lineStress(
  characteristicOhm: number,
  swr: number,
  powerW: number,
): Result<LineStress, PowerError> {
  if (!isPositive(powerW)) return fail(powerNotPositive);
  if (!isPositive(characteristicOhm)) {
    return fail({
      code: 'resistance_not_positive',
      detail: 'A line has a positive characteristic impedance.',
    });
  }
  if (!(swr >= 1 && Number.isFinite(swr))) {
    return fail({ code: 'swr_below_one', detail: 'SWR is a finite number of 1 or more.' });
  }
  const largestVoltageV = Math.sqrt(powerW * characteristicOhm * swr);
  return ok({
    powerW,
    largestVoltageV,
    largestVoltagePeakV: Math.SQRT2 * largestVoltageV,
    smallestVoltageV: largestVoltageV / swr,
    largestCurrentA: largestVoltageV / characteristicOhm,
  });
}

const powerNotPositive: PowerError = {
  code: 'power_not_positive',
  detail: 'The power is a positive number of watts.',
};

function isPositive(value: number): boolean {
  return value > 0 && Number.isFinite(value);
}

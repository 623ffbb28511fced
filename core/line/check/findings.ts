import type { Caution } from '../../analysis/summary.ts';
import type { LineCheck, LineUnderTest } from './checked-line.ts';

/** A fault on the line is worth a sentence from this reflection (return loss 26 dB; common practice). */
const TELLING_REFLECTION = 0.05;

/** What a keeper should know of a checked line, with codes. */
export function lineCheckFindings(
  check: Omit<LineCheck, 'findings'>,
  test: LineUnderTest,
): readonly Caution[] {
  return [...lengthFindings(check, test), ...faultFindings(check), ...lossFindings(check, test)];
}

function lengthFindings(
  check: Omit<LineCheck, 'findings'>,
  test: LineUnderTest,
): readonly Caution[] {
  if (check.lengthM === null || check.lengthU95M === null || test.lengthM === null) return [];
  const halfWidth = Math.hypot(check.lengthU95M, test.lengthU95M ?? 0.05 * test.lengthM);
  const difference = check.lengthM - test.lengthM;
  if (Math.abs(difference) <= halfWidth) return [];
  const seen = `The line ends after ${check.lengthM.toFixed(2)} m, stated are ${test.lengthM.toFixed(2)} m.`;
  if (difference < 0) {
    return [
      {
        code: 'line_shorter_than_stated',
        detail: `${seen} It is cut, shorted or open before its end, or the stated length or velocity factor is wrong.`,
      },
    ];
  }
  return [
    {
      code: 'line_longer_than_stated',
      detail: `${seen} The stated length or velocity factor is wrong, or more line is in the path.`,
    },
  ];
}

function faultFindings(check: Omit<LineCheck, 'findings'>): readonly Caution[] {
  return check.discontinuities
    .filter((place) => place.kind === 'on_line')
    .filter((place) => (place.magnitudeThere ?? place.magnitude) >= TELLING_REFLECTION)
    .map((place) => ({
      code: 'line_discontinuity',
      detail: `At ${place.distanceM.toFixed(2)} m +-${place.distanceU95M.toFixed(2)} m part of the wave turns back (reflection ${(place.magnitudeThere ?? place.magnitude).toFixed(2)}): look there for a connector, splice, kink or water.`,
    }));
}

function lossFindings(check: Omit<LineCheck, 'findings'>, test: LineUnderTest): readonly Caution[] {
  const ratio = check.loss?.ratio ?? null;
  const ripple = check.loss?.ratioU95 ?? null;
  if (ratio === null || ripple === null || test.cable === null) return [];
  const halfWidth = Math.hypot(ripple, test.cable.lossU95Fraction);
  const said = `It loses ${(100 * ratio).toFixed(0)} % of what the data of ${test.cable.name} say for its length (+-${(100 * halfWidth).toFixed(0)} %).`;
  if (ratio > 1 + halfWidth) {
    return [
      {
        code: 'line_loss_above_cable',
        detail: `${said} Water, corroded braid or bad connectors add loss: inspect or replace it.`,
      },
    ];
  }
  if (ratio < 1 - halfWidth) {
    return [
      {
        code: 'line_loss_below_cable',
        detail: `${said} Another type of cable may be there than stated, or the far end was not ${test.farEnd}.`,
      },
    ];
  }
  return [];
}

import type { Comparison, Quantity } from './comparison.ts';
import { type BenchFigure, byFamily, comparisonsOf, worst } from './figure.ts';
import type { CaseScore } from './scores.ts';
import { median, rms } from './statistics.ts';

/** A comparison whose yardstick is there and sound. */
interface Measured {
  readonly comparison: Comparison;
  readonly estimate: number;
  readonly fit: number;
  readonly deviationSteps: number;
}

function measured(
  scores: readonly CaseScore[],
  quantity: Quantity,
  which: 'noisy' | 'rounded_only' = 'noisy',
): Measured[] {
  return comparisonsOf(scores, quantity).flatMap((comparison) => {
    const { yardstick, bench, error, truth } = comparison;
    if (yardstick === null || yardstick.fitted === null) return [];
    if (bench.noise > 0 !== (which === 'noisy')) return [];
    const { deviation, fitted } = yardstick;
    return [
      {
        comparison,
        estimate: error / deviation,
        fit: (fitted - truth) / deviation,
        deviationSteps: deviation / bench.stepHz,
      },
    ];
  });
}

/**
 * RMS error of the estimates over that of the model fits, on the cases with noise. Where there is
 * rounding alone the errors of neighbouring points hang together, so that the deviation that the fit
 * states means little; those cases are listed apart.
 */
export function ratioFigure(scores: readonly CaseScore[], quantity: Quantity): BenchFigure {
  const all = measured(scores, quantity);
  const roundedOnly = measured(scores, quantity, 'rounded_only');
  const ratioOf = (some: readonly Measured[]) =>
    rms(some.map((m) => m.estimate)) / rms(some.map((m) => m.fit));
  const inSteps = (some: readonly Measured[]) =>
    rms(some.map((m) => m.estimate * m.deviationSteps)) /
    rms(some.map((m) => m.fit * m.deviationSteps));
  const value = ratioOf(all);
  const ratiosWhere = (keep: (m: Measured) => boolean) => ratioOf(all.filter(keep));
  return {
    value,
    aim: '<= 1.5',
    met: value <= 1.5,
    detail: {
      compared: all.length,
      normalised: 'each error over the standard deviation that the model fit states for its case',
      fit_rms_over_its_own_deviation: rms(all.map((m) => m.fit)),
      trimmed_1_percent: ratioOf(trimmed(all)),
      median_ratio:
        median(all.map((m) => Math.abs(m.estimate))) / median(all.map((m) => Math.abs(m.fit))),
      plain_steps: inSteps(all),
      rounded_only: ratioOf(roundedOnly),
      rounded_only_trimmed: ratioOf(trimmed(roundedOnly)),
      by_family: byFamily(scores, (some) => ratioOf(measured(some, quantity))),
      by_family_trimmed: byFamily(scores, (some) => ratioOf(trimmed(measured(some, quantity)))),
      by_noise: {
        below_0_001: ratiosWhere((m) => m.comparison.bench.noise < 0.001),
        to_0_005: ratiosWhere(
          (m) => m.comparison.bench.noise >= 0.001 && m.comparison.bench.noise < 0.005,
        ),
        above_0_005: ratiosWhere((m) => m.comparison.bench.noise >= 0.005),
      },
      worst: worst(
        all.map((m) => m.comparison),
        (c) => Math.abs(c.error) / (c.yardstick?.deviation ?? 1),
      ),
    },
  };
}

/** Without the hundredth part whose estimate is worst. */
function trimmed(all: readonly Measured[]): Measured[] {
  const ranked = [...all].sort((a, b) => Math.abs(a.estimate) - Math.abs(b.estimate));
  return ranked.slice(0, Math.floor(0.99 * ranked.length));
}

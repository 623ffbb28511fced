import type { DriftMeasure, DriftSweep } from '../drift/drift-series.ts';
import { ridgeFit } from '../drift/ridge-fit.ts';
import { usualScatter } from '../drift/usual-scatter.ts';
import { type Precision, precision } from '../statistics/agreement.ts';
import { studentQuantile } from '../statistics/distributions.ts';
import { cochran, grubbs, type OutlierTest } from '../statistics/outliers.ts';

/** How far one instrument lies from the mean of all; relative, with a 95 % interval. */
export interface InstrumentAgreement {
  readonly analyzerId: string;
  readonly measurements: number;
  readonly bias: number;
  readonly low: number;
  readonly high: number;
  /** The bias is no chance and more than is usual. */
  readonly correctionWorth: boolean;
}

/** How well instruments agree in one measure; everything relative (0.01 is about 1 %). */
export interface Agreement {
  readonly measure: DriftMeasure;
  /** Antennas on days on which two or more instruments measured them. */
  readonly occasions: number;
  /** ISO 5725-2, the groups being instruments, values less the level of their occasion. */
  readonly precision: Precision | null;
  readonly instruments: readonly InstrumentAgreement[];
  /** Whether one instrument scatters more; the index is that of `instruments`. */
  readonly cochran: OutlierTest | null;
  /** Whether one instrument lies apart; the index is that of `instruments`. */
  readonly grubbs: OutlierTest | null;
}

interface Reading {
  readonly occasion: number;
  readonly analyzerId: string;
  readonly log: number;
}

const dayMs = 24 * 3600 * 1000;

/**
 * Compares instruments by what they measured of the same thing within a day (or `occasionMs`), in one era and in the
 * same weather. Each series is of one antenna and band, ascending in time. Null where no two
 * instruments met, or too few did for an interval.
 */
export function agreementOf(
  series: readonly (readonly DriftSweep[])[],
  measure: DriftMeasure,
  occasionMs: number = dayMs,
): Agreement | null {
  const readings = readingsOf(series, measure, occasionMs);
  const occasions = [...new Set(readings.map(({ occasion }) => occasion))];
  const ids = [...new Set(readings.map(({ analyzerId }) => analyzerId))].toSorted();
  const degrees = readings.length - occasions.length - ids.length + 1;
  if (ids.length < 2 || degrees < 1) return null;
  const indicator = (is: (reading: Reading) => boolean, priorPrecision: number) => ({
    values: Float64Array.from(readings, (reading) => Number(is(reading))),
    priorPrecision,
  });
  // Levels and biases are known up to a common constant; so weak a prior makes the biases sum to 0.
  const columns = [
    ...ids.map((id) => indicator(({ analyzerId }) => analyzerId === id, 1e-6)),
    ...occasions.map((at) => indicator(({ occasion }) => occasion === at, 0)),
  ];
  const logs = Float64Array.from(readings, ({ log }) => log);
  const { factors, residuals } = ridgeFit(
    columns,
    logs,
    logs.map(() => 1),
  );
  const variance = residuals.reduce((sum, rest) => sum + rest * rest, 0) / degrees;
  // The levels of the occasions took degrees of freedom as well: the scatter is scaled for them.
  const scale = Math.sqrt((readings.length - ids.length) / degrees);
  const groups = ids.map((id, k) =>
    readings.flatMap(({ analyzerId }, i) =>
      analyzerId === id ? [factors[k] + scale * residuals[i]] : [],
    ),
  );
  const t = studentQuantile(0.975, degrees);
  const instruments = ids.map((analyzerId, k): InstrumentAgreement => {
    const bias = factors[k];
    // From the mean of all: its own measurements, and those it is held against.
    const reach = t * Math.sqrt(variance * (1 / groups[k].length + 1 / readings.length));
    const limit = Math.max(reach, usualScatter[measure].instrumentLimit);
    return {
      analyzerId,
      measurements: groups[k].length,
      bias,
      low: bias - reach,
      high: bias + reach,
      correctionWorth: Math.abs(bias) > limit,
    };
  });
  return {
    measure,
    occasions: occasions.length,
    precision: precision(groups),
    instruments,
    cochran: scatterTest(groups),
    grubbs: grubbs(ids.map((_, k) => factors[k])),
  };
}

/** What was measured on occasions on which two or more instruments met. */
function readingsOf(
  series: readonly (readonly DriftSweep[])[],
  measure: DriftMeasure,
  occasionMs: number,
): readonly Reading[] {
  return series
    .flatMap((sweeps) => occasionsOf(sweeps, measure, occasionMs))
    .flatMap((met, occasion) =>
      met.map(({ analyzerId, values }) => ({
        occasion,
        analyzerId: analyzerId ?? '',
        // From the first of the occasion: large common levels would cost the fit its digits.
        log: Math.log(
          (values[measure]?.value ?? Number.NaN) / (met[0].values[measure]?.value ?? 1),
        ),
      })),
    );
}

function occasionsOf(
  sweeps: readonly DriftSweep[],
  measure: DriftMeasure,
  occasionMs: number,
): readonly (readonly DriftSweep[])[] {
  const groups: DriftSweep[][] = [];
  for (const sweep of sweeps) {
    if (sweep.analyzerId === null || sweep.values[measure] === undefined) continue;
    const open = groups.at(-1);
    if (open !== undefined && isOneOccasion(open[0], sweep, occasionMs)) open.push(sweep);
    else groups.push([sweep]);
  }
  return groups.filter((met) => new Set(met.map(({ analyzerId }) => analyzerId)).size > 1);
}

function isOneOccasion(first: DriftSweep, sweep: DriftSweep, occasionMs: number): boolean {
  return (
    sweep.measuredAtMs - first.measuredAtMs < occasionMs &&
    sweep.eraIndex === first.eraIndex &&
    sweep.wetness === first.wetness
  );
}

/** Cochran's test wants groups of one size; the smallest is taken, which judges the mildest. */
function scatterTest(groups: readonly (readonly number[])[]): OutlierTest | null {
  const size = Math.min(...groups.map((group) => group.length));
  if (size < 2) return null;
  const variances = groups.map((group) => {
    const mean = group.reduce((sum, value) => sum + value, 0) / group.length;
    return group.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (group.length - 1);
  });
  return cochran(variances, size);
}

import { z } from 'zod';
import { driftMeasures } from '../../core/record/drift/drift-series.ts';
import type { EraTrend, Interval } from '../../core/record/drift/era-trend.ts';
import { type DriftFinding, driftCodes, driftSteps } from '../../core/record/drift/findings.ts';
import type { AntennaDrift, BandDrift } from '../history/drift-report.ts';
import { idSchema, timeSchema } from './common.ts';
import { rounded } from './rounding.ts';
import { planeSchema } from './summary.ts';

const measureSchema = z.enum(driftMeasures);

const intervalSchema = z
  .object({ value: z.number(), low: z.number().nullable(), high: z.number().nullable() })
  .meta({
    id: 'RelativeChange',
    description:
      'A change of the natural logarithm (0.01: about 1 %) with the limits of its 95 % interval; limits are null where there is too little for them.',
  });

const trendSchema = z
  .object({
    measure: measureSchema,
    era: z.int().min(0),
    sweeps: z.int(),
    from: timeSchema,
    until: timeSchema,
    typical: z.number().meta({ description: 'Median, less what instruments and the year add.' }),
    trend_per_year: intervalSchema.nullable().meta({ description: 'Theil–Sen, of dry sweeps.' }),
    trend_probability: z.number().nullable().meta({
      description: 'Mann–Kendall: how likely so steady an order is without a trend.',
    }),
    scatter: z.number().nullable().meta({ description: 'Relative, robust, about the trend.' }),
    wet_minus_dry: intervalSchema.nullable(),
  })
  .meta({ id: 'EraTrend', description: 'One measure of an antenna through one era.' });

const biasSchema = z
  .object({
    measure: measureSchema,
    analyzer_id: idSchema,
    bias: z.number(),
    standard_error: z.number(),
    sweeps: z.int(),
  })
  .meta({
    id: 'InstrumentBias',
    description: 'How far an instrument lies from the others on this antenna, relative.',
  });

const findingSchema = z
  .object({
    code: z.enum(driftCodes),
    era: z.int().min(0),
    measure: measureSchema.nullable(),
    detail: z.string(),
    evidence: z.array(idSchema).meta({ description: 'The sweeps that show it.' }),
    confidence: z.enum(['medium', 'high']),
    next: z.enum(driftSteps),
    change: z.number().nullable().meta({
      description: 'Relative: in all, or by year where it is slow.',
    }),
    since: timeSchema,
  })
  .meta({ id: 'DriftFinding', description: 'What happened to an antenna or an instrument.' });

export const driftSchema = z
  .object({
    antenna_id: idSchema,
    plane: planeSchema.nullable(),
    sweeps: z.int(),
    at_other_plane: z.int().meta({ description: 'Sweeps left out for that.' }),
    bands: z.array(
      z
        .object({
          band: z.string(),
          sweeps: z.int(),
          trends: z.array(trendSchema),
          biases: z.array(biasSchema),
          findings: z.array(findingSchema),
        })
        .meta({ id: 'BandDrift' }),
    ),
  })
  .meta({ id: 'Drift', description: 'How an antenna fared over time, by band and era.' });

/** A report as it is sent. */
export function driftToWire(antennaId: string, drift: AntennaDrift): z.output<typeof driftSchema> {
  return {
    antenna_id: antennaId,
    plane: drift.plane,
    sweeps: drift.sweeps,
    at_other_plane: drift.atOtherPlane,
    bands: rounded(drift.bands.map(bandToWire)),
  };
}

function bandToWire({ band, sweeps, trends, biases, findings }: BandDrift) {
  return {
    band,
    sweeps,
    trends: trends.map(trendToWire),
    biases: biases.map(({ measure, analyzerId, bias, standardError, sweeps: count }) => ({
      measure,
      analyzer_id: analyzerId,
      bias,
      standard_error: standardError,
      sweeps: count,
    })),
    findings: findings.map(findingToWire),
  };
}

function trendToWire(trend: EraTrend): z.output<typeof trendSchema> {
  return {
    measure: trend.measure,
    era: trend.eraIndex,
    sweeps: trend.sweeps,
    from: time(trend.fromMs),
    until: time(trend.untilMs),
    typical: trend.typical,
    trend_per_year: interval(trend.trendPerYear),
    trend_probability: trend.trendProbability,
    scatter: trend.scatter,
    wet_minus_dry: interval(trend.wetMinusDry),
  };
}

function findingToWire(finding: DriftFinding): z.output<typeof findingSchema> {
  const { code, eraIndex, measure, detail, evidence, confidence, next, change, sinceMs } = finding;
  const since = time(sinceMs);
  const ids = [...evidence];
  return { code, era: eraIndex, measure, detail, evidence: ids, confidence, next, change, since };
}

function interval(change: Interval | null): z.output<typeof intervalSchema> | null {
  return change === null ? null : { value: change.value, low: change.low, high: change.high };
}

function time(ms: number): string {
  return new Date(ms).toISOString();
}

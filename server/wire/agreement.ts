import { z } from 'zod';
import type { Agreement } from '../../core/record/agreement/agreement.ts';
import type { BiasOverAntennas } from '../../core/record/agreement/over-antennas.ts';
import { driftMeasures } from '../../core/record/drift/drift-series.ts';
import type { OutlierTest } from '../../core/record/statistics/outliers.ts';
import type { ClubAgreement } from '../history/agreement-report.ts';
import { idSchema } from './common.ts';
import { rounded } from './rounding.ts';

const testSchema = z
  .object({
    analyzer_id: idSchema.meta({ description: 'The instrument that it is about.' }),
    statistic: z.number(),
    critical_5_percent: z.number(),
    critical_1_percent: z.number(),
    verdict: z.enum(['none', 'straggler', 'outlier']),
  })
  .meta({ id: 'OutlierTest', description: 'Straggler beyond 5 %, outlier beyond 1 %.' });

export const agreementSchema = z
  .object({
    measure: z.enum(driftMeasures),
    occasions: z.int(),
    repeatability: z.number().nullable(),
    reproducibility: z.number().nullable(),
    instruments: z.array(
      z
        .object({
          analyzer_id: idSchema,
          measurements: z.int(),
          bias: z.number(),
          low: z.number(),
          high: z.number(),
          correction_worth: z.boolean().meta({
            description: 'The bias is no chance and more than is usual.',
          }),
        })
        .meta({ id: 'InstrumentAgreement' }),
    ),
    cochran: testSchema.nullable().meta({ description: 'Whether one scatters more.' }),
    grubbs: testSchema.nullable().meta({ description: 'Whether one lies apart.' }),
  })
  .meta({
    id: 'Agreement',
    description:
      'Standard deviations and biases of the natural logarithm (0.01: about 1 %) by ISO 5725-2; biases from the mean of all, with 95 % limits.',
  });

const overAntennasSchema = z
  .object({
    measure: z.enum(driftMeasures),
    analyzer_id: idSchema,
    measurements: z.int(),
    bias: z.number(),
    low: z.number(),
    high: z.number(),
    off: z.boolean().meta({
      description: 'It differs from most others by more than chance and more than is usual.',
    }),
  })
  .meta({
    id: 'BiasOverAntennas',
    description: 'How far an instrument lies from the middle one of the others, relative.',
  });

export const agreementsSchema = z
  .object({
    items: z.array(agreementSchema).meta({ description: 'From occasions on which they met.' }),
    on_loads: agreementSchema.nullable().meta({
      description: 'The resistance that they show of one load, likewise; null if none met on one.',
    }),
    over_antennas: z.array(overAntennasSchema).meta({
      description: 'From the series of all antennas, also where no instruments met.',
    }),
  })
  .meta({ id: 'Agreements', description: 'Measures in which instruments could be compared.' });

/** Agreements as they are sent. */
export function agreementsToWire({
  agreements,
  onLoads,
  biases,
}: ClubAgreement): z.output<typeof agreementsSchema> {
  return rounded({
    items: agreements.map(agreementToWire),
    on_loads: onLoads === null ? null : agreementToWire(onLoads),
    over_antennas: biases.map(biasToWire),
  });
}

function biasToWire(bias: BiasOverAntennas): z.output<typeof overAntennasSchema> {
  const { measure, analyzerId, measurements, low, high, off } = bias;
  return { measure, analyzer_id: analyzerId, measurements, bias: bias.bias, low, high, off };
}

/** One of them as it is sent. */
export function agreementToWire(agreement: Agreement): z.output<typeof agreementSchema> {
  const { measure, occasions, precision, instruments } = agreement;
  const testOf = (test: OutlierTest | null) =>
    test === null
      ? null
      : {
          analyzer_id: instruments[test.index].analyzerId,
          statistic: test.statistic,
          critical_5_percent: test.critical5,
          critical_1_percent: test.critical1,
          verdict: test.verdict,
        };
  return {
    measure,
    occasions,
    repeatability: precision?.repeatability ?? null,
    reproducibility: precision?.reproducibility ?? null,
    instruments: instruments.map(
      ({ analyzerId, measurements, bias, low, high, correctionWorth }) => ({
        analyzer_id: analyzerId,
        measurements,
        bias,
        low,
        high,
        correction_worth: correctionWorth,
      }),
    ),
    cochran: testOf(agreement.cochran),
    grubbs: testOf(agreement.grubbs),
  };
}

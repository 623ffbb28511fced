import { z } from 'zod';
import type { StatedInstrumentError } from '../../core/analysis/instrument-error.ts';
import type { Summary } from '../../core/analysis/summary.ts';
import { toSnakeCase } from './case.ts';
import { assumptionSchema, cautionSchema, frequencySchema, idSchema } from './common.ts';
import { lineSchema } from './line.ts';
import { residualErrorsSchema } from './residual-errors.ts';
import { rounded } from './rounding.ts';

export const phaseSchema = z.enum(['signed', 'unsigned', 'none']).meta({
  description:
    'What is known of the phase: all; all but the sign of the reactance; nothing (SWR or return loss only).',
});

export const planeSchema = z.enum(['measured', 'feed_point']).meta({
  description: 'Where the reflection holds: at the analyzer, or at the feed point of the antenna.',
});

export const absenceSchema = z
  .object({ field: z.string(), code: z.string(), detail: z.string() })
  .meta({ id: 'Absence', description: 'A field that is null or empty, and why.' });

const halfWidth = z
  .number()
  .nullable()
  .meta({ description: 'Half-width of the 95 % interval; null if unknown.' });

const minimumSchema = z
  .object({
    frequency_hz: frequencySchema,
    frequency_u95_hz: halfWidth,
    swr: z.number(),
    swr_u95: halfWidth,
    resistance_ohm: z.number().nullable(),
    reactance_ohm: z.number().nullable(),
    return_loss_db: z.number().nullable(),
    at_edge: z.boolean().meta({ description: 'The sweep ends before the minimum does.' }),
  })
  .meta({ id: 'SwrMinimum', description: 'A minimum of SWR, refined below the grid.' });

const resonanceSchema = z
  .object({
    frequency_hz: frequencySchema,
    frequency_u95_hz: halfWidth,
    kind: z
      .enum(['series', 'parallel'])
      .meta({ description: 'Reactance rising (series) or falling (parallel) through zero.' }),
    resistance_ohm: z.number().nullable(),
    resistance_u95_ohm: halfWidth,
    swr: z.number().nullable(),
    swr_u95: halfWidth,
    q: z.number().nullable(),
    q_u95: halfWidth,
    matched_bandwidth: z
      .object({
        max_swr: z.number(),
        predicted_hz: z.number(),
        predicted_u95_hz: halfWidth,
        measured_hz: z.number().nullable(),
        measured_u95_hz: halfWidth,
      })
      .nullable()
      .meta({
        id: 'MatchedBandwidth',
        description:
          'Bandwidth at max_swr of the antenna matched at this resonance: as Q predicts it, and as the sweep has it.',
      }),
    grazing: z
      .boolean()
      .meta({ description: 'The reactance touches zero without a crossing beyond doubt.' }),
  })
  .meta({ id: 'Resonance', description: 'A frequency of zero reactance.' });

const spanSchema = z
  .object({
    max_swr: z.number(),
    low_hz: frequencySchema,
    low_u95_hz: halfWidth,
    high_hz: frequencySchema,
    high_u95_hz: halfWidth,
    width_hz: z.number(),
    low_open: z.boolean().meta({ description: 'The sweep began below the limit.' }),
    high_open: z.boolean().meta({ description: 'The sweep ended below the limit.' }),
  })
  .meta({ id: 'UsableSpan', description: 'A contiguous range where SWR <= max_swr.' });

/** The resonance and minimum-SWR summary of a sweep. */
export const summarySchema = z
  .object({
    sweep_id: idSchema,
    antenna_id: idSchema,
    analysis_version: z.string(),
    plane: planeSchema,
    reference_ohm: z.number(),
    residual_errors: residualErrorsSchema.nullable(),
    phase: phaseSchema,
    span: z.object({
      low_hz: frequencySchema,
      high_hz: frequencySchema,
      points: z.int(),
      median_step_hz: z.number().nullable(),
    }),
    minimum_swr: minimumSchema.nullable(),
    swr_minima: z.array(minimumSchema),
    resonances: z.array(resonanceSchema),
    reactance_magnitude_minima: z
      .array(
        z.object({
          frequency_hz: frequencySchema,
          frequency_u95_hz: halfWidth,
          reactance_magnitude_ohm: z.number(),
          resistance_ohm: z.number().nullable(),
        }),
      )
      .meta({
        description:
          'Reactance magnitude smallest at: only where the sign of the reactance is not known.',
      }),
    resonance_offset_hz: z
      .number()
      .nullable()
      .meta({ description: 'Frequency of the SWR minimum less that of the nearest resonance.' }),
    spans: z.array(spanSchema),
    quality: z.object({
      flags: z.array(
        z.object({
          code: z.string(),
          detail: z.string(),
          low_hz: frequencySchema.optional(),
          high_hz: frequencySchema.optional(),
        }),
      ),
      reflection_noise: z.number().nullable(),
    }),
    absent: z.array(absenceSchema).meta({ description: 'Why a field is null or empty.' }),
    assumptions: z.array(assumptionSchema),
    cautions: z.array(cautionSchema),
    line: lineSchema.nullable().meta({
      description: 'The feed line; null for a sweep that was taken at the feed point.',
    }),
  })
  .meta({ id: 'Summary', description: 'Where an antenna resonates and where its SWR is lowest.' });

/** Whose summary or report it is. */
export interface SweepIdentity {
  readonly sweepId: string;
  readonly antennaId: string;
}

/** A summary as it is sent and stored. */
export function summaryToWire(
  { sweepId, antennaId }: SweepIdentity,
  summary: Summary,
  residualErrors: StatedInstrumentError | null,
  line: z.output<typeof lineSchema> | null,
): z.output<typeof summarySchema> {
  return {
    sweep_id: sweepId,
    antenna_id: antennaId,
    ...rounded(toSnakeCase(summary)),
    residual_errors: toSnakeCase(residualErrors),
    line,
  };
}

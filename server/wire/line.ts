import { z } from 'zod';
import type { LineBasis } from '../lines/line-basis.ts';
import type { LineView } from '../lines/line-report.ts';
import { toSnakeCase } from './case.ts';
import { assumptionSchema, cautionSchema, frequencySchema } from './common.ts';
import { rounded } from './rounding.ts';

export const sectionSchema = z
  .strictObject({
    cable: z.string().min(1).max(100).meta({
      description:
        'Id, alias or key of a cable in /v1/cables. Any other text is kept, but then nothing can be said of the feed point.',
    }),
    length_m: z.number().min(0).max(2000).nullable(),
    length_u95_m: z
      .number()
      .min(0)
      .max(2000)
      .nullable()
      .meta({ description: 'Half-width of the 95 % interval of the length.' }),
    extra_loss_db: z
      .number()
      .min(0)
      .max(60)
      .meta({ description: 'Loss beside that of the cable: connectors, a balun.' }),
    choke: z.boolean().meta({ description: 'Whether a common-mode choke is in it.' }),
  })
  .meta({ description: 'One section of feed line. Null is unknown.' });

const bothEndsSchema = z
  .object({
    frequency_hz: frequencySchema,
    swr_shack: z.number().nullable().meta({ description: 'Null for a total reflection.' }),
    swr_antenna: z.number().nullable().meta({ description: 'Null for a total reflection.' }),
    matched_loss_db: z.number(),
    mismatch_loss_db: z.number().nullable().meta({
      description: 'What the mismatch adds; can be below zero on a short line.',
    }),
    total_loss_db: z.number().nullable(),
    handbook_total_loss_db: z.number().nullable().meta({
      description:
        'The usual formula for a line of real impedance; null unless all of it is of the reference.',
    }),
    method: z.enum(['complex', 'magnitude_only']).meta({
      description: 'Without phase only the usual formula can be used.',
    }),
  })
  .meta({ id: 'BothEnds', description: 'The line at one frequency, seen from both of its ends.' });

const standingSchema = z.enum(['good', 'weak', 'worthless']);

const conditioningSchema = z
  .object({
    swr: standingSchema,
    impedance: standingSchema,
    median_reflection_u95: z.number(),
    median_magnitude_u95: z.number(),
    median_magnification: z
      .number()
      .meta({ description: 'How much an error of the measured reflection grows.' }),
    reasons: z.array(cautionSchema),
  })
  .meta({
    id: 'Conditioning',
    description:
      'How far an answer at the feed point can be relied on. Half-widths are of the reflection, whose plane has radius 1.',
  });

export const lineSchema = z
  .object({
    feed_line: z.array(sectionSchema).nullable().meta({ description: 'As the antenna states it.' }),
    cables: z.array(z.string().nullable()).meta({
      description: 'What the cable of each section is taken for; null: not in /v1/cables.',
    }),
    max_swr: z.number().meta({ description: 'The limit by which the flags judge.' }),
    ends: z.array(bothEndsSchema).meta({
      description:
        'At the SWR minimum and the resonances of this summary; empty where the line is not known.',
    }),
    flags: z.array(cautionSchema).meta({
      description:
        'For instance `line_moves_resonance`: a resonance at the shack is not that of the antenna; `loss_hides_mismatch`; why the line is not known.',
    }),
    assumptions: z.array(assumptionSchema),
    conditioning: conditioningSchema
      .nullable()
      .meta({ description: 'Null where no line was removed.' }),
  })
  .meta({
    id: 'LineReport',
    description: 'What lies between analyzer and antenna, and what it does to the answer.',
  });

/** What the line does to a summary, as it is sent and stored. */
export function lineToWire(
  { feedLine, cables }: LineBasis,
  maxSwr: number,
  { ends, flags, assumptions, conditioning }: LineView,
): z.output<typeof lineSchema> {
  return {
    ...toSnakeCase({ feedLine, cables, maxSwr }),
    ...rounded(toSnakeCase({ ends, flags, assumptions, conditioning })),
  };
}

import { z } from 'zod';
import type { Comparison } from '../../core/record/compare.ts';
import { toSnakeCase } from './case.ts';
import { cautionSchema, frequencySchema, idSchema } from './common.ts';
import { halfWidth } from './history.ts';
import { rounded } from './rounding.ts';

const verdictSchema = z.enum(['same_within_uncertainty', 'changed', 'cannot_tell']).meta({
  description: '`cannot_tell`: a half-width is unknown, or nothing can be compared.',
});

const changeSchema = z
  .object({
    first: z.number(),
    second: z.number(),
    difference: z.number().meta({ description: 'Second less first.' }),
    u95: halfWidth,
    verdict: verdictSchema,
  })
  .meta({ id: 'MeasureChange', description: 'One measure in both sweeps.' });
const maybeChange = changeSchema.nullable();

const resonanceChangeSchema = z
  .object({
    kind: z.enum(['series', 'parallel']),
    frequency_hz: changeSchema,
    resistance_ohm: maybeChange,
    swr: maybeChange,
    q: maybeChange,
  })
  .meta({ id: 'ResonanceChange', description: 'One resonance in both sweeps.' });

const bandChangeSchema = z
  .object({
    band: z.string(),
    resonances: z.array(resonanceChangeSchema),
    only_first_hz: z.array(frequencySchema).meta({
      description: 'Resonances of the first sweep without a partner in the second.',
    }),
    only_second_hz: z.array(frequencySchema),
    minimum_hz: maybeChange,
    minimum_swr: maybeChange,
    span_low_hz: maybeChange,
    span_high_hz: maybeChange,
    span_width_hz: maybeChange,
    verdict: verdictSchema,
  })
  .meta({ id: 'BandChange', description: 'What changed in and near one band.' });

export const comparisonSchema = z
  .object({
    first: idSchema,
    second: idSchema,
    comparable: z.boolean(),
    obstacles: z.array(cautionSchema).meta({ description: 'Why the two cannot be compared.' }),
    cautions: z.array(cautionSchema).meta({ description: 'What may differ beside the antenna.' }),
    verdict: verdictSchema,
    bands: z.array(bandChangeSchema),
    curve: z
      .object({
        low_hz: frequencySchema,
        high_hz: frequencySchema,
        points: z.int(),
        of: z.enum(['complex', 'magnitude']),
        rms: z.number(),
        largest: z.number(),
        largest_hz: frequencySchema,
      })
      .nullable()
      .meta({ description: 'The difference of the reflections where both were swept.' }),
    length_change: z
      .object({
        band: z.string(),
        goal: z.enum(['resonance', 'swr_minimum']),
        method: z.enum(['own_sensitivity', 'simple_rule']),
        length_change_m: z.number().nullable().meta({ description: 'Positive for longer.' }),
        length_change_fraction: z.number().nullable(),
      })
      .nullable()
      .meta({
        description:
          'The change of length that would move the frequency so; null where nothing moved, or where its length does not set it.',
      }),
  })
  .meta({ id: 'Comparison', description: 'Two sweeps of one antenna, measure by measure.' });

/** A comparison as it is sent. */
export function comparisonToWire(
  first: string,
  second: string,
  comparison: Comparison,
): z.output<typeof comparisonSchema> {
  const comparable = comparison.obstacles.length === 0;
  return { first, second, comparable, ...rounded(toSnakeCase(comparison)) };
}

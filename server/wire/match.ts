import { z } from 'zod';
import { assumptionSchema, cautionSchema, frequencySchema } from './common.ts';

const lineShape = {
  characteristic_ohm: z.number(),
  length_m: z.number(),
  velocity_factor: z.number(),
};

const elementSchema = z
  .discriminatedUnion('kind', [
    z.object({
      kind: z.enum(['series_inductor', 'shunt_inductor']),
      inductance_h: z.number().meta({ description: 'Henry.' }),
    }),
    z.object({
      kind: z.enum(['series_capacitor', 'shunt_capacitor']),
      capacitance_f: z.number().meta({ description: 'Farad.' }),
    }),
    z.object({ kind: z.literal('line'), ...lineShape }),
    z.object({
      kind: z.enum(['shunt_stub', 'series_stub']),
      end: z.enum(['open', 'short']),
      ...lineShape,
    }),
    z.object({
      kind: z.literal('transformer'),
      impedance_ratio: z.number().meta({ description: 'The load appears multiplied by it.' }),
    }),
  ])
  .meta({ id: 'MatchElement', description: 'One part of a network; they stand load first.' });

const bandMatchSchema = z
  .object({
    worst_swr: z.number().nullable().meta({ description: 'Null for a total reflection.' }),
    widest_span: z
      .object({ low_hz: frequencySchema, high_hz: frequencySchema })
      .nullable()
      .meta({ description: 'The widest contiguous part within the limit.' }),
    usable_width_hz: z.number(),
    design_loss_db: z.number().meta({ description: 'In the parts, at the design frequency.' }),
    worst_loss_db: z.number(),
  })
  .meta({ id: 'BandMatch', description: 'What a network makes of the band, from all its points.' });

const listedMatchSchema = bandMatchSchema
  .extend({
    swr: z
      .array(z.number().nullable())
      .meta({ description: 'At each of `frequency_hz`; null for a total reflection.' }),
  })
  .meta({ id: 'ListedBandMatch', description: 'The same, with SWR across the band.' });

const optionSchema = z
  .object({
    kind: z.enum([
      'l_network',
      'quarter_wave',
      'series_section',
      'open_stub',
      'short_stub',
      'transformer',
    ]),
    elements: z.array(elementSchema),
    exact: bandMatchSchema,
    nearest_elements: z
      .array(elementSchema)
      .meta({ description: 'Parts of series E24 (IEC 60063), lines as they can be had.' }),
    nearest: listedMatchSchema,
  })
  .meta({ id: 'MatchOption', description: 'One way to match.' });

export const matchSchema = z
  .object({
    place: z.enum(['feed_point', 'line_end']),
    design_hz: frequencySchema,
    load_resistance_ohm: z.number(),
    load_reactance_ohm: z.number(),
    frequency_hz: z
      .array(frequencySchema)
      .meta({ description: 'Where SWR is listed: at most 61 of the points in the band.' }),
    unmatched: listedMatchSchema,
    options: z.array(optionSchema).meta({
      description:
        'Widest usable span with the nearest parts first, then the least SWR, then the least loss.',
    }),
    assumptions: z.array(assumptionSchema),
    cautions: z.array(cautionSchema),
  })
  .meta({ id: 'MatchAdvice', description: 'Networks that match what was swept of a band.' });

import { z } from 'zod';
import { type BandPlan, bandNames } from '../../core/bands/plan.ts';
import { toSnakeCase } from './case.ts';
import { frequencySchema } from './common.ts';

export const familySchema = z
  .enum([
    'allocation',
    'cw',
    'narrow',
    'digital',
    'phone',
    'all',
    'fm',
    'beacon',
    'satellite',
    'guard',
    'channel',
  ])
  .meta({ description: 'A grouping of `use`.' });

export const statusSchema = z.enum(['primary', 'secondary', 'national']).meta({
  description: '`national`: only where an administration permits it.',
});

const segmentSchema = z.object({
  band: z.enum(bandNames),
  low_hz: frequencySchema,
  high_hz: frequencySchema,
  use: z.string(),
  family: familySchema,
  verified: z
    .string()
    .meta({ description: 'Where the row was read, or `memory` if no copy was read.' }),
  status: statusSchema.optional(),
  licence: z.string().optional(),
  max_bandwidth_hz: z.number().optional(),
  note: z.string().optional(),
  outside_parent: z.string().optional(),
});

/** A band plan with its source. */
export const planSchema = z
  .object({
    id: z.string(),
    title: z.string(),
    kind: z.enum(['allocation', 'bandplan', 'licence']),
    authority: z.string(),
    edition: z.string(),
    edition_standing: z.enum(['current', 'old', 'unconfirmed']),
    source: z.string(),
    region: z.string(),
    nests_in: z.array(z.string()),
    note: z.string().optional(),
    segments: z.array(segmentSchema),
  })
  .meta({ id: 'Plan', description: 'A band plan: who issued it, its edition, its segments.' });

/** A plan as it is sent. */
export function planToWire(plan: BandPlan): z.output<typeof planSchema> {
  return toSnakeCase(plan);
}

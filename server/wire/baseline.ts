import { z } from 'zod';
import type { EraBaseline } from '../history/baselines.ts';
import { toSnakeCase } from './case.ts';
import { idSchema, timeSchema } from './common.ts';
import { halfWidth } from './history.ts';
import { rounded } from './rounding.ts';

const valueSchema = z
  .object({ value: z.number(), u95: halfWidth })
  .meta({ id: 'BaselineValue', description: 'The median of the sweeps of a baseline.' });

const bandSchema = z
  .object({
    band: z.string(),
    source: z.enum(['chosen', 'dry', 'any']).meta({
      description:
        '`chosen`: by a member. `dry`: the first good sweeps in dry weather. `any`: no dry one is known, so the first good ones.',
    }),
    sweep_ids: z.array(idSchema),
    resonances: z.array(
      z.object({
        kind: z.enum(['series', 'parallel']),
        frequency_hz: valueSchema,
        resistance_ohm: valueSchema.nullable(),
        swr: valueSchema.nullable(),
        q: valueSchema.nullable(),
      }),
    ),
    minimum_hz: valueSchema.nullable(),
    minimum_swr: valueSchema.nullable(),
    span_width_hz: valueSchema.nullable(),
    usable_fraction: valueSchema,
  })
  .meta({ id: 'BandBaseline', description: 'What a band was like at the beginning of an era.' });

export const baselinesSchema = z
  .object({
    items: z.array(
      z.object({
        era: z.int().min(0),
        began_at: timeSchema.nullable().meta({ description: 'Null for the first era.' }),
        work_id: idSchema.nullable().meta({ description: 'The work that began it.' }),
        bands: z.array(bandSchema),
      }),
    ),
  })
  .meta({ id: 'Baselines', description: 'What each era of an antenna is held against.' });

/** The baselines of an antenna as they are sent. */
export function baselinesToWire(eras: readonly EraBaseline[]): z.output<typeof baselinesSchema> {
  return {
    items: eras.map(({ eraIndex, begunBy, bands }) => ({
      era: eraIndex,
      began_at: begunBy?.doneAt ?? null,
      work_id: begunBy?.id ?? null,
      bands: rounded(toSnakeCase(bands)),
    })),
  };
}

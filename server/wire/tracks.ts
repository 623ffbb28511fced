import { z } from 'zod';
import type { ResonanceTrack } from '../../core/record/tracks.ts';
import { frequencySchema, idSchema, timeSchema } from './common.ts';
import { halfWidth } from './history.ts';
import { rounded } from './rounding.ts';

const pointSchema = z.object({
  sweep_id: idSchema,
  at: timeSchema,
  era: z.int().min(0),
  frequency_hz: frequencySchema,
  frequency_u95_hz: halfWidth,
  resistance_ohm: z.number().nullable(),
  swr: z.number().nullable(),
  q: z.number().nullable(),
  expected_hz: frequencySchema.nullable().meta({
    description: 'Where the sweeps before let it be expected; null at the first.',
  }),
  jumped: z.boolean().meta({
    description:
      'It lies farther off than drift, scatter and half-widths explain, so that it may be another resonance.',
  }),
});

export const tracksSchema = z
  .object({
    band: z.string(),
    sweeps: z.int().meta({ description: 'How many sweeps were looked at.' }),
    complete: z.boolean().meta({ description: 'False: there are older sweeps; ask with `until`.' }),
    tracks: z.array(
      z.object({
        kind: z.enum(['series', 'parallel']),
        standing: z.enum(['followed', 'paused', 'ended']).meta({
          description:
            '`paused`: the newest sweeps do not have it. `ended`: four in a row did not, and what comes later counts as another one.',
        }),
        points: z.array(pointSchema).meta({ description: 'Ascending in time.' }),
      }),
    ),
  })
  .meta({ id: 'ResonanceTracks', description: 'The resonances of a band, each through time.' });

/** Tracks as they are sent. */
export function tracksToWire(
  band: string,
  sweeps: number,
  complete: boolean,
  tracks: readonly ResonanceTrack[],
): z.output<typeof tracksSchema> {
  return {
    band,
    sweeps,
    complete,
    tracks: tracks.map(({ kind, standing, points }) => ({
      kind,
      standing,
      points: points.map(({ row, resonance, expectedHz, jumped }) =>
        rounded({
          sweep_id: row.sweepId,
          at: new Date(row.measuredAtMs).toISOString(),
          era: row.eraIndex,
          frequency_hz: resonance.frequencyHz,
          frequency_u95_hz: resonance.frequencyU95Hz,
          resistance_ohm: resonance.resistanceOhm,
          swr: resonance.swr,
          q: resonance.q,
          expected_hz: expectedHz,
          jumped,
        }),
      ),
    })),
  };
}

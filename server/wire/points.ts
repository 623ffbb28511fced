import { z } from 'zod';
import { phaseSchema } from './summary.ts';

const numbers = z.array(z.number());

/** The JSON sweep that `writeSweepJson` writes and an upload reads. */
export const pointsSchema = z
  .object({
    format: z.literal('sweep-ledger/sweep'),
    version: z.literal(1),
    note: z.string().optional(),
    reference_ohm: z.number(),
    phase: phaseSchema,
    frequency_hz: numbers,
    reflection_re: numbers.optional(),
    reflection_im: numbers
      .optional()
      .meta({ description: 'With `unsigned` phase its magnitude, the sign being unknown.' }),
    reflection_magnitude: numbers.optional().meta({ description: 'With phase `none`.' }),
  })
  .meta({
    id: 'Points',
    description: 'Arrays of equal length, by ascending frequency. Can be uploaded again as it is.',
  });

import { z } from 'zod';
import type { RoundProgress } from '../history/round-progress.ts';
import type { RoundRecord } from '../store/round-store.ts';
import { agreementSchema, agreementToWire } from './agreement.ts';
import { idOrKeySchema, idSchema, noteSchema, timeInputSchema, timeSchema } from './common.ts';
import { loadToWire } from './load-check.ts';
import { rounded } from './rounding.ts';

const nameSchema = z.string().min(1).max(100);
const loadSchema = z
  .union([z.enum(['open', 'short']), z.number().positive().max(10_000)])
  .meta({ description: 'A known load: its resistance in ohms, `open` or `short`.' });

export const roundInputSchema = z
  .strictObject({
    name: nameSchema,
    antenna: idOrKeySchema.optional(),
    load: loadSchema.optional(),
    analyzers: z.array(idOrKeySchema).min(2).max(50),
    begins_at: timeInputSchema,
    ends_at: timeInputSchema,
    note: noteSchema.default(''),
  })
  .refine(({ antenna, load }) => (antenna === undefined) !== (load === undefined), {
    message: 'A round is of an `antenna` or of a `load`.',
    path: ['antenna'],
  })
  .refine(({ begins_at, ends_at }) => begins_at < ends_at, {
    message: 'A round ends after it began.',
    path: ['ends_at'],
  });

const roundFields = {
  id: idSchema,
  name: nameSchema,
  antenna_id: idSchema.nullable().meta({ description: 'Null: it is of a load.' }),
  load: loadSchema.nullable().meta({ description: 'Null: it is of an antenna.' }),
  analyzer_ids: z.array(idSchema),
  begins_at: timeSchema,
  ends_at: timeSchema,
  note: noteSchema,
  added_at: timeSchema,
  added_by: idSchema,
};

export const roundSchema = z
  .object(roundFields)
  .meta({ id: 'Round', description: 'Several instruments that measure one thing, as planned.' });

export const roundProgressSchema = z
  .object({
    ...roundFields,
    state: z.enum(['planned', 'under_way', 'complete', 'over']).meta({
      description: '`over`: it ended before every instrument measured.',
    }),
    instruments: z.array(
      z
        .object({
          analyzer_id: idSchema,
          measurements: z.array(idSchema).meta({ description: 'Sweeps, or load checks.' }),
        })
        .meta({ id: 'RoundInstrument' }),
    ),
    agreements: z.array(agreementSchema).meta({
      description: 'Once instruments measured often enough; of a load, its resistance.',
    }),
  })
  .meta({ id: 'RoundProgress', description: 'A round and how far it has come.' });

/** A record as it is sent. */
export function roundToWire(record: RoundRecord): z.output<typeof roundSchema> {
  const { id, beginsAt, addedAt, addedBy, facts } = record;
  const { name, measures, analyzerIds, endsAt, note } = facts;
  return {
    id,
    name,
    antenna_id: 'antennaId' in measures ? measures.antennaId : null,
    load: 'antennaId' in measures ? null : loadToWire(measures.loadOhm),
    analyzer_ids: [...analyzerIds],
    begins_at: beginsAt,
    ends_at: endsAt,
    note,
    added_at: addedAt,
    added_by: addedBy,
  };
}

/** A record with its progress as it is sent. */
export function roundProgressToWire(
  record: RoundRecord,
  { state, instruments, agreements }: RoundProgress,
): z.output<typeof roundProgressSchema> {
  return {
    ...roundToWire(record),
    state,
    instruments: instruments.map(({ analyzerId, measurements }) => ({
      analyzer_id: analyzerId,
      measurements: [...measurements],
    })),
    agreements: rounded(agreements.map(agreementToWire)),
  };
}

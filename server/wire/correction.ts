import { z } from 'zod';
import type { SweepRevision } from '../store/corrections.ts';
import {
  idOrKeySchema,
  idSchema,
  inventedSchema,
  noteSchema,
  timeInputSchema,
  timeSchema,
} from './common.ts';
import { conditionsFields, conditionsToWire } from './conditions.ts';
import { planeSchema } from './summary.ts';

const wordsSchema = z.string().min(1).max(500);

export const rejectedSchema = wordsSchema
  .nullable()
  .meta({ description: 'Why it tells nothing of the antenna; null: it does.' });

export const correctionSchema = z.strictObject({
  reason: wordsSchema.meta({ description: 'Why it is corrected; kept with the revision.' }),
  ...z
    .strictObject({
      antenna: idOrKeySchema,
      analyzer: idOrKeySchema.nullable(),
      measured_at: timeInputSchema.nullable(),
      conditions: z.string().max(500).nullable(),
      ...conditionsFields,
      note: noteSchema,
      plane: planeSchema,
      rejected_because: rejectedSchema,
    })
    .partial().shape,
});
export type CorrectionWire = z.output<typeof correctionSchema>;

const sweepRevisionSchema = z
  .object({
    revision: z.int().min(1),
    at: timeSchema,
    member_id: idSchema,
    reason: z.string().nullable().meta({ description: 'Null: as told with the upload.' }),
    antenna_id: idSchema,
    analyzer_id: idSchema.nullable(),
    measured_at: timeSchema.nullable(),
    ...conditionsFields,
    conditions: z.string().nullable(),
    note: noteSchema,
    plane: planeSchema,
    invented: inventedSchema,
    rejected_because: rejectedSchema,
  })
  .meta({ id: 'SweepRevision', description: 'What was told of a sweep at one time.' });

export const sweepRevisionsSchema = z.object({ items: z.array(sweepRevisionSchema) });

export function sweepRevisionToWire(told: SweepRevision): z.output<typeof sweepRevisionSchema> {
  const { revision, at, memberId, reason, facts } = told;
  return {
    revision,
    at,
    member_id: memberId,
    reason: reason === '' ? null : reason,
    antenna_id: facts.antennaId,
    analyzer_id: facts.analyzerId,
    measured_at: facts.measuredAt,
    ...conditionsToWire(facts),
    conditions: facts.conditions,
    note: facts.note,
    plane: facts.plane,
    invented: facts.invented,
    rejected_because: facts.rejectedBecause ?? null,
  };
}

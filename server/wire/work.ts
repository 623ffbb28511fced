import { z } from 'zod';
import { workKinds } from '../../core/record/work.ts';
import type { WorkRecord } from '../store/history-store.ts';
import { idSchema, inventedSchema, noteSchema, timeInputSchema, timeSchema } from './common.ts';

const kindSchema = z.enum(workKinds).meta({
  description:
    'What was done. Each kind but `inspected` begins a new era: what was measured before it is of another antenna, so to speak.',
});
const lengthSchema = z.number().min(0.1).max(100_000).meta({
  description: 'By how much the whole element became shorter (trimmed) or longer (lengthened), mm.',
});
const doneBySchema = z.string().min(1).max(100);

/** Whether the length of the element is what was worked on. */
function changesLength(kind: (typeof workKinds)[number]): boolean {
  return kind === 'trimmed' || kind === 'lengthened';
}

export const workInputSchema = z
  .strictObject({
    kind: kindSchema,
    done_at: timeInputSchema,
    length_mm: lengthSchema.nullable().default(null),
    done_by: doneBySchema.nullable().default(null),
    note: noteSchema.default(''),
  })
  .refine(({ kind, length_mm }) => length_mm === null || changesLength(kind), {
    message: 'Only `trimmed` and `lengthened` have a length.',
    path: ['length_mm'],
  });

const reasonSchema = z.string().min(1).max(500);

/** Why work is taken back. */
export const withdrawalSchema = z.strictObject({ reason: reasonSchema });

export const workSchema = z
  .object({
    id: idSchema,
    antenna_id: idSchema,
    kind: kindSchema,
    done_at: timeSchema,
    length_mm: lengthSchema.nullable(),
    done_by: doneBySchema.nullable(),
    note: noteSchema,
    invented: inventedSchema,
    added_at: timeSchema,
    added_by: idSchema,
    withdrawn_at: timeSchema.nullable().meta({ description: 'Null if it holds.' }),
    withdrawn_for: reasonSchema.nullable(),
  })
  .meta({ id: 'Work', description: 'Work on an antenna, kept for good.' });

/** The change of length that a body tells, metres, positive for longer. */
export function lengthChangeM({ kind, length_mm }: z.output<typeof workInputSchema>) {
  if (length_mm === null) return null;
  return (kind === 'trimmed' ? -length_mm : length_mm) / 1000;
}

/** A record as it is sent. */
export function workToWire(record: WorkRecord): z.output<typeof workSchema> {
  const { kind, lengthChangeM: change, doneBy, note, invented } = record.facts;
  return {
    id: record.id,
    antenna_id: record.antennaId,
    kind,
    done_at: record.doneAt,
    length_mm: change === null ? null : Number((Math.abs(change) * 1000).toPrecision(12)),
    done_by: doneBy,
    note,
    invented,
    added_at: record.addedAt,
    added_by: record.addedBy,
    withdrawn_at: record.withdrawnAt,
    withdrawn_for: record.withdrawnFor,
  };
}

import { z } from 'zod';
import type { LoadCheckRecord } from '../store/port.ts';
import {
  assumptionSchema,
  frequencySchema,
  idSchema,
  inventedSchema,
  noteSchema,
  timeSchema,
} from './common.ts';
import { residualErrorsSchema } from './residual-errors.ts';
import { phaseSchema } from './summary.ts';
import { fileSchema, fileToWire } from './sweep.ts';

/** A load in a query: ohms, `open` or `short`. */
export const loadQuerySchema = z
  .union([z.enum(['open', 'short']), z.coerce.number().positive().max(10_000)])
  .meta({
    description: 'The known load: its resistance in ohms, `open` or `short`.',
    examples: [50],
  });

export const loadCheckSchema = z
  .object({
    id: idSchema,
    analyzer_id: idSchema,
    load: z.union([z.enum(['open', 'short']), z.number()]),
    measured_at: timeSchema.nullable(),
    received_at: timeSchema,
    uploaded_by: idSchema,
    note: noteSchema,
    invented: inventedSchema,
    file: fileSchema,
    phase: phaseSchema,
    reference_ohm: z.number(),
    points: z.int().min(1),
    low_hz: frequencySchema,
    high_hz: frequencySchema,
    assumptions: z.array(assumptionSchema),
  })
  .meta({ id: 'LoadCheck', description: 'A sweep of a known load by an analyzer, kept for good.' });

/** What the latest checks tell of the analyzer's own error. */
export const residualReportSchema = z
  .object({
    errors: residualErrorsSchema.nullable(),
    from_checks: z
      .array(idSchema)
      .meta({ description: 'The latest check of each load over the frequencies of the newest.' }),
    detail: z.string(),
  })
  .meta({ id: 'ResidualReport' });

/** `open`, `short` or ohms. */
export function loadToWire(loadOhm: number | null): 'open' | 'short' | number {
  if (loadOhm === null) return 'open';
  return loadOhm === 0 ? 'short' : loadOhm;
}

/** A record as it is sent. */
export function loadCheckToWire(record: LoadCheckRecord): z.output<typeof loadCheckSchema> {
  const { facts, measured } = record;
  return {
    id: record.id,
    analyzer_id: facts.analyzerId,
    load: loadToWire(facts.loadOhm),
    measured_at: facts.measuredAt,
    received_at: record.receivedAt,
    uploaded_by: record.uploadedBy,
    note: facts.note,
    invented: facts.invented,
    file: fileToWire(measured),
    phase: measured.phase,
    reference_ohm: measured.referenceOhm,
    points: measured.points,
    low_hz: measured.lowHz,
    high_hz: measured.highHz,
    assumptions: JSON.parse(measured.assumptionsJson),
  };
}

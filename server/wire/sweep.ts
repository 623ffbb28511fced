import { z } from 'zod';
import type { SweepMeasured, SweepRecord } from '../store/port.ts';
import {
  assumptionSchema,
  frequencySchema,
  idSchema,
  inventedSchema,
  noteSchema,
  timeSchema,
} from './common.ts';
import { conditionsFields, conditionsToWire } from './conditions.ts';
import { rejectedSchema } from './correction.ts';
import { phaseSchema, planeSchema, summarySchema } from './summary.ts';

/** The file of a measurement, as it was sent. */
export const fileSchema = z.object({
  sha256: z.string().regex(/^[0-9a-f]{64}$/),
  bytes: z.int(),
  name: z.string().nullable().meta({ description: 'As the member called it.' }),
  format: z.string().meta({ examples: ['touchstone-1'] }),
  columns: z
    .string()
    .nullable()
    .meta({ description: 'How the columns were read (delimited text).' }),
  port: z
    .union([z.literal(1), z.literal(2)])
    .nullable()
    .meta({
      description: 'Which port was read (two-port files).',
    }),
});

export const sweepSchema = z
  .object({
    id: idSchema,
    antenna_id: idSchema,
    analyzer_id: idSchema.nullable(),
    measured_at: timeSchema.nullable().meta({ description: 'Null if nobody said.' }),
    received_at: timeSchema,
    uploaded_by: idSchema,
    revision: z.int().min(1).meta({
      description: 'Of what was told: grows by one with each correction.',
    }),
    ...conditionsFields,
    conditions: z.string().nullable().meta({ description: 'In the member’s own words.' }),
    note: noteSchema,
    plane: planeSchema,
    invented: inventedSchema,
    rejected_because: rejectedSchema,
    file: fileSchema,
    phase: phaseSchema,
    reference_ohm: z.number().meta({ description: 'The reference of the file.' }),
    points: z.int().min(1),
    low_hz: frequencySchema,
    high_hz: frequencySchema,
    assumptions: z.array(assumptionSchema),
  })
  .meta({ id: 'Sweep', description: 'One measurement, kept for good.' });

/** A record with its summary, as an upload and a read of one record answer. */
export const sweepWithSummarySchema = z
  .object({ ...sweepSchema.shape, summary: summarySchema })
  .meta({ id: 'SweepWithSummary', description: 'One measurement with what follows from it.' });

/** What is known of a file, as it is sent. */
export function fileToWire(measured: SweepMeasured): z.output<typeof fileSchema> {
  return {
    sha256: measured.fileSha256,
    bytes: measured.fileBytes,
    name: measured.fileName,
    format: measured.format,
    columns: measured.columns,
    port: measured.port,
  };
}

/** A record as it is sent. */
export function sweepToWire(record: SweepRecord): z.output<typeof sweepSchema> {
  const { facts, measured } = record;
  return {
    id: record.id,
    antenna_id: facts.antennaId,
    analyzer_id: facts.analyzerId,
    measured_at: facts.measuredAt,
    received_at: record.receivedAt,
    uploaded_by: record.uploadedBy,
    revision: record.revision,
    ...conditionsToWire(facts),
    conditions: facts.conditions,
    note: facts.note,
    plane: facts.plane,
    invented: facts.invented,
    rejected_because: facts.rejectedBecause ?? null,
    file: fileToWire(measured),
    phase: measured.phase,
    reference_ohm: measured.referenceOhm,
    points: measured.points,
    low_hz: measured.lowHz,
    high_hz: measured.highHz,
    assumptions: JSON.parse(measured.assumptionsJson),
  };
}

/** The JSON text of a record with its summary; the summary goes in as the text that is stored. */
export function sweepWithSummaryJson(record: SweepRecord, summaryJson: string): string {
  return `${JSON.stringify(sweepToWire(record)).slice(0, -1)},"summary":${summaryJson}}`;
}

import { z } from 'zod';
import type { ChangesSince, CheckedForRecord, ThinTrace } from '../lines/line-check.ts';
import type { LineCheckRecord } from '../store/port.ts';
import { toSnakeCase } from './case.ts';
import {
  assumptionSchema,
  cautionSchema,
  frequencySchema,
  idSchema,
  inventedSchema,
  noteSchema,
  timeSchema,
} from './common.ts';
import { rounded } from './rounding.ts';
import { absenceSchema, phaseSchema } from './summary.ts';
import { fileSchema, fileToWire } from './sweep.ts';

const halfWidth = z
  .number()
  .nullable()
  .meta({ description: 'Half-width of the 95 % interval; null if unknown.' });
const numbers = z.array(z.number());

const lossSchema = z
  .object({
    frequency_hz: z.array(frequencySchema),
    loss_db: numbers.meta({ description: 'Half of the return loss, one way.' }),
    smooth_loss_db: numbers.meta({ description: 'Its smooth part, k1 sqrt(f) + k2 f.' }),
    point_u95_db: z.number(),
    smooth_u95_db: z.number(),
    expected_loss_db: numbers
      .nullable()
      .meta({ description: 'What the data of the cable say of this length.' }),
    ratio: z.number().nullable().meta({ description: 'Measured over expected.' }),
    ratio_u95: halfWidth,
  })
  .meta({
    id: 'LineLoss',
    description: 'Loss of a line whose end reflects all, at most 101 points.',
  });

const discontinuitySchema = z
  .object({
    distance_m: z.number(),
    distance_u95_m: z.number(),
    magnitude: z.number().meta({ description: 'Of the reflection as it arrives.' }),
    magnitude_there: z.number().nullable().meta({
      description: 'Freed of the loss of the cable on the way; null without a cable.',
    }),
    kind: z.enum(['near_end', 'on_line', 'end', 'echo']),
  })
  .meta({ id: 'Discontinuity', description: 'A place where part of the wave turns back.' });

const reportSchema = z
  .object({
    velocity_factor: z.number(),
    velocity_factor_u95: z.number(),
    electrical_length_m: z
      .number()
      .nullable()
      .meta({ description: 'The length of the same delay in vacuum.' }),
    electrical_length_u95_m: halfWidth,
    length_m: z.number().nullable().meta({ description: 'With the velocity factor above.' }),
    length_u95_m: halfWidth,
    length_method: z.enum(['phase', 'peak']).nullable(),
    measured_velocity_factor: z
      .number()
      .nullable()
      .meta({ description: 'From the known length; null without one.' }),
    measured_velocity_factor_u95: halfWidth,
    loss: lossSchema.nullable(),
    discontinuities: z.array(discontinuitySchema),
    reflection_floor: z
      .number()
      .meta({ description: 'Reflections below it are not told from noise and sidelobes.' }),
    separable_m: z.number().meta({ description: 'Two places nearer than this are seen as one.' }),
    findings: z.array(cautionSchema),
    absent: z.array(absenceSchema),
    assumptions: z.array(assumptionSchema),
  })
  .meta({ id: 'LineCheckReport', description: 'What a sweep told of the line.' });

/** A report as it is stored. */
export type LineCheckReportWire = z.output<typeof reportSchema>;

const traceSchema = z
  .object({
    step_m: z
      .number()
      .meta({ description: 'Distance from one value to the next; the first is 0.' }),
    magnitude: numbers.meta({
      description:
        'Each the largest reflection of its step, to one and a half times the length of the line.',
    }),
    alias_free_m: z.number().meta({ description: 'What lies further folds back.' }),
    resolution_m: z.number().meta({ description: 'c VF/(2 span), before the window widens it.' }),
    window: z.object({
      id: z.string(),
      name: z.string(),
      width_at_half: z.number().meta({ description: 'In resolutions.' }),
      first_null: z.number().meta({ description: 'In resolutions.' }),
      sidelobe_db: z.number(),
    }),
    loss_compensated: z.boolean(),
  })
  .meta({ id: 'ReflectionTrace', description: 'Reflection against distance.' });

/** A trace as it is stored. */
export type TraceWire = z.output<typeof traceSchema>;

const farEndSchema = z.enum(['open', 'shorted', 'loaded']);

export const lineCheckSchema = z
  .object({
    id: idSchema,
    antenna_id: idSchema,
    analyzer_id: idSchema.nullable(),
    measured_at: timeSchema.nullable().meta({ description: 'Null if nobody said.' }),
    received_at: timeSchema,
    uploaded_by: idSchema,
    note: noteSchema,
    invented: inventedSchema,
    far_end: farEndSchema,
    load_ohm: z.number().nullable(),
    cable: z.string().nullable().meta({ description: 'Key of the cable; null: none was named.' }),
    known_length_m: z.number().nullable(),
    known_length_u95_m: z.number().nullable(),
    file: fileSchema,
    phase: phaseSchema,
    reference_ohm: z.number().meta({ description: 'The reference of the file.' }),
    points: z.int().min(1),
    low_hz: frequencySchema,
    high_hz: frequencySchema,
    assumptions: z.array(assumptionSchema).meta({ description: 'Made in reading the file.' }),
    report: reportSchema,
    compared_with: idSchema.nullable().meta({
      description: 'The check before this one in time, of another file; null: there is none.',
    }),
    changes: z.array(cautionSchema).meta({ description: 'What changed since that check.' }),
  })
  .meta({ id: 'LineCheck', description: 'A sweep into a feed line, kept for good.' });

export const lineCheckWithTraceSchema = z
  .object({ ...lineCheckSchema.shape, trace: traceSchema })
  .meta({ id: 'LineCheckWithTrace' });

/** What the query of a check may say of the line. */
export const lineQuery = {
  far_end: farEndSchema.meta({ description: 'What the far end was left as.' }),
  load_ohm: z.coerce
    .number()
    .positive()
    .max(1e6)
    .optional()
    .meta({ description: 'With `loaded`: the load.' }),
  cable: z.string().min(1).max(100).optional().meta({
    description:
      'Key, alias or id of the cable: /v1/cables. If neither this nor a velocity factor is given, the cable of the antenna’s feed line; if no length is given either, its length as well.',
  }),
  known_length_m: z.coerce.number().positive().max(10_000).optional(),
  known_length_u95_m: z.coerce.number().min(0).max(1000).optional(),
  velocity_factor: z.coerce
    .number()
    .gt(0)
    .max(1)
    .optional()
    .meta({ description: 'Instead of that of the cable.' }),
  velocity_factor_u95: z.coerce.number().min(0).max(0.5).optional(),
  window: z
    .enum(['rectangular', 'hann', 'kaiser_6', 'kaiser_3pi'])
    .default('kaiser_6')
    .meta({ description: 'The taper before the transform: narrow peaks or low sidelobes.' }),
  compensate_loss: z
    .enum(['true', 'false'])
    .default('true')
    .transform((text) => text === 'true')
    .meta({ description: 'Raise the trace by the loss of the cable on the way.' }),
};

/** A report as it is sent and stored. */
export function lineReportJson({ check, loss }: CheckedForRecord): string {
  const plain =
    loss === null
      ? null
      : {
          ...loss,
          frequencyHz: [...loss.frequencyHz],
          lossDb: [...loss.lossDb],
          smoothLossDb: [...loss.smoothLossDb],
          expectedLossDb: loss.expectedLossDb === null ? null : [...loss.expectedLossDb],
        };
  const report: LineCheckReportWire = rounded(toSnakeCase({ ...check, loss: plain }));
  return JSON.stringify(report);
}

/** A trace as it is sent and stored. */
export function traceJson(trace: ThinTrace): string {
  const wire: z.output<typeof traceSchema> = rounded(toSnakeCase(trace));
  return JSON.stringify(wire);
}

/** A record as it is sent. */
export function lineCheckToWire(
  record: LineCheckRecord,
  { comparedWith, changes }: ChangesSince,
): z.output<typeof lineCheckSchema> {
  const { facts, tested, measured } = record;
  return {
    id: record.id,
    antenna_id: facts.antennaId,
    analyzer_id: facts.analyzerId,
    measured_at: facts.measuredAt,
    received_at: record.receivedAt,
    uploaded_by: record.uploadedBy,
    note: facts.note,
    invented: facts.invented,
    far_end: tested.farEnd === 'short' ? 'shorted' : tested.farEnd,
    load_ohm: tested.loadOhm,
    cable: tested.cable,
    known_length_m: tested.lengthM,
    known_length_u95_m: tested.lengthU95M,
    file: fileToWire(measured),
    phase: measured.phase,
    reference_ohm: measured.referenceOhm,
    points: measured.points,
    low_hz: measured.lowHz,
    high_hz: measured.highHz,
    assumptions: JSON.parse(measured.assumptionsJson),
    report: JSON.parse(record.reportJson),
    compared_with: comparedWith,
    changes: [...changes],
  };
}

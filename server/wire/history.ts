import { z } from 'zod';
import type { MeasuredRow } from '../history/measured-rows.ts';
import { toSnakeCase } from './case.ts';
import { frequencySchema, idSchema, timeSchema } from './common.ts';
import { conditionsFields, conditionsToWire } from './conditions.ts';
import { csvLine } from './csv.ts';
import { rounded } from './rounding.ts';
import { phaseSchema, planeSchema } from './summary.ts';

export const halfWidth = z
  .number()
  .nullable()
  .meta({ description: 'Half-width of the 95 % interval; null if unknown.' });

const resonanceSchema = z
  .object({
    frequency_hz: frequencySchema,
    frequency_u95_hz: halfWidth,
    kind: z.enum(['series', 'parallel']),
    resistance_ohm: z.number().nullable(),
    resistance_u95_ohm: halfWidth,
    swr: z.number().nullable(),
    swr_u95: halfWidth,
    q: z.number().nullable(),
    q_u95: halfWidth,
    grazing: z.boolean().meta({ description: 'It may be noise.' }),
  })
  .meta({ id: 'MeasuredResonance', description: 'A resonance in the history of an antenna.' });

const minimumSchema = z
  .object({
    frequency_hz: frequencySchema,
    frequency_u95_hz: halfWidth,
    swr: z.number(),
    swr_u95: halfWidth,
    at_edge: z.boolean().meta({ description: 'The sweep ends before the minimum does.' }),
  })
  .meta({ id: 'MeasuredMinimum', description: 'The lowest SWR of a band, where the curve turns.' });

const spanSchema = z
  .object({
    max_swr: z.number(),
    low_hz: frequencySchema,
    low_u95_hz: halfWidth,
    high_hz: frequencySchema,
    high_u95_hz: halfWidth,
    width_hz: frequencySchema,
    width_u95_hz: halfWidth,
    low_open: z.boolean().meta({ description: 'The sweep began within the limit.' }),
    high_open: z.boolean().meta({ description: 'The sweep ended within the limit.' }),
  })
  .meta({ id: 'MeasuredSpan', description: 'Where SWR is within the limit about the minimum.' });

const bandSchema = z
  .object({
    band: z.string(),
    swept_fraction: z.number(),
    usable_fraction: z.number(),
    resonances: z.array(resonanceSchema).meta({ description: 'Ascending in frequency.' }),
    minimum: minimumSchema.nullable(),
    span: spanSchema.nullable(),
    flags: z.array(z.string()).meta({ description: 'Codes of the quality flags.' }),
  })
  .meta({ id: 'BandMeasures', description: 'What one sweep measured in and near one band.' });

export const historyRowSchema = z
  .object({
    sweep_id: idSchema,
    measured_at: timeSchema.nullable().meta({ description: 'Null if nobody said.' }),
    received_at: timeSchema,
    analyzer_id: idSchema.nullable(),
    ...conditionsFields,
    conditions: z.string().nullable(),
    era: z.int().min(0).meta({
      description: '0 before the first work on the antenna, one more with each but inspections.',
    }),
    plane: planeSchema,
    phase: phaseSchema,
    reference_ohm: z.number(),
    max_swr: z.number(),
    bands: z.array(bandSchema),
  })
  .meta({ id: 'HistoryRow', description: 'One sweep in the history of its antenna.' });

type RowWire = z.output<typeof historyRowSchema>;

/** A row as it is sent; with a band, only what concerns that one. */
export function historyRowToWire({ record, row }: MeasuredRow, band: string | undefined): RowWire {
  const { facts, receivedAt } = record;
  const { plane, phase, referenceOhm, maxSwr, bands } = row.measures;
  return {
    sweep_id: row.sweepId,
    measured_at: facts.measuredAt,
    received_at: receivedAt,
    analyzer_id: row.analyzerId,
    ...conditionsToWire(facts),
    conditions: facts.conditions,
    era: row.eraIndex,
    plane,
    phase,
    reference_ohm: referenceOhm,
    max_swr: maxSwr,
    bands: rounded(
      toSnakeCase(band === undefined ? bands : bands.filter((one) => one.band === band)),
    ),
  };
}

const csvColumns = [
  'sweep_id',
  'measured_at',
  'received_at',
  'analyzer_id',
  'weather',
  'wind_m_s',
  'temperature_c',
  'ground',
  'conditions',
  'era',
  'plane',
  'phase',
  'reference_ohm',
  'band',
  'swept_fraction',
  'usable_fraction',
  'resonance_hz',
  'resonance_u95_hz',
  'resonance_kind',
  'resistance_ohm',
  'resistance_u95_ohm',
  'resonance_swr',
  'resonance_swr_u95',
  'q',
  'q_u95',
  'grazing',
  'minimum_hz',
  'minimum_u95_hz',
  'minimum_swr',
  'minimum_swr_u95',
  'minimum_at_edge',
  'max_swr',
  'span_low_hz',
  'span_high_hz',
  'span_width_hz',
  'span_width_u95_hz',
  'span_open',
  'flags',
] as const;

/** Rows as comma-separated text: a line for each resonance, or one for a band that has none. */
export function historyCsv(rows: readonly RowWire[]): string {
  const lines = rows.flatMap((row) => row.bands.flatMap((band) => bandLines(row, band)));
  return [csvLine(csvColumns), ...lines, ''].join('\r\n');
}

function bandLines(row: RowWire, band: RowWire['bands'][number]): readonly string[] {
  const { minimum, span } = band;
  const before = [
    row.sweep_id,
    row.measured_at,
    row.received_at,
    row.analyzer_id,
    row.weather,
    row.wind_m_s,
    row.temperature_c,
    row.ground,
    row.conditions,
    row.era,
    row.plane,
    row.phase,
    row.reference_ohm,
    band.band,
    band.swept_fraction,
    band.usable_fraction,
  ];
  const after = [
    minimum?.frequency_hz ?? null,
    minimum?.frequency_u95_hz ?? null,
    minimum?.swr ?? null,
    minimum?.swr_u95 ?? null,
    minimum?.at_edge ?? null,
    row.max_swr,
    span?.low_hz ?? null,
    span?.high_hz ?? null,
    span?.width_hz ?? null,
    span?.width_u95_hz ?? null,
    span === null ? null : span.low_open || span.high_open,
    band.flags.join(' '),
  ];
  if (band.resonances.length === 0) return [csvLine([...before, ...noResonance, ...after])];
  return band.resonances.map((resonance) =>
    csvLine([
      ...before,
      resonance.frequency_hz,
      resonance.frequency_u95_hz,
      resonance.kind,
      resonance.resistance_ohm,
      resonance.resistance_u95_ohm,
      resonance.swr,
      resonance.swr_u95,
      resonance.q,
      resonance.q_u95,
      resonance.grazing,
      ...after,
    ]),
  );
}

const noResonance: readonly null[] = Array.from({ length: 10 }, () => null);

import { z } from 'zod';
import type { StatedInstrumentError } from '../../core/analysis/instrument-error.ts';
import type { Plane } from '../../core/analysis/summary.ts';
import { bandNames } from '../../core/bands/plan.ts';
import type { UsableReport } from '../../core/bands/usable-report.ts';
import { toSnakeCase } from './case.ts';
import { cautionSchema, frequencySchema, idSchema } from './common.ts';
import { familySchema, statusSchema } from './plan.ts';
import { residualErrorsSchema } from './residual-errors.ts';
import { rounded } from './rounding.ts';
import { planeSchema, type SweepIdentity } from './summary.ts';

const rangeSchema = z.object({ low_hz: frequencySchema, high_hz: frequencySchema });

const rangeUse = {
  ...rangeSchema.shape,
  permission: z.enum(['general', 'part_national', 'national']).meta({
    description: 'Whether the plan permits it generally, in part, or only by national rule.',
  }),
  verdict: z.enum(['usable', 'partly_usable', 'not_usable', 'partly_swept', 'not_swept']),
  marginal: z.boolean().meta({
    description:
      'The verdict hangs on a difference smaller than the half-width of the measurement.',
  }),
  swept_fraction: z.number().min(0).max(1),
  usable_fraction: z.number().min(0).max(1),
  worst_swr: z.number().nullable(),
  worst_swr_hz: z.number().nullable(),
  worst_swr_u95: z.number().nullable(),
  minimum_swr: z.number().nullable(),
  minimum_swr_hz: z.number().nullable(),
};

const segmentSchema = z.object({
  use: z.string(),
  family: familySchema,
  status: statusSchema.nullable(),
  licence: z.string().nullable(),
  max_bandwidth_hz: z.number().nullable(),
  ...rangeUse,
});

const bandSchema = z
  .object({
    band: z.enum(bandNames),
    ...rangeUse,
    ranges: z.array(rangeSchema).meta({ description: 'What is generally permitted.' }),
    detail: z.string().meta({ description: 'The verdict in a sentence.' }),
    spans: z.array(rangeSchema).meta({ description: 'Where SWR is within the limit.' }),
    segments: z.array(segmentSchema),
  })
  .meta({ id: 'BandUse', description: 'How much of one band is usable.' });

/** The usable-band report of a sweep. */
export const usableSchema = z
  .object({
    sweep_id: idSchema,
    antenna_id: idSchema,
    analysis_version: z.string(),
    plane: planeSchema,
    reference_ohm: z.number(),
    residual_errors: residualErrorsSchema.nullable(),
    plan: z.string(),
    licence: z.string().nullable(),
    max_swr: z.number(),
    design_bands: z.array(z.string()),
    bands: z.array(bandSchema),
    cautions: z.array(cautionSchema),
  })
  .meta({ id: 'UsableReport', description: 'Which part of each band of a plan is usable.' });

/** How a sweep is looked at for a report, beside what the report itself says. */
interface ReportBasis {
  readonly residualErrors: StatedInstrumentError | null;
  readonly analysisVersion: string;
  readonly plane: Plane;
  readonly referenceOhm: number;
  readonly designBands: readonly string[];
}

/** A report as it is sent and stored. */
export function usableToWire(
  { sweepId, antennaId }: SweepIdentity,
  basis: ReportBasis,
  report: UsableReport,
): z.output<typeof usableSchema> {
  return {
    sweep_id: sweepId,
    antenna_id: antennaId,
    analysis_version: basis.analysisVersion,
    plane: basis.plane,
    reference_ohm: basis.referenceOhm,
    design_bands: [...basis.designBands],
    residual_errors: toSnakeCase(basis.residualErrors),
    ...rounded(toSnakeCase(report)),
  };
}

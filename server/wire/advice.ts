import { z } from 'zod';
import type { HotSpots } from '../../core/advice/hot-spots.ts';
import type { BandMatch } from '../../core/advice/match/band-swr.ts';
import type { MatchAdvice, MatchOption } from '../../core/advice/match/match-options.ts';
import { bandNames } from '../../core/bands/plan.ts';
import type { Advice } from '../advice/advise.ts';
import type { ReportBasis } from '../report-basis.ts';
import { hotSpotsSchema, powerSchema, trimSchema } from './advice-parts.ts';
import { toSnakeCase } from './case.ts';
import { cautionSchema, frequencySchema, idSchema } from './common.ts';
import { matchSchema } from './match.ts';
import { rounded } from './rounding.ts';
import { absenceSchema, planeSchema, type SweepIdentity } from './summary.ts';

const findingSchema = z
  .object({
    code: z.string(),
    detail: z.string(),
    next: z.enum(['trim', 'match', 'line_check', 'measure_at_feed_point', 'sweep_again', 'leave']),
    band: z
      .string()
      .nullable()
      .meta({ description: 'The band or part it concerns; null for the whole sweep.' }),
  })
  .meta({ id: 'Finding', description: 'What a sweep shows, in a sentence, and what to do next.' });

/** What to do next about an antenna. */
export const adviceSchema = z
  .object({
    sweep_id: idSchema,
    antenna_id: idSchema,
    analysis_version: z.string(),
    plane: planeSchema,
    reference_ohm: z.number(),
    max_swr: z.number(),
    range: z
      .object({ name: z.string(), low_hz: frequencySchema, high_hz: frequencySchema })
      .nullable()
      .meta({ description: 'What the advice is for; null where the sweep reaches no band.' }),
    target_hz: frequencySchema.nullable(),
    target_from: z
      .enum(['asked', 'middle'])
      .nullable()
      .meta({ description: 'Whether the target was asked for or is the middle of the range.' }),
    findings: z.array(findingSchema),
    trim: trimSchema.nullable(),
    match: matchSchema.nullable(),
    power: powerSchema.nullable(),
    hot_spots: hotSpotsSchema.nullable(),
    absent: z.array(absenceSchema).meta({ description: 'Why a part is null.' }),
    cautions: z.array(cautionSchema),
  })
  .meta({ id: 'Advice', description: 'What to do next about an antenna, from one sweep of it.' });

/** The bands that an advice can be asked for. */
export const adviceBandSchema = z.enum(bandNames);

/** An advice as it is sent. */
export function adviceToWire(
  { sweepId, antennaId }: SweepIdentity,
  basis: ReportBasis,
  { match, hotSpots, ...rest }: Advice,
): z.output<typeof adviceSchema> {
  const { absent, cautions, ...parts } = rounded(toSnakeCase(rest));
  return {
    sweep_id: sweepId,
    antenna_id: antennaId,
    analysis_version: basis.analysisVersion,
    plane: basis.plane,
    reference_ohm: basis.referenceOhm,
    max_swr: basis.maxSwr,
    ...parts,
    match: match === null ? null : matchToWire(match),
    hot_spots: hotSpots === null ? null : hotSpotsToWire(hotSpots),
    absent,
    cautions,
  };
}

/** Frequencies at which SWR is listed; what is said of the whole band comes from all points. */
const mostListed = 61;

function matchToWire(match: MatchAdvice): z.output<typeof matchSchema> {
  const { frequencyHz, unmatched, options, load, ...rest } = match;
  const listed = spread(frequencyHz.length);
  return rounded({
    ...toSnakeCase(rest),
    load_resistance_ohm: load.re,
    load_reactance_ohm: load.im,
    frequency_hz: listed.map((i) => frequencyHz[i]),
    unmatched: { ...bandToWire(unmatched), swr: swrAt(unmatched, listed) },
    options: options.map((option) => optionToWire(option, listed)),
  });
}

function optionToWire(
  { kind, elements, exact, nearestElements, nearest }: MatchOption,
  listed: readonly number[],
) {
  return {
    kind,
    elements: elements.map((element) => toSnakeCase(element)),
    exact: bandToWire(exact),
    nearest_elements: nearestElements.map((element) => toSnakeCase(element)),
    nearest: { ...bandToWire(nearest), swr: swrAt(nearest, listed) },
  };
}

function bandToWire({ swr: _, worstSwr, ...rest }: BandMatch) {
  return { ...toSnakeCase(rest), worst_swr: finite(worstSwr) };
}

/** Four decimals: a drawing and a reader need no more. */
function swrAt({ swr }: BandMatch, listed: readonly number[]): (number | null)[] {
  return listed.map((i) => (Number.isFinite(swr[i]) ? Number(swr[i].toFixed(4)) : null));
}

/** Places in a list, the first and the last among them, evenly spread. */
function spread(length: number): number[] {
  const count = Math.min(length, mostListed);
  return Array.from({ length: count }, (_, i) => Math.round((i * (length - 1)) / (count - 1)));
}

function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

function hotSpotsToWire(hot: HotSpots): z.output<typeof hotSpotsSchema> {
  const { distanceM, currentA, voltageV, ...rest } = hot;
  return rounded({
    ...toSnakeCase(rest),
    distance_m: [...distanceM],
    current_a: [...currentA],
    voltage_v: [...voltageV],
  });
}

import { z } from 'zod';
import { attenuationDbPer100M } from '../../core/line/attenuation.ts';
import type { Cable } from '../../core/line/cable.ts';
import type { CatalogueCable } from '../../core/line/cables.ts';
import { cableOfRecord } from '../lines/club-cables.ts';
import type { CableFacts, CableRecord } from '../store/port.ts';
import {
  frequencySchema,
  idSchema,
  inventedSchema,
  keySchema,
  noteSchema,
  timeSchema,
} from './common.ts';
import { rounded } from './rounding.ts';

const halfWidth = z.number().nullable().default(null);
const halfWidthNote = 'Half-width of the 95 % interval; null takes what is usual for cables.';

/** A cable as a club states it. Whether the figures make sense is judged by the fit. */
export const newCableSchema = z.strictObject({
  key: keySchema,
  name: z.string().min(1).max(100),
  characteristic_ohm: z.number(),
  characteristic_u95_ohm: halfWidth.meta({ description: halfWidthNote }),
  velocity_factor: z.number(),
  velocity_factor_u95: halfWidth.meta({ description: halfWidthNote }),
  points: z
    .array(z.strictObject({ frequency_hz: z.number(), loss_db_per_100_m: z.number() }))
    .meta({ description: 'Matched loss at a few frequencies: three or more show the misfit.' }),
  loss_u95_fraction: halfWidth.meta({
    description: 'Half-width of the loss as a fraction of it; null: 0.15, or twice the misfit.',
  }),
  source: z.string().max(500).default('').meta({ description: 'Where the figures are from.' }),
  note: noteSchema.default(''),
});

const lossSchema = z.object({
  frequency_hz: frequencySchema,
  loss_db_per_100_m: z.number(),
  fitted_db_per_100_m: z.number().meta({ description: 'What the law gives there.' }),
  use: z.enum(['nominal', 'limit', 'doubtful']).meta({ description: 'Only `nominal` is fitted.' }),
  source: z.string(),
});

export const cableSchema = z
  .object({
    key: z.string().meta({ description: 'By which a feed line names it.' }),
    origin: z.enum(['reference', 'club']),
    id: idSchema.nullable().meta({ description: 'Of a club’s own; null for reference cables.' }),
    aliases: z.array(z.string()),
    name: z.string(),
    characteristic_ohm: z.number(),
    characteristic_u95_ohm: z.number(),
    velocity_factor: z.number(),
    velocity_factor_u95: z.number(),
    attenuation: z
      .object({
        conductor_db_per_100_m: z.number().meta({ description: 'k1: the part at 1 MHz.' }),
        dielectric_db_per_100_m: z.number().meta({ description: 'k2: the part at 1 MHz.' }),
        low_hz: frequencySchema,
        high_hz: frequencySchema,
        residual_rms: z.number().nullable(),
        residual_largest: z.number().nullable().meta({
          description:
            'Greatest |fitted / given - 1|; null where two points leave nothing to judge.',
        }),
      })
      .meta({ description: 'Matched loss k1 sqrt(f) + k2 f with f in MHz, fitted to the points.' }),
    loss_u95_fraction: z.number(),
    losses: z.array(lossSchema),
    verified: z.string().meta({ description: 'Where impedance and velocity factor are from.' }),
    note: z.string().nullable(),
    invented: inventedSchema,
    created_at: timeSchema.nullable(),
    created_by: idSchema.nullable(),
  })
  .meta({ id: 'Cable', description: 'A type of cable: reference data, or the club’s own.' });

type CableWire = z.output<typeof cableSchema>;

/** A reference cable as it is sent, with the source of every figure. */
export function referenceCableToWire(cable: CatalogueCable): CableWire {
  return rounded({
    ...cableToWire(cable),
    origin: 'reference' as const,
    id: null,
    aliases: [...cable.aliases],
    losses: cable.losses.map(({ frequencyHz, lossDbPer100M, verified, use }) => ({
      ...lossToWire(cable, frequencyHz, lossDbPer100M),
      use,
      source: verified,
    })),
    verified: cable.verified,
    note: cable.note,
    invented: false,
    created_at: null,
    created_by: null,
  });
}

/** A club's own cable as it is sent. */
export function clubCableToWire(record: CableRecord): CableWire {
  const cable = cableOfRecord(record);
  const { facts } = record;
  const source = facts.source === '' ? 'not stated' : facts.source;
  return rounded({
    ...cableToWire(cable),
    origin: 'club' as const,
    id: record.id,
    aliases: [],
    losses: facts.points.map(({ frequencyHz, lossDbPer100M }) => ({
      ...lossToWire(cable, frequencyHz, lossDbPer100M),
      use: 'nominal' as const,
      source,
    })),
    verified: `as the club states it: ${source}`,
    note: facts.note,
    invented: facts.invented,
    created_at: record.createdAt,
    created_by: record.createdBy,
  });
}

/** What a body tells of a cable, as it is kept. */
export function cableFactsOf(body: z.output<typeof newCableSchema>): CableFacts {
  return {
    name: body.name,
    characteristicOhm: body.characteristic_ohm,
    characteristicU95Ohm: body.characteristic_u95_ohm,
    velocityFactor: body.velocity_factor,
    velocityFactorU95: body.velocity_factor_u95,
    points: body.points.map((point) => ({
      frequencyHz: point.frequency_hz,
      lossDbPer100M: point.loss_db_per_100_m,
    })),
    lossU95Fraction: body.loss_u95_fraction,
    source: body.source,
    note: body.note,
    invented: false,
  };
}

function cableToWire({ attenuation, ...cable }: Cable) {
  return {
    key: cable.id,
    name: cable.name,
    characteristic_ohm: cable.characteristicOhm,
    characteristic_u95_ohm: cable.characteristicU95Ohm,
    velocity_factor: cable.velocityFactor,
    velocity_factor_u95: cable.velocityFactorU95,
    attenuation: {
      conductor_db_per_100_m: attenuation.conductorDbPer100M,
      dielectric_db_per_100_m: attenuation.dielectricDbPer100M,
      low_hz: attenuation.lowHz,
      high_hz: attenuation.highHz,
      residual_rms: attenuation.residualRms,
      residual_largest: attenuation.residualLargest,
    },
    loss_u95_fraction: cable.lossU95Fraction,
  };
}

function lossToWire({ attenuation }: Cable, frequencyHz: number, lossDbPer100M: number) {
  return {
    frequency_hz: frequencyHz,
    loss_db_per_100_m: lossDbPer100M,
    fitted_db_per_100_m: attenuationDbPer100M(attenuation, frequencyHz),
  };
}

import { z } from 'zod';
import { assumptionSchema, cautionSchema, frequencySchema } from './common.ts';
import { absenceSchema } from './summary.ts';

export const goalSchema = z.enum(['resonance', 'swr_minimum']);

const sensitivitySchema = z
  .object({
    hz_per_m: z.number(),
    u95_hz_per_m: z.number().nullable(),
    pairs: z.int(),
    largest_change_m: z.number(),
  })
  .meta({ id: 'TrimSensitivity', description: 'What the antenna’s own work entries say.' });

export const trimSchema = z
  .object({
    method: z.enum(['own_sensitivity', 'simple_rule', 'trial', 'leave']).meta({
      description: 'By its own history, by proportion, or only by a small trial and a new sweep.',
    }),
    goal: goalSchema,
    direction: z.enum(['shorten', 'lengthen', 'leave']),
    frequency_change_hz: z.number(),
    length_change_m: z.number().nullable().meta({
      description: 'Of the whole conductor, negative is shorter; null where none can be given.',
    }),
    length_change_u95_m: z.number().nullable(),
    length_change_fraction: z.number().nullable(),
    trial_change_m: z.number().nullable(),
    sensitivity: sensitivitySchema.nullable(),
    detail: z.string(),
    assumptions: z.array(assumptionSchema),
    cautions: z.array(cautionSchema),
  })
  .meta({ id: 'TrimAdvice', description: 'The change of length that moves the antenna.' });

const feedPointStressSchema = z.object({
  power_w: z.number(),
  current_a: z.number(),
  current_peak_a: z.number(),
  voltage_v: z.number(),
  voltage_peak_v: z.number(),
  resistance_ohm: z.number(),
  reactance_ohm: z.number(),
});

const lineStressSchema = z.object({
  power_w: z.number(),
  largest_voltage_v: z.number(),
  largest_voltage_peak_v: z.number(),
  smallest_voltage_v: z.number(),
  largest_current_a: z.number(),
  characteristic_ohm: z.number(),
  swr: z.number(),
});

export const powerSchema = z
  .object({
    power_w: z.number(),
    frequency_hz: frequencySchema,
    feed_point: feedPointStressSchema.nullable(),
    line: lineStressSchema
      .nullable()
      .meta({ description: 'The most that occurs on the section next to the antenna.' }),
    absent: z.array(absenceSchema),
  })
  .meta({
    id: 'PowerAdvice',
    description:
      'Voltage and current, rms unless said otherwise. No figure here says that anything is safe.',
  });

const spotSchema = z.object({
  distance_m: z.number().meta({ description: 'Along one arm, from the feed.' }),
  what: z.enum(['high_current', 'high_voltage']),
  place: z.enum(['feed', 'end', 'along']),
  current_a: z.number(),
  voltage_v: z.number(),
});

const ohmRange = { low_ohm: z.number(), high_ohm: z.number(), source: z.string() };

export const hotSpotsSchema = z
  .object({
    radiator: z.enum([
      'half_wave_dipole',
      'half_wave_vertical',
      'quarter_wave_over_radials',
      'five_eighths_vertical',
      'loaded_short_dipole',
    ]),
    arm_m: z.number(),
    distance_m: z.array(z.number()),
    current_a: z.array(z.number()),
    voltage_v: z.array(z.number()),
    spots: z.array(spotSchema),
    expected: z.object(ohmRange).meta({ description: 'Feed resistance that theory expects.' }),
    measured_resistance_ohm: z.number().nullable(),
    comparison: z
      .object({ standing: z.enum(['below', 'within', 'above']), detail: z.string() })
      .nullable(),
    source: z.string(),
    assumptions: z.array(assumptionSchema),
    cautions: z.array(cautionSchema),
  })
  .meta({
    id: 'HotSpots',
    description: 'Where current and voltage are high along the radiator, by published theory.',
  });

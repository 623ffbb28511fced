import { z } from 'zod';
import { type Conditions, grounds, weathers } from '../../core/record/conditions.ts';

const weatherSchema = z
  .enum(weathers)
  .meta({ description: 'Whether rain, wet or snow lay on the antenna.' });
const groundSchema = z.enum(grounds).meta({ description: 'The ground under the antenna.' });
const windSchema = z.number().min(0).max(120).meta({ description: 'Wind, metres a second.' });
const temperatureSchema = z.number().min(-90).max(70).meta({ description: 'Air, °C.' });

/** The conditions in a query; what is left out is not known. */
export const conditionsQuery = {
  weather: weatherSchema.optional(),
  wind_m_s: z.coerce.number().pipe(windSchema).optional().meta({
    description: 'Wind, metres a second.',
  }),
  temperature_c: z.coerce.number().pipe(temperatureSchema).optional().meta({
    description: 'Air, °C.',
  }),
  ground: groundSchema.optional(),
};

/** The conditions as they are sent; null is not known. */
export const conditionsFields = {
  weather: weatherSchema.nullable(),
  wind_m_s: windSchema.nullable(),
  temperature_c: temperatureSchema.nullable(),
  ground: groundSchema.nullable(),
};

/** Conditions from facts, which may lack some. */
export function conditionsToWire(facts: Partial<Conditions>) {
  return {
    weather: facts.weather ?? null,
    wind_m_s: facts.windMS ?? null,
    temperature_c: facts.temperatureC ?? null,
    ground: facts.ground ?? null,
  };
}

/** Conditions from a query. */
export function conditionsOf(query: {
  readonly weather?: Conditions['weather'] | undefined;
  readonly wind_m_s?: number | undefined;
  readonly temperature_c?: number | undefined;
  readonly ground?: Conditions['ground'] | undefined;
}): Conditions {
  return {
    weather: query.weather ?? null,
    windMS: query.wind_m_s ?? null,
    temperatureC: query.temperature_c ?? null,
    ground: query.ground ?? null,
  };
}

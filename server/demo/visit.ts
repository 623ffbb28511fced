import type { Conditions, Weather } from '../../core/record/conditions.ts';
import type { Impedance } from './models/lumped.ts';

/** The club's analyzers by key. */
export type DemoAnalyzerKey = 'bench' | 'handheld' | 'logger';

/** The state of the world in which an antenna is measured. */
export interface Occasion {
  /** RFC 3339, UTC. */
  readonly measuredAt: string;
  readonly wet: boolean;
  /** Years since the record began, for slow changes. */
  readonly years: number;
}

/** An antenna as physics sees it: the impedance where the analyzer is connected, ohm. */
export type AntennaModel = (frequencyHz: number, occasion: Occasion) => Impedance;

/** One measurement of an antenna, before any numbers. */
export interface Visit {
  readonly measuredAt: string;
  readonly by: DemoAnalyzerKey;
  /** In the members' own words. */
  readonly conditions: string;
  readonly told: Conditions;
  readonly wet: boolean;
  readonly note: string;
}

/** The range that an antenna is swept over. */
export interface SweepRange {
  readonly lowHz: number;
  readonly highHz: number;
}

const recordBegan = Date.parse('2024-12-01T00:00:00Z');
const yearMs = 365.25 * 24 * 3600 * 1000;

/** A visit in dry conditions. */
export function dry(measuredAt: string, by: DemoAnalyzerKey, weather: string, note = ''): Visit {
  const told = toldOf('dry', weather);
  return { measuredAt, by, conditions: `dry, ${weather}`, told, wet: false, note };
}

/** A visit during or just after rain. */
export function wet(measuredAt: string, by: DemoAnalyzerKey, weather: string, note = ''): Visit {
  const told = toldOf(/rain|drizzle/.test(weather) ? 'rain' : 'wet_after_rain', weather);
  return { measuredAt, by, conditions: `wet, ${weather}`, told, wet: true, note };
}

/** The words as the members would have ticked them: `7 °C, rain`. */
function toldOf(weather: Weather, words: string): Conditions {
  const degrees = /-?\d+(?= °C)/.exec(words)?.[0];
  return {
    weather,
    windMS: null,
    temperatureC: degrees === undefined ? null : Number(degrees),
    ground: null,
  };
}

export function occasionOf({ measuredAt, wet: isWet }: Visit): Occasion {
  return { measuredAt, wet: isWet, years: (Date.parse(measuredAt) - recordBegan) / yearMs };
}

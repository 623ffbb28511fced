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
  readonly conditions: string;
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
  return { measuredAt, by, conditions: `dry, ${weather}`, wet: false, note };
}

/** A visit during or just after rain. */
export function wet(measuredAt: string, by: DemoAnalyzerKey, weather: string, note = ''): Visit {
  return { measuredAt, by, conditions: `wet, ${weather}`, wet: true, note };
}

export function occasionOf({ measuredAt, wet: isWet }: Visit): Occasion {
  return { measuredAt, wet: isWet, years: (Date.parse(measuredAt) - recordBegan) / yearMs };
}

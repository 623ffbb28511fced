import { theilSen } from '../../../core/record/statistics/theil-sen.ts';
import type { Gauges } from './gauges.ts';

/** What a soak may show at most; by no source, from what the service needs at rest. */
export const bounds = { growthMibPerHour: 60, handles: 100, logMib: 64 } as const;

export interface Verdict {
  /** Slope of the memory after warm-up with its 95 % interval, MiB an hour. */
  readonly slope: number;
  readonly slopeLow: number;
  readonly slopeHigh: number;
  readonly mostHandles: number;
  readonly mostLogMib: number;
  readonly faults: readonly string[];
}

/**
 * Judges the gauges after warm-up. Memory is at fault when the whole interval of its slope lies
 * above the bound: a slope that the readings do not show for sure is none.
 */
export function judge(gauges: readonly Gauges[]): Verdict {
  const hours = gauges.map(({ minute }) => minute / 60);
  const trend = theilSen(
    hours,
    gauges.map(({ residentMib }) => residentMib),
  );
  if (trend === null || trend.slopeLow === null || trend.slopeHigh === null) {
    throw new Error(`${gauges.length} readings are too few for a slope.`);
  }
  const { slope, slopeLow, slopeHigh } = trend;
  const mostHandles = Math.max(...gauges.map(({ handles }) => handles));
  const mostLogMib = Math.max(...gauges.map(({ logMib }) => logMib));
  const faults: string[] = [];
  if (slopeLow > bounds.growthMibPerHour) faults.push('memory grows');
  if (mostHandles > bounds.handles) faults.push('handles are left open');
  if (mostLogMib > bounds.logMib) faults.push('the write-ahead log is not cut');
  return { slope, slopeLow, slopeHigh, mostHandles, mostLogMib, faults };
}

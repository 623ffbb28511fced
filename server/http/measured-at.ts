import { Problem } from '../problems.ts';

/** How far a clock may run ahead before a time of measurement counts as not yet been. */
const clockToleranceMs = 24 * 3600 * 1000;

/** Refuses a time of measurement that lies in the future. Throws `implausible-fact`. */
export function refuseFuture(
  measuredAt: string | null,
  nowMs: number,
  place: { readonly parameter: string } | { readonly pointer: string } = {
    parameter: 'measured_at',
  },
): void {
  if (measuredAt === null || Date.parse(measuredAt) <= nowMs + clockToleranceMs) return;
  throw new Problem('implausible-fact', {
    errors: [{ detail: `${measuredAt} has not been yet.`, ...place }],
  });
}

/** `never_tested`: there is no sweep yet. `no_interval`: nobody said how often to test. */
export type DueState = 'overdue' | 'never_tested' | 'due_soon' | 'not_due' | 'no_interval';

/** When an antenna is to be tested again. */
export interface Due {
  readonly state: DueState;
  readonly intervalDays: number | null;
  /** Null where there is no interval. */
  readonly dueAtMs: number | null;
  /** Negative until then; null where there is no interval. */
  readonly overdueDays: number | null;
}

export interface DueQuestion {
  /** When the antenna came into the record: a first test is due at once. */
  readonly addedAtMs: number;
  readonly lastTestMs: number | null;
  readonly intervalDays: number | null;
  readonly nowMs: number;
}

const dayMs = 24 * 3600 * 1000;
/** Due soon begins this part of the interval before (our choice). */
const soonPart = 0.1;

/** When an antenna is due; the interval counts from its newest test. */
export function dueOf({ addedAtMs, lastTestMs, intervalDays, nowMs }: DueQuestion): Due {
  if (intervalDays === null) {
    return { state: 'no_interval', intervalDays, dueAtMs: null, overdueDays: null };
  }
  const dueAtMs = lastTestMs === null ? addedAtMs : lastTestMs + intervalDays * dayMs;
  const overdueDays = (nowMs - dueAtMs) / dayMs;
  if (lastTestMs === null) return { state: 'never_tested', intervalDays, dueAtMs, overdueDays };
  if (overdueDays > 0) return { state: 'overdue', intervalDays, dueAtMs, overdueDays };
  const isSoon = -overdueDays <= soonPart * intervalDays;
  return { state: isSoon ? 'due_soon' : 'not_due', intervalDays, dueAtMs, overdueDays };
}

/** Orders the longest overdue first, those without an interval last. */
export function byUrgency(a: Due, b: Due): number {
  if (a.overdueDays === null) return b.overdueDays === null ? 0 : 1;
  return b.overdueDays === null ? -1 : b.overdueDays - a.overdueDays;
}

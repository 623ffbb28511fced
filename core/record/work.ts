/** What can be done to an antenna, in the words of those who do it. */
export const workKinds = [
  'trimmed',
  'lengthened',
  'element_replaced',
  'line_replaced',
  'connector_remade',
  'matching_changed',
  'repaired',
  'moved',
  'other_work',
  'inspected',
] as const;
export type WorkKind = (typeof workKinds)[number];

/** A piece of work on an antenna. */
export interface Work {
  readonly kind: WorkKind;
  /** Milliseconds since 1970, UTC. */
  readonly doneAtMs: number;
  /** Of the whole element, metres, positive for longer; null if nobody said, and for other work. */
  readonly lengthChangeM: number | null;
}

/** Whether an antenna may be another one after the work; looking at it changes nothing. */
export function startsEra(kind: WorkKind): boolean {
  return kind !== 'inspected';
}

/** The times at which the eras after the first begin, ascending. */
export function eraStartsMs(work: readonly Pick<Work, 'kind' | 'doneAtMs'>[]): readonly number[] {
  return work
    .filter(({ kind }) => startsEra(kind))
    .map(({ doneAtMs }) => doneAtMs)
    .toSorted((a, b) => a - b);
}

/** The era of an instant: 0 before the first start; a start itself belongs to the new era. */
export function eraIndexAt(startsMs: readonly number[], atMs: number): number {
  let low = 0;
  let high = startsMs.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (startsMs[middle] <= atMs) low = middle + 1;
    else high = middle;
  }
  return low;
}

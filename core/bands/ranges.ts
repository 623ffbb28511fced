/** A closed range of frequency, hertz. */
export interface HzRange {
  readonly lowHz: number;
  readonly highHz: number;
}

/** The union of ranges, ascending and disjoint; ranges that touch become one. */
export function mergeRanges(ranges: readonly HzRange[]): readonly HzRange[] {
  const merged: { lowHz: number; highHz: number }[] = [];
  for (const { lowHz, highHz } of ranges.toSorted((a, b) => a.lowHz - b.lowHz)) {
    const last = merged.at(-1);
    if (last !== undefined && lowHz <= last.highHz) last.highHz = Math.max(last.highHz, highHz);
    else merged.push({ lowHz, highHz });
  }
  return merged;
}

/** What two unions (ascending, disjoint) share. Ranges that only touch share nothing. */
export function intersectRanges(
  one: readonly HzRange[],
  other: readonly HzRange[],
): readonly HzRange[] {
  const shared: HzRange[] = [];
  let i = 0;
  let j = 0;
  while (i < one.length && j < other.length) {
    const lowHz = Math.max(one[i].lowHz, other[j].lowHz);
    const highHz = Math.min(one[i].highHz, other[j].highHz);
    if (lowHz < highHz) shared.push({ lowHz, highHz });
    if (one[i].highHz < other[j].highHz) i++;
    else j++;
  }
  return shared;
}

/** The total width of disjoint ranges, hertz. */
export function widthOf(ranges: readonly HzRange[]): number {
  return ranges.reduce((sum, { lowHz, highHz }) => sum + (highHz - lowHz), 0);
}

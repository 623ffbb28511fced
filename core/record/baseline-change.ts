import type { BandBaseline, BaselineValue } from './baseline.ts';
import type { BandMeasures } from './measures.ts';

/** A difference from a baseline. `u95` is its half-width of a 95 % interval, null if unknown. */
export interface Difference {
  readonly value: number;
  readonly u95: number | null;
}

/** How a sweep of a band differs from the baseline of its era; null where either lacks the value. */
export interface BaselineChange {
  /** `changed`: some difference is beyond its half-width. `unknown`: no half-width is known. */
  readonly verdict: 'same' | 'changed' | 'unknown';
  readonly minimumSwr: Difference | null;
  /** Of the resonance that was nearest to the lowest SWR. */
  readonly resonanceHz: Difference | null;
  /** Without a half-width: the part of a band is not measured but follows. */
  readonly usableFraction: number;
}

/** A resonance that moved farther than this ratio is taken for another one (our choice). */
const farthest = 1.1;

/** Holds what a sweep measured in a band against the baseline of its era. */
export function changeSince(baseline: BandBaseline, measures: BandMeasures): BaselineChange {
  const { minimum, usableFraction } = measures;
  const minimumSwr = differenceFrom(baseline.minimumSwr, minimum?.swr, minimum?.swrU95);
  const resonanceHz = resonanceDifference(baseline, measures);
  const known = [minimumSwr, resonanceHz].flatMap((difference) =>
    difference === null || difference.u95 === null
      ? []
      : [Math.abs(difference.value) > difference.u95],
  );
  const verdict = known.length === 0 ? 'unknown' : known.includes(true) ? 'changed' : 'same';
  return {
    verdict,
    minimumSwr,
    resonanceHz,
    usableFraction: usableFraction - baseline.usableFraction.value,
  };
}

function resonanceDifference(
  { resonances, minimumHz }: BandBaseline,
  measures: BandMeasures,
): Difference | null {
  const before = nearest(resonances, ({ frequencyHz }) => frequencyHz.value, minimumHz?.value);
  if (before === null) return null;
  const beforeHz = before.frequencyHz.value;
  const alike = measures.resonances.filter(({ kind }) => kind === before.kind);
  const now = nearest(alike, ({ frequencyHz }) => frequencyHz, beforeHz);
  if (now === null) return null;
  const ratio = Math.max(now.frequencyHz / beforeHz, beforeHz / now.frequencyHz);
  if (ratio > farthest) return null;
  return differenceFrom(before.frequencyHz, now.frequencyHz, now.frequencyU95Hz);
}

function differenceFrom(
  baseline: BaselineValue | null,
  value: number | undefined,
  u95: number | null | undefined,
): Difference | null {
  if (baseline === null || value === undefined) return null;
  const isKnown = baseline.u95 !== null && u95 !== null && u95 !== undefined;
  return {
    value: value - baseline.value,
    u95: isKnown ? Math.hypot(baseline.u95 ?? 0, u95) : null,
  };
}

/** The item nearest to a place; the first where there is none. */
function nearest<Item>(
  items: readonly Item[],
  at: (item: Item) => number,
  place: number | undefined,
): Item | null {
  let found: Item | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (const item of items) {
    const away = place === undefined ? 0 : Math.abs(at(item) - place);
    if (away >= least) continue;
    least = away;
    found = item;
  }
  return found;
}

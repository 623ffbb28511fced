import type { DriftSweep } from './drift-series.ts';

/** A change that may have come over an antenna inside one era. */
export interface Candidate {
  readonly kind: 'trend' | 'step' | 'wet';
  readonly eraIndex: number;
  /** The last sweep before it, null if it is as old as the era; and the first sweep with it. */
  readonly before: number | null;
  /** Sweeps that show it, by their place in the series. */
  readonly after: readonly number[];
  readonly column: Float64Array;
  /** Largest value of the column: factor times reach is the change so far. */
  readonly reach: number;
}

const yearMs = 365.25 * 24 * 3600 * 1000;
const shortestTrendYears = 0.5;
const fewestOfTrend = 5;
const fewestBeforeStep = 3;
const fewestAfter = 2;

/** Everything that is tried on a series: trends from any sweep on, steps, and changes when wet. */
export function candidatesOf(sweeps: readonly DriftSweep[]): readonly Candidate[] {
  const eras = [...new Set(sweeps.map(({ eraIndex }) => eraIndex))];
  return eras.flatMap((era) => {
    const own = sweeps.flatMap(({ eraIndex }, i) => (eraIndex === era ? [i] : []));
    return [...trends(sweeps, own), ...steps(sweeps, own), ...whenWet(sweeps, own)];
  });
}

function candidate(
  kind: Candidate['kind'],
  sweeps: readonly DriftSweep[],
  own: readonly number[],
  from: number,
  valueAt: (place: number) => number,
): Candidate {
  const column = new Float64Array(sweeps.length);
  for (const place of own.slice(from)) column[place] = valueAt(place);
  const after = own.slice(from).filter((place) => column[place] !== 0);
  return {
    kind,
    eraIndex: sweeps[own[from]].eraIndex,
    before: from === 0 ? null : own[from - 1],
    after,
    column,
    reach: column.reduce((most, value) => Math.max(most, value), 0),
  };
}

function trends(sweeps: readonly DriftSweep[], own: readonly number[]): readonly Candidate[] {
  const found: Candidate[] = [];
  for (let from = 0; from + fewestOfTrend <= own.length; from++) {
    const startMs = sweeps[own[from]].measuredAtMs;
    const made = candidate('trend', sweeps, own, from, (place) => {
      return (sweeps[place].measuredAtMs - startMs) / yearMs;
    });
    if (made.reach >= shortestTrendYears) found.push(made);
  }
  return found;
}

function steps(sweeps: readonly DriftSweep[], own: readonly number[]): readonly Candidate[] {
  const found: Candidate[] = [];
  for (let from = fewestBeforeStep; from + fewestAfter <= own.length; from++) {
    const made = candidate('step', sweeps, own, from, () => 1);
    // What only wet sweeps show is no step yet.
    if (made.after.some((place) => sweeps[place].wetness !== 'wet')) found.push(made);
  }
  return found;
}

function whenWet(sweeps: readonly DriftSweep[], own: readonly number[]): readonly Candidate[] {
  const found: Candidate[] = [];
  const isDry = (place: number) => sweeps[place].wetness === 'dry';
  for (const [from, place] of own.entries()) {
    if (sweeps[place].wetness !== 'wet') continue;
    const made = candidate('wet', sweeps, own, from, (at) => Number(sweeps[at].wetness === 'wet'));
    const isKnownDry = own.filter(isDry).length >= fewestBeforeStep;
    if (made.after.length >= fewestAfter && isKnownDry) found.push(made);
  }
  return found;
}

/**
 * Whether most single sweeps bear a change out, not one wild value: those that show a step or the
 * wet lie beyond half of it, those before a step within.
 */
export function isBorneOut(
  { kind, before, after }: Candidate,
  factor: number,
  residuals: Float64Array,
  sweeps: readonly DriftSweep[],
): boolean {
  if (kind === 'trend') return true;
  const era = sweeps[after[0]].eraIndex;
  const without = sweeps.flatMap(({ eraIndex, wetness }, i) => {
    if (eraIndex !== era) return [];
    const isBefore = before === null || i <= before;
    return (kind === 'step' ? isBefore : wetness === 'dry') ? [residuals[i]] : [];
  });
  const level = without.toSorted((a, b) => a - b)[without.length >> 1];
  const shown = after
    .slice(0, 5)
    .filter((place) => (residuals[place] - level) * Math.sign(factor) > 0.4 * Math.abs(factor));
  return shown.length >= Math.min(after.length, 5) * 0.7;
}

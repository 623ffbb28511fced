import type { TrimPair } from '../advice/trim-history.ts';
import type { BandMeasures, HistoryRow } from './measures.ts';

/** A change of length between two sweeps, each the nearest to the work. */
export interface TrimOccasion {
  /** Positive for longer, metres. */
  readonly lengthChangeM: number;
  /** Newest first, all before the work and after any work before that. */
  readonly before: readonly HistoryRow[];
  /** Oldest first, all after the work and before any work after that. */
  readonly after: readonly HistoryRow[];
}

interface Place {
  readonly frequencyHz: number;
  readonly u95Hz: number | null;
}

/**
 * What each change of length did to the frequency: of the resonance with the lowest SWR, or of the
 * least SWR where either sweep knows no resonance. Sweeps by one analyzer are preferred to two, for
 * what an analyzer is off by then cancels; only sweeps of one plane are paired.
 */
export function trimPairsOf(occasions: readonly TrimOccasion[]): readonly TrimPair[] {
  return occasions.flatMap(({ lengthChangeM, before, after }) => {
    const pair = nearestPair(before, after);
    if (pair === null) return [];
    const change = frequencyChange(...pair);
    return change === null ? [] : [{ lengthChangeM, ...change }];
  });
}

function nearestPair(
  before: readonly HistoryRow[],
  after: readonly HistoryRow[],
): readonly [HistoryRow, HistoryRow] | null {
  let fallback: readonly [HistoryRow, HistoryRow] | null = null;
  for (const first of before) {
    for (const second of after) {
      if (first.measures.plane !== second.measures.plane) continue;
      if (first.analyzerId !== null && first.analyzerId === second.analyzerId) {
        return [first, second];
      }
      fallback ??= [first, second];
    }
  }
  return fallback;
}

function frequencyChange(
  first: HistoryRow,
  second: HistoryRow,
): Pick<TrimPair, 'frequencyChangeHz' | 'frequencyChangeU95Hz'> | null {
  const [one, other] = bandOfBoth(first, second) ?? [];
  if (one === undefined || other === undefined) return null;
  const resonances = [mainResonance(one), mainResonance(other)];
  const [from, to] = resonances.includes(null) ? [minimum(one), minimum(other)] : resonances;
  if (from === null || to === null) return null;
  const isKnown = from.u95Hz !== null && to.u95Hz !== null;
  return {
    frequencyChangeHz: to.frequencyHz - from.frequencyHz,
    frequencyChangeU95Hz: isKnown ? Math.hypot(from.u95Hz ?? 0, to.u95Hz ?? 0) : null,
  };
}

/** The band that serves best before the work, where the sweep after it has the band as well. */
function bandOfBoth(
  first: HistoryRow,
  second: HistoryRow,
): readonly [BandMeasures, BandMeasures] | null {
  const pairs = first.measures.bands.flatMap((one) => {
    const other = second.measures.bands.find(({ band }) => band === one.band);
    const isKnown = one.minimum !== null && other !== undefined && other.minimum !== null;
    return isKnown ? [[one, other] as const] : [];
  });
  const lowest = ([{ minimum: least }]: readonly [BandMeasures, BandMeasures]) => least?.swr ?? 0;
  return pairs.toSorted((a, b) => lowest(a) - lowest(b)).at(0) ?? null;
}

function mainResonance({ resonances }: BandMeasures): Place | null {
  const [main] = resonances
    .filter(({ grazing, kind, swr }) => !grazing && kind === 'series' && swr !== null)
    .toSorted((a, b) => (a.swr ?? 0) - (b.swr ?? 0));
  if (main === undefined) return null;
  return { frequencyHz: main.frequencyHz, u95Hz: main.frequencyU95Hz };
}

function minimum({ minimum: least }: BandMeasures): Place | null {
  if (least === null || least.atEdge) return null;
  return { frequencyHz: least.frequencyHz, u95Hz: least.frequencyU95Hz };
}

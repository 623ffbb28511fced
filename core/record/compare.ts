import type { AntennaKind } from '../advice/antenna-kind.ts';
import { trimAdvice } from '../advice/trim.ts';
import type { TrimPair } from '../advice/trim-history.ts';
import type { Caution } from '../analysis/summary.ts';
import type { Sweep } from '../sweep.ts';
import { assign, forbidden } from './assignment.ts';
import { type CurveDifference, curveDifference } from './curve-difference.ts';
import type { BandMeasures, HistoryRow, MeasuredResonance } from './measures.ts';

/** `cannot_tell`: a half-width is unknown. */
export type ChangeVerdict = 'same_within_uncertainty' | 'changed' | 'cannot_tell';

/** Second less first. */
export interface MeasureChange {
  readonly first: number;
  readonly second: number;
  readonly difference: number;
  /** Root sum of squares of both half-widths; null if either is unknown. */
  readonly u95: number | null;
  readonly verdict: ChangeVerdict;
}

export interface ResonanceChange {
  readonly kind: MeasuredResonance['kind'];
  readonly frequencyHz: MeasureChange;
  readonly resistanceOhm: MeasureChange | null;
  readonly swr: MeasureChange | null;
  readonly q: MeasureChange | null;
}

/** What changed in and near one band. A field is null where either sweep does not have it. */
export interface BandChange {
  readonly band: string;
  readonly resonances: readonly ResonanceChange[];
  /** Frequencies of resonances without a partner in the other sweep. */
  readonly onlyFirstHz: readonly number[];
  readonly onlySecondHz: readonly number[];
  readonly minimumHz: MeasureChange | null;
  readonly minimumSwr: MeasureChange | null;
  readonly spanLowHz: MeasureChange | null;
  readonly spanHighHz: MeasureChange | null;
  readonly spanWidthHz: MeasureChange | null;
  readonly verdict: ChangeVerdict;
}

/** The change of length that would move the frequency as it moved. */
export interface ExplainingLength {
  readonly band: string;
  readonly goal: 'resonance' | 'swr_minimum';
  readonly method: 'own_sensitivity' | 'simple_rule';
  /** Positive for longer. */
  readonly lengthChangeM: number | null;
  readonly lengthChangeFraction: number | null;
}

export interface Comparison {
  /** Why the two cannot be compared; nothing is, if there is any. */
  readonly obstacles: readonly Caution[];
  /** What may differ between them beside the antenna. */
  readonly cautions: readonly Caution[];
  readonly verdict: ChangeVerdict;
  readonly bands: readonly BandChange[];
  readonly curve: CurveDifference | null;
  readonly lengthChange: ExplainingLength | null;
}

/** One side of a comparison; the sweep is at the reference of the measures. */
export interface ComparedSweep {
  readonly row: HistoryRow;
  readonly antennaId: string;
  readonly sweep: Sweep;
}

/** What the antenna is, for the change of length. */
export interface ComparedAntenna {
  readonly kind: AntennaKind;
  readonly trims: readonly TrimPair[];
  /** A line lies between the plane of the sweeps and the antenna. */
  readonly throughLine: boolean;
}

/** Resonances farther apart than this part of their frequency are not paired. */
const farthestPair = 0.06;

/** Compares two sweeps measure by measure; differences are second less first. */
export function compareSweeps(
  first: ComparedSweep,
  second: ComparedSweep,
  antenna: ComparedAntenna,
): Comparison {
  const obstacles = obstaclesOf(first, second);
  if (obstacles.length > 0) {
    const nothing = { bands: [], curve: null, lengthChange: null, cautions: [] };
    return { obstacles, verdict: 'cannot_tell', ...nothing };
  }
  const bands = first.row.measures.bands.flatMap((one) => {
    const other = second.row.measures.bands.find(({ band }) => band === one.band);
    return other === undefined ? [] : [bandChange(one, other)];
  });
  return {
    obstacles,
    cautions: cautionsOf(first.row, second.row),
    verdict: joined(bands.map(({ verdict }) => verdict)),
    bands,
    curve: curveDifference(first.sweep, second.sweep),
    lengthChange: explainingLength(bands, antenna),
  };
}

function obstaclesOf(first: ComparedSweep, second: ComparedSweep): readonly Caution[] {
  const [one, other] = [first.row.measures, second.row.measures];
  const obstacles: Caution[] = [];
  if (first.antennaId !== second.antennaId) {
    const detail = 'They are of different antennas.';
    obstacles.push({ code: 'antennas_differ', detail });
  }
  if (one.plane !== other.plane) {
    const detail = 'One was taken at the feed point, the other at the analyzer’s end of the line.';
    obstacles.push({ code: 'planes_differ', detail });
  }
  if (one.referenceOhm !== other.referenceOhm) {
    const detail = `One refers to ${one.referenceOhm} ohm, the other to ${other.referenceOhm}, and without phase it cannot be moved.`;
    obstacles.push({ code: 'references_differ', detail });
  }
  const shared = one.bands.some(({ band }) => other.bands.some((same) => same.band === band));
  if (!shared) {
    obstacles.push({ code: 'no_common_band', detail: 'They have no band in common.' });
  }
  return obstacles;
}

function cautionsOf(first: HistoryRow, second: HistoryRow): readonly Caution[] {
  const cautions: Caution[] = [];
  const add = (code: string, detail: string) => cautions.push({ code, detail });
  if (first.analyzerId === null || second.analyzerId === null) {
    add('analyzer_unknown', 'Nobody said which analyzer took one of them: it may be another one.');
  } else if (first.analyzerId !== second.analyzerId) {
    add(
      'analyzers_differ',
      'They were taken by two analyzers: what these differ by is in the differences, and only in part in the half-widths.',
    );
  }
  if (first.condition === null || second.condition === null) {
    add(
      'weather_unknown',
      'The weather of one of them is not known: wet or snow may be the cause.',
    );
  } else if (first.condition !== second.condition) {
    add('weather_differs', 'The weather was another one: a difference may go with it.');
  }
  if (first.eraIndex !== second.eraIndex) {
    add('work_between', 'There was work on the antenna between them.');
  }
  if (first.measures.phase !== second.measures.phase) {
    add('phases_differ', 'One knows more of the phase than the other: resonances may be missing.');
  }
  add(
    'half_widths_only',
    'Half-widths are of the measurement: wind, sag and heat move an antenna between two visits as well.',
  );
  return cautions;
}

function bandChange(one: BandMeasures, other: BandMeasures): BandChange {
  const { pairs, onlyFirst, onlySecond } = pairedResonances(one.resonances, other.resonances);
  const resonances = pairs.map(([a, b]) => resonanceChange(a, b));
  const a = one.minimum?.atEdge === false ? one.minimum : null;
  const b = other.minimum?.atEdge === false ? other.minimum : null;
  const [s, t] = [one.span, other.span];
  const minimumHz = change(a?.frequencyHz, a?.frequencyU95Hz, b?.frequencyHz, b?.frequencyU95Hz);
  const minimumSwr = change(a?.swr, a?.swrU95, b?.swr, b?.swrU95);
  const isClosedBelow = s?.lowOpen === false && t?.lowOpen === false;
  const isClosedAbove = s?.highOpen === false && t?.highOpen === false;
  const spanLowHz = isClosedBelow ? change(s.lowHz, s.lowU95Hz, t.lowHz, t.lowU95Hz) : null;
  const spanHighHz = isClosedAbove ? change(s.highHz, s.highU95Hz, t.highHz, t.highU95Hz) : null;
  const spanWidthHz =
    isClosedBelow && isClosedAbove
      ? change(s.widthHz, s.widthU95Hz, t.widthHz, t.widthU95Hz)
      : null;
  const changes = [
    ...resonances.flatMap(({ frequencyHz, resistanceOhm, swr }) => [
      frequencyHz,
      resistanceOhm,
      swr,
    ]),
    minimumHz,
    minimumSwr,
    spanLowHz,
    spanHighHz,
  ];
  return {
    band: one.band,
    resonances,
    onlyFirstHz: onlyFirst.map(({ frequencyHz }) => frequencyHz),
    onlySecondHz: onlySecond.map(({ frequencyHz }) => frequencyHz),
    minimumHz,
    minimumSwr,
    spanLowHz,
    spanHighHz,
    spanWidthHz,
    verdict: joined(changes.flatMap((known) => known?.verdict ?? [])),
  };
}

function resonanceChange(a: MeasuredResonance, b: MeasuredResonance): ResonanceChange {
  const frequencyU95 = [a.frequencyU95Hz, b.frequencyU95Hz] as const;
  return {
    kind: a.kind,
    frequencyHz: changeOf(a.frequencyHz, frequencyU95[0], b.frequencyHz, frequencyU95[1]),
    resistanceOhm: change(a.resistanceOhm, a.resistanceU95Ohm, b.resistanceOhm, b.resistanceU95Ohm),
    swr: change(a.swr, a.swrU95, b.swr, b.swrU95),
    q: change(a.q, a.qU95, b.q, b.qU95),
  };
}

type Maybe = number | null | undefined;

function change(first: Maybe, firstU95: Maybe, second: Maybe, secondU95: Maybe) {
  if (first == null || second == null) return null;
  return changeOf(first, firstU95 ?? null, second, secondU95 ?? null);
}

function changeOf(
  first: number,
  firstU95: number | null,
  second: number,
  secondU95: number | null,
): MeasureChange {
  const difference = second - first;
  if (firstU95 === null || secondU95 === null) {
    return { first, second, difference, u95: null, verdict: 'cannot_tell' };
  }
  const u95 = Math.hypot(firstU95, secondU95);
  const verdict = Math.abs(difference) > u95 ? 'changed' : 'same_within_uncertainty';
  return { first, second, difference, u95, verdict };
}

/** One change is a change; nothing known tells nothing. */
function joined(verdicts: readonly ChangeVerdict[]): ChangeVerdict {
  if (verdicts.includes('changed')) return 'changed';
  return verdicts.includes('same_within_uncertainty') ? 'same_within_uncertainty' : 'cannot_tell';
}

function pairedResonances(
  first: readonly MeasuredResonance[],
  second: readonly MeasuredResonance[],
) {
  const ones = first.filter(({ grazing }) => !grazing);
  const others = second.filter(({ grazing }) => !grazing);
  const costs = ones.map((one) =>
    others.map((other) => {
      const cost = Math.abs(Math.log(one.frequencyHz / other.frequencyHz)) / farthestPair;
      return one.kind !== other.kind || cost > 1 ? forbidden : cost;
    }),
  );
  const columnOf = assign(costs, others.length, 1);
  const taken = new Set(columnOf);
  return {
    pairs: ones.flatMap((one, i) => {
      const column = columnOf[i];
      return column === null ? [] : [[one, others[column]] as const];
    }),
    onlyFirst: ones.filter((_, i) => columnOf[i] === null),
    onlySecond: others.filter((_, column) => !taken.has(column)),
  };
}

/** By the measure that moved and is known best: a series resonance, else the least SWR. */
function explainingLength(
  bands: readonly BandChange[],
  { kind, trims, throughLine }: ComparedAntenna,
): ExplainingLength | null {
  for (const { band, resonances, minimumHz } of bands) {
    const series = throughLine ? undefined : resonances.find((one) => one.kind === 'series');
    const goal = series === undefined ? 'swr_minimum' : 'resonance';
    const moved = series?.frequencyHz ?? minimumHz;
    if (moved === null || moved.verdict !== 'changed') continue;
    const advice = trimAdvice({
      kind,
      goal,
      fromHz: moved.first,
      fromU95Hz: moved.u95,
      targetHz: moved.second,
      lengthM: null,
      throughLine,
      history: trims,
    });
    if (!advice.ok) return null;
    const { method, lengthChangeM, lengthChangeFraction } = advice.value;
    if (method === 'trial' || method === 'leave') return null;
    return { band, goal, method, lengthChangeM, lengthChangeFraction };
  }
  return null;
}

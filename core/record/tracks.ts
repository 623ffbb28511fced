import { assign, forbidden } from './assignment.ts';
import type { HistoryRow, MeasuredResonance } from './measures.ts';
import {
  afterWork,
  firstState,
  predicted,
  type TrackModel,
  type TrackState,
  updated,
  usualTrackModel,
} from './track-filter.ts';

/** One resonance as one sweep saw it. */
export interface TrackPoint {
  readonly row: HistoryRow;
  readonly resonance: MeasuredResonance;
  /** Where it was expected; null at a track's first point. */
  readonly expectedHz: number | null;
  /** It lay farther off than drift, scatter and half-widths explain: this may be another resonance. */
  readonly jumped: boolean;
}

/**
 * `followed`: the newest sweep has it. `paused`: it was missing lately. `ended`: it was missing for so
 * long that what comes back later counts as another one.
 */
export type TrackStanding = 'followed' | 'paused' | 'ended';

/** One resonance through time. */
export interface ResonanceTrack {
  readonly kind: MeasuredResonance['kind'];
  readonly standing: TrackStanding;
  /** Ascending in time; never empty. */
  readonly points: readonly TrackPoint[];
}

/** Sweeps of the place in which a track is missing, one after the other, before it ends. */
const endsAfter = 4;
/** An innovation beyond this many standard deviations is not the same resonance. */
const gate = 4;
/** A jump may be of this part of the frequency at most. */
const farthestJump = 0.06;
/** Less of a band than this tells nothing of what is missing in it. */
const sweptEnough = 0.5;

interface OpenTrack {
  readonly kind: MeasuredResonance['kind'];
  readonly points: TrackPoint[];
  state: TrackState;
  eraIndex: number;
  missed: number;
}

interface Seen {
  readonly resonance: MeasuredResonance;
  readonly logHz: number;
  readonly varLog: number;
}

/**
 * Follows each resonance of one band through time. `rows` ascend in time and are of one plane.
 *
 * Each sweep's resonances are paired with the open tracks by the least sum of squared innovations,
 * each over its variance from half-widths, scatter and drift, so that two that cross go on as they
 * went; a pair beyond the gate is none. What is left over is paired once more as a jump. Series and
 * parallel resonances are never one. After work on the antenna a track may lie elsewhere. Sweeps
 * without phase, or of less than half of the band, neither show nor miss anything; resonances that
 * may be noise start nothing.
 */
export function followResonances(
  rows: readonly HistoryRow[],
  band: string,
  model: TrackModel = usualTrackModel,
): readonly ResonanceTrack[] {
  const open: OpenTrack[] = [];
  const ended: OpenTrack[] = [];
  for (const row of rows) {
    const measures = row.measures.bands.find((one) => one.band === band);
    if (measures === undefined || row.measures.phase !== 'signed') continue;
    const seen = measures.resonances
      .filter(({ grazing }) => !grazing)
      .map((resonance) => seenOf(resonance, model));
    step(open, row, seen, model);
    if (measures.sweptFraction < sweptEnough) forgive(open, row);
    for (const track of open.filter(({ missed }) => missed >= endsAfter)) {
      open.splice(open.indexOf(track), 1);
      ended.push(track);
    }
  }
  return [...ended, ...open]
    .map((track): ResonanceTrack => {
      const standing = ended.includes(track) ? 'ended' : track.missed > 0 ? 'paused' : 'followed';
      return { kind: track.kind, standing, points: track.points };
    })
    .toSorted((a, b) => a.points[0].row.measuredAtMs - b.points[0].row.measuredAtMs);
}

function seenOf(resonance: MeasuredResonance, { scatter }: TrackModel): Seen {
  const { frequencyHz, frequencyU95Hz } = resonance;
  const own = (frequencyU95Hz ?? 0) / 1.96 / frequencyHz;
  return { resonance, logHz: Math.log(frequencyHz), varLog: scatter ** 2 + own ** 2 };
}

function step(open: OpenTrack[], row: HistoryRow, seen: readonly Seen[], model: TrackModel): void {
  for (const track of open) {
    track.state = predicted(track.state, row.measuredAtMs, model);
    if (track.eraIndex !== row.eraIndex) track.state = afterWork(track.state, model);
    track.eraIndex = row.eraIndex;
    track.missed += 1;
  }
  const known = [...open];
  const left = new Set(seen);
  for (const [track, one] of paired(known, seen, innovationCost, gate ** 2)) {
    left.delete(one);
    extend(track, row, one, false);
  }
  const lost = known.filter(({ missed }) => missed > 0);
  for (const [track, one] of paired(lost, [...left], jumpCost, 1)) {
    left.delete(one);
    extend(track, row, one, true);
    track.state = firstState(row.measuredAtMs, one.logHz, one.varLog, model);
  }
  for (const one of left) open.push(begun(row, one, model));
}

function paired(
  tracks: readonly OpenTrack[],
  seen: readonly Seen[],
  costOf: (track: OpenTrack, one: Seen) => number,
  most: number,
): readonly (readonly [OpenTrack, Seen])[] {
  const costs = tracks.map((track) =>
    seen.map((one) => {
      if (track.kind !== one.resonance.kind) return forbidden;
      const cost = costOf(track, one);
      return cost > most ? forbidden : cost;
    }),
  );
  // Two that stay alone cost more than any pair that may be.
  const columnOf = assign(costs, seen.length, most / 2);
  return tracks.flatMap((track, i) => {
    const column = columnOf[i];
    return column === null ? [] : [[track, seen[column]] as const];
  });
}

function innovationCost({ state }: OpenTrack, { logHz, varLog }: Seen): number {
  return (logHz - state.logHz) ** 2 / (state.varLog + varLog);
}

function jumpCost({ state }: OpenTrack, { logHz }: Seen): number {
  return Math.abs(logHz - state.logHz) / farthestJump;
}

function extend(track: OpenTrack, row: HistoryRow, one: Seen, jumped: boolean): void {
  const expectedHz = Math.exp(track.state.logHz);
  track.points.push({ row, resonance: one.resonance, expectedHz, jumped });
  track.state = updated(track.state, one.logHz, one.varLog);
  track.missed = 0;
}

function begun(row: HistoryRow, { resonance, logHz, varLog }: Seen, model: TrackModel): OpenTrack {
  return {
    kind: resonance.kind,
    points: [{ row, resonance, expectedHz: null, jumped: false }],
    state: firstState(row.measuredAtMs, logHz, varLog, model),
    eraIndex: row.eraIndex,
    missed: 0,
  };
}

/** Takes back the misses of a sweep that did not look everywhere. */
function forgive(open: readonly OpenTrack[], row: HistoryRow): void {
  for (const track of open) {
    if (track.points.at(-1)?.row !== row) track.missed -= 1;
  }
}

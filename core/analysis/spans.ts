import type { Mismatch } from './mismatch.ts';
import { signChanges } from './scan.ts';
import type { UsableSpan } from './summary.ts';
import { zeroBetween } from './zero.ts';

/** A stretch that stays within this many half-widths of the limit may be noise. */
const doubtfulWithin = 1.5;

export interface Spans {
  readonly spans: readonly UsableSpan[];
  /** Frequencies at which the SWR touches the limit within the noise. */
  readonly grazingHz: readonly number[];
}

/** The squared magnitude of the reflection at an SWR. */
export function squareAtSwr(swr: number): number {
  return ((swr - 1) / (swr + 1)) ** 2;
}

interface Edge {
  readonly frequencyHz: number;
  readonly u95Hz: number | null;
  readonly isRising: boolean;
}

/**
 * The usable spans of a sweep, ascending: edges where the refined SWR crosses the limit. A stretch
 * between two crossings that stays within the noise of the limit makes no edge.
 */
export function findSpans(mismatch: Mismatch, scan: Float64Array, maxSwr: number): Spans {
  const limit = squareAtSwr(maxSwr);
  const excess = Float64Array.from(scan, (f) => mismatch.at(f).square - limit);
  const { edges, grazingHz } = significantEdges(mismatch, scan, excess, limit);
  const last = scan[scan.length - 1];
  const startsUsable = edges.length > 0 ? edges[0].isRising : isUsableThroughout(excess);
  const spans: UsableSpan[] = [];
  let low: Edge | null = null;
  if (startsUsable && edges.length === 0) {
    return { spans: [spanOf(maxSwr, scan[0], null, last, null)], grazingHz };
  }
  for (const edge of edges) {
    if (!edge.isRising) low = edge;
    else spans.push(spanOf(maxSwr, scan[0], low, last, edge));
  }
  if (edges.at(-1)?.isRising === false) spans.push(spanOf(maxSwr, scan[0], low, last, null));
  return { spans, grazingHz };
}

/** With every crossing put down to noise, the side on which most of the sweep lies decides. */
function isUsableThroughout(excess: Float64Array): boolean {
  let above = 0;
  let below = 0;
  for (const value of excess) {
    if (value > above) above = value;
    if (-value > below) below = -value;
  }
  return below >= above;
}

function spanOf(
  maxSwr: number,
  firstHz: number,
  low: Edge | null,
  lastHz: number,
  high: Edge | null,
): UsableSpan {
  const lowHz = low?.frequencyHz ?? firstHz;
  const highHz = high?.frequencyHz ?? lastHz;
  return {
    maxSwr,
    lowHz,
    lowU95Hz: low?.u95Hz ?? null,
    highHz,
    highU95Hz: high?.u95Hz ?? null,
    widthHz: highHz - lowHz,
    lowOpen: low === null,
    highOpen: high === null,
  };
}

function significantEdges(
  mismatch: Mismatch,
  scan: Float64Array,
  excess: Float64Array,
  limit: number,
): { readonly edges: readonly Edge[]; readonly grazingHz: readonly number[] } {
  const changes = signChanges(excess);
  const edges: Edge[] = [];
  const grazingHz: number[] = [];
  for (let i = 0; i < changes.length; i++) {
    const next = changes[i + 1];
    if (next !== undefined) {
      const farthest = farthestBetween(excess, changes[i].after, next.before);
      if (isWithinNoise(mismatch, scan[farthest], excess[farthest], limit)) {
        grazingHz.push(scan[farthest]);
        i += 1;
        continue;
      }
    }
    edges.push(edgeAt(mismatch, scan[changes[i].before], scan[changes[i].after], limit));
  }
  return { edges, grazingHz };
}

function farthestBetween(excess: Float64Array, from: number, to: number): number {
  let at = from;
  for (let i = from; i <= to; i++) if (Math.abs(excess[i]) > Math.abs(excess[at])) at = i;
  return at;
}

function isWithinNoise(
  mismatch: Mismatch,
  frequencyHz: number,
  excess: number,
  limit: number,
): boolean {
  const u95 = mismatch.magnitudeU95(frequencyHz);
  if (u95 === null) return false;
  const distance = Math.abs(Math.sqrt(Math.max(0, limit + excess)) - Math.sqrt(limit));
  return distance < doubtfulWithin * u95;
}

function edgeAt(mismatch: Mismatch, low: number, high: number, limit: number): Edge {
  const frequencyHz = zeroBetween((f) => mismatch.at(f).square - limit, low, high);
  const { slope } = mismatch.at(frequencyHz);
  const u95 = mismatch.magnitudeU95(frequencyHz);
  const magnitudeSlope = Math.abs(slope) / (2 * Math.sqrt(limit));
  const isRising = mismatch.at(high).square > limit;
  return {
    frequencyHz,
    u95Hz: u95 === null || slope === 0 ? null : u95 / magnitudeSlope,
    isRising,
  };
}

import type { Mismatch } from './mismatch.ts';
import { farthestFrom, type Scan, signChanges } from './scan.ts';
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
export function findSpans(mismatch: Mismatch, scan: Scan, maxSwr: number): Spans {
  const limit = squareAtSwr(maxSwr);
  const { frequencyHz, square } = scan;
  const { edges, grazingHz } = significantEdges(mismatch, scan, limit);
  const [firstHz] = frequencyHz;
  const lastHz = frequencyHz[frequencyHz.length - 1];
  const isWhole = edges.length === 0 && isUsableThroughout(square, limit);
  if (isWhole) return { spans: [spanOf(maxSwr, firstHz, null, lastHz, null)], grazingHz };
  const spans: UsableSpan[] = [];
  let low: Edge | null = null;
  for (const edge of edges) {
    if (edge.isRising) spans.push(spanOf(maxSwr, firstHz, low, lastHz, edge));
    else low = edge;
  }
  if (edges.at(-1)?.isRising === false) spans.push(spanOf(maxSwr, firstHz, low, lastHz, null));
  return { spans, grazingHz };
}

/** With every crossing put down to noise, the side on which most of the sweep lies decides. */
function isUsableThroughout(square: Float64Array, limit: number): boolean {
  let above = 0;
  let below = 0;
  for (const value of square) {
    above = Math.max(above, value - limit);
    below = Math.max(below, limit - value);
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
  { frequencyHz, square }: Scan,
  limit: number,
): { readonly edges: readonly Edge[]; readonly grazingHz: readonly number[] } {
  const changes = signChanges(square, limit);
  const edges: Edge[] = [];
  const grazingHz: number[] = [];
  for (let i = 0; i < changes.length; i++) {
    const next = changes[i + 1];
    if (next !== undefined) {
      const farthest = farthestFrom(square, limit, changes[i].after, next.before);
      if (isWithinNoise(mismatch, frequencyHz[farthest], square[farthest], limit)) {
        grazingHz.push(frequencyHz[farthest]);
        i += 1;
        continue;
      }
    }
    const { before, after } = changes[i];
    edges.push(edgeAt(mismatch, frequencyHz[before], frequencyHz[after], limit));
  }
  return { edges, grazingHz };
}

function isWithinNoise(
  mismatch: Mismatch,
  frequencyHz: number,
  square: number,
  limit: number,
): boolean {
  const u95 = mismatch.magnitudeNoiseU95(frequencyHz);
  if (u95 === null) return false;
  return Math.abs(Math.sqrt(square) - Math.sqrt(limit)) < doubtfulWithin * u95;
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

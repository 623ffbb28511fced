import { scaleUtc } from 'd3-scale';
import type { Tick } from './frequency-scale.ts';

const dayMs = 86_400_000;

/** Round instants of UTC, about one each `everyPx`, written as ISO 8601 dates no finer than needed. */
export function timeTicks(
  lowMs: number,
  highMs: number,
  lengthPx: number,
  everyPx: number,
): readonly Tick[] {
  const count = Math.max(2, Math.floor(lengthPx / everyPx));
  const instants = scaleUtc([lowMs, highMs], [0, 1])
    .ticks(count)
    .map((instant) => instant.valueOf());
  const stepMs = instants.length > 1 ? instants[1] - instants[0] : highMs - lowMs;
  const isDaily = (at: number) => at % dayMs === 0;
  const signs = stepMs > 360 * dayMs ? 4 : stepMs >= 28 * dayMs ? 7 : 10;
  return instants.filter(isDaily).map((at) => ({ at, text: isoTime(at).slice(0, signs) }));
}

/** An instant as ISO 8601, UTC. */
export function isoTime(atMs: number): string {
  return scaleUtc([atMs, atMs + 1], [0, 1])
    .domain()[0]
    .toISOString();
}

import { type Box, holds, overlap, type Point, runsThrough } from './boxes.ts';
import { textWidth } from './text-width.ts';

/** A text that belongs to a place. */
export interface Label {
  readonly text: string;
  readonly at: Point;
  /** Radius of the mark at the place. */
  readonly markPx: number;
  /** Not worth a leader: it is left out where there is no room beside the mark. */
  readonly isMinor?: boolean;
}

export interface PlacedLabel {
  readonly text: string;
  readonly box: Box;
  /** Where the baseline begins. */
  readonly baseline: Point;
  /** A line from the mark to a text that stands far from it. */
  readonly leader: readonly [Point, Point] | null;
}

export interface LabelRoom {
  readonly bounds: Box;
  /** What no label may cover: marks, and texts that are there already. */
  readonly blocked: readonly Box[];
  /** Whether a curve runs through a box; a label there is the last resort. */
  readonly isCrossed: (box: Box) => boolean;
  readonly sizePx: number;
}

const gapsPx = [4, 16, 32, 52, 76];
/** A leader longer than this part of the plot's height leads astray. */
const mostGap = 0.22;
const lineHeight = 1.2;
const descent = 0.28;
/** East, west, north, south, then the corners: where the text stands from its mark. */
const directions: readonly (readonly [number, number])[] = [
  [1, 0],
  [-1, 0],
  [0, -1],
  [0, 1],
  [1, -1],
  [-1, -1],
  [1, 1],
  [-1, 1],
];

/**
 * Places labels one after another, each at the nearest free place around its mark; null where there
 * is no room. Labels never overlap each other, a blocked box, a leader or the bounds.
 */
export function placeLabels(
  labels: readonly Label[],
  room: LabelRoom,
): readonly (PlacedLabel | null)[] {
  const taken = [...room.blocked];
  const leaders: (readonly [Point, Point])[] = [];
  return labels.map((label) => {
    const placed = placeLabel(label, { taken, leaders }, room);
    if (placed !== null) taken.push(placed.box);
    if (placed?.leader) leaders.push(placed.leader);
    return placed;
  });
}

interface Taken {
  readonly taken: readonly Box[];
  readonly leaders: readonly (readonly [Point, Point])[];
}

function placeLabel(label: Label, { taken, leaders }: Taken, room: LabelRoom): PlacedLabel | null {
  const width = textWidth(label.text, room.sizePx);
  let lastResort: PlacedLabel | null = null;
  const furthest = label.isMinor === true ? 0 : mostGap * (room.bounds.bottom - room.bounds.top);
  for (const gap of gapsPx.filter((one, i) => i === 0 || one <= furthest)) {
    for (const direction of directions) {
      const placed = candidate(label, direction, gap, width, room.sizePx);
      if (!holds(room.bounds, placed.box)) continue;
      if (taken.some((box) => isInTheWay(box, placed))) continue;
      if (leaders.some(([from, to]) => runsThrough(from, to, placed.box))) continue;
      if (!room.isCrossed(placed.box)) return placed;
      lastResort ??= placed;
    }
  }
  return lastResort;
}

/** Whether a box lies under the text or, unless it is that of the mark itself, under the leader. */
function isInTheWay(box: Box, { box: own, leader }: PlacedLabel): boolean {
  if (overlap(box, own)) return true;
  if (leader === null) return false;
  const [from, to] = leader;
  return (
    !holds(box, { left: from.x, right: from.x, top: from.y, bottom: from.y }) &&
    runsThrough(from, to, box)
  );
}

function candidate(
  { text, at, markPx }: Label,
  [east, south]: readonly [number, number],
  gap: number,
  width: number,
  sizePx: number,
): PlacedLabel {
  const height = sizePx * lineHeight;
  const off = markPx + gap;
  const centreX = at.x + east * (off + width / 2);
  const centreY = at.y + south * (off + height / 2);
  const box = {
    left: centreX - width / 2,
    right: centreX + width / 2,
    top: centreY - height / 2,
    bottom: centreY + height / 2,
  };
  const baseline = { x: box.left, y: box.bottom - descent * sizePx };
  const end = { x: nearest(at.x, box.left, box.right), y: nearest(at.y, box.top, box.bottom) };
  return { text, box, baseline, leader: gap <= gapsPx[0] ? null : [at, end] };
}

function nearest(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}

/** A place in pixels; y grows downwards. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/** A rectangle in pixels. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** Whether two rectangles share more than an edge. */
export function overlap(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

/** Whether the second rectangle lies in the first. */
export function holds(outer: Box, inner: Box): boolean {
  return (
    inner.left >= outer.left &&
    inner.right <= outer.right &&
    inner.top >= outer.top &&
    inner.bottom <= outer.bottom
  );
}

/** The square around a place. */
export function around({ x, y }: Point, halfPx: number): Box {
  return { left: x - halfPx, top: y - halfPx, right: x + halfPx, bottom: y + halfPx };
}

/** Whether a straight line runs through a rectangle (Liang, Barsky, ACM Trans. Graph. 3(1), 1984). */
export function runsThrough(from: Point, to: Point, box: Box): boolean {
  let entry = 0;
  let exit = 1;
  const clip = (step: number, room: number) => {
    if (step === 0) return room > 0;
    const at = room / step;
    if (step < 0) entry = Math.max(entry, at);
    else exit = Math.min(exit, at);
    return entry < exit;
  };
  return (
    clip(from.x - to.x, from.x - box.left) &&
    clip(to.x - from.x, box.right - from.x) &&
    clip(from.y - to.y, from.y - box.top) &&
    clip(to.y - from.y, box.bottom - from.y)
  );
}

/** What a reader with a ruler takes off a chart: parts of the SVG by the class that names them. */

export interface Place {
  readonly x: number;
  readonly y: number;
}

/** The source of the first element or group of this class. Throws where there is none. */
export function partOf(svg: string, name: string): string {
  const start = svg.search(new RegExp(`<\\w+ class="${name}"`));
  if (start < 0) throw new Error(`The chart has no ${name}.`);
  if (!svg.startsWith('<g', start)) return svg.slice(start, svg.indexOf('>', start) + 1);
  let depth = 0;
  for (const { index, 0: tag } of svg.slice(start).matchAll(/<g[ >]|<\/g>/g)) {
    depth += tag === '</g>' ? -1 : 1;
    if (depth === 0) return svg.slice(start, start + index + tag.length);
  }
  throw new Error(`The group ${name} does not end.`);
}

/** The corners of a path of this class. */
export function pathPoints(svg: string, name: string): readonly Place[] {
  const d = / d="([^"]*)"/.exec(partOf(svg, name))?.[1] ?? '';
  const points: Place[] = [];
  for (const [, start, steps] of d.matchAll(/M([^l]*)l([^M]*)/g)) {
    let [x, y] = start.split(' ').map(Number);
    const moves = steps.trim().split(/\s+/).map(Number);
    for (let i = 0; i < moves.length; i += 2) {
      x += moves[i];
      y += moves[i + 1];
      points.push({ x, y });
    }
  }
  return points;
}

/** Ticks of an axis: what is written, and where the tick is in pixels. */
export function axisTicks(
  svg: string,
  axis: 'axis-x' | 'axis-y',
): readonly { readonly text: string; readonly at: number }[] {
  const coordinate = axis === 'axis-x' ? 'x1' : 'y1';
  const tick = new RegExp(
    `<line [^>]*?${coordinate}="([-\\d.]+)"[^>]*/><text[^>]*>([^<]*)</text>`,
    'g',
  );
  return [...partOf(svg, axis).matchAll(tick)].map(([, at, text]) => ({ text, at: Number(at) }));
}

/** From pixels back to the value of a linear axis, by its outer ticks; decimal points in its texts. */
export function linearReader(svg: string, axis: 'axis-x' | 'axis-y'): (at: number) => number {
  const ticks = axisTicks(svg, axis);
  const first = ticks[0];
  const last = ticks[ticks.length - 1];
  const from = numberIn(first.text);
  const perPx = (numberIn(last.text) - from) / (last.at - first.at);
  return (at) => from + (at - first.at) * perPx;
}

/** A number as a chart writes it in English. */
export function numberIn(text: string): number {
  return text === '∞' ? Number.POSITIVE_INFINITY : Number(text.replace('\u2212', '-'));
}

/** The ordinate of a drawn line at an abscissa. */
export function heightAt(points: readonly Place[], x: number): number {
  const after = points.findIndex((point) => point.x >= x);
  const b = points[Math.max(1, after)];
  const a = points[Math.max(1, after) - 1];
  return a.y + ((b.y - a.y) * (x - a.x)) / (b.x - a.x);
}

/** The centre of a mark. */
export function markPlace(svg: string, name: string): Place {
  const part = partOf(svg, name);
  const disc = /cx="([-\d.]+)" cy="([-\d.]+)"/.exec(part);
  if (disc !== null) return { x: Number(disc[1]), y: Number(disc[2]) };
  const diamond = /M([-\d.]+) ([-\d.]+)l8 8/.exec(part);
  if (diamond !== null) return { x: Number(diamond[1]), y: Number(diamond[2]) + 8 };
  const square = /M([-\d.]+) ([-\d.]+)h8/.exec(part);
  if (square !== null) return { x: Number(square[1]) + 4, y: Number(square[2]) + 4 };
  throw new Error(`${name} is no mark.`);
}

import type { Box, Point } from './boxes.ts';
import type { Frame } from './frame.ts';
import { px } from './path-text.ts';
import { svgGroup, svgText } from './svg.ts';
import { textWidth } from './text-width.ts';

/** Where the reflection's plane lies in a chart. */
export interface ReflectionPlane {
  readonly centre: Point;
  /** Of total reflection. */
  readonly radiusPx: number;
}

/** The place of a reflection; its imaginary part points upwards. */
export function reflectionPoint({ centre, radiusPx }: ReflectionPlane, re: number, im: number) {
  return { x: centre.x + radiusPx * re, y: centre.y - radiusPx * im };
}

/** Multiples of the reference whose circles and arcs are drawn. */
const multiples = [0.2, 0.5, 1, 2, 5];

/**
 * The circles of constant resistance (centre r/(1 + r) on the real axis, radius 1/(1 + r)) and the
 * arcs of constant reactance (centre 1 + j/x, radius 1/|x|) of P. H. Smith, Transmission line
 * calculator, Electronics 12, January 1939; r and x are ohms over the reference.
 */
export function smithGridSvg(plane: ReflectionPlane, referenceOhm: number, frame: Frame): string {
  const { palette } = frame;
  const { centre, radiusPx } = plane;
  const circles = multiples.map((r) => {
    const { x } = reflectionPoint(plane, r / (1 + r), 0);
    return `<circle cx="${px(x)}" cy="${px(centre.y)}" r="${px(radiusPx / (1 + r))}"/>`;
  });
  const arcs = multiples.flatMap((x) => [arc(plane, x), arc(plane, -x)]);
  const lines = `<g fill="none" stroke="${palette.grid}">${circles.join('')}<path d="${arcs.join('')}"/></g>`;
  const axis = `<path class="zero" d="M${px(centre.x - radiusPx)} ${px(centre.y)}h${px(2 * radiusPx)}" stroke="${palette.frame}"/>`;
  const rim = `<circle class="rim" cx="${px(centre.x)}" cy="${px(centre.y)}" r="${px(radiusPx)}" fill="none" stroke="${palette.frame}"/>`;
  return svgGroup('smith-grid', lines + axis + rim + gridTexts(plane, referenceOhm, frame));
}

/** What the texts of the grid cover. */
export function gridTextBoxes(
  plane: ReflectionPlane,
  referenceOhm: number,
  frame: Frame,
): readonly Box[] {
  const { numbers, sizePx } = frame;
  const reactances = reactanceTexts(plane, referenceOhm, frame).map(({ text, at, anchor }) => {
    const width = textWidth(text, sizePx);
    const left = at.x - { start: 0, middle: 0.5, end: 1 }[anchor] * width;
    return { left, right: left + width, top: at.y - sizePx, bottom: at.y + 2 };
  });
  const resistances = multiples.map((r) => {
    const { x, y } = reflectionPoint(plane, (r - 1) / (r + 1), 0);
    const width = textWidth(numbers.significant(r * referenceOhm, 3), sizePx);
    return { left: x + 1, right: x + 5 + width, top: y - 1.2 * sizePx, bottom: y };
  });
  return [...reactances, ...resistances];
}

/** From the rim, where R is 0, to the point of infinite impedance. */
function arc(plane: ReflectionPlane, x: number): string {
  const square = x * x + 1;
  const from = reflectionPoint(plane, (x * x - 1) / square, (2 * x) / square);
  const to = reflectionPoint(plane, 1, 0);
  const radius = px(plane.radiusPx / Math.abs(x));
  return `M${px(from.x)} ${px(from.y)}A${radius} ${radius} 0 0 ${x > 0 ? 0 : 1} ${px(to.x)} ${px(to.y)}`;
}

/** Resistances along the real axis, reactances outside the rim, in ohms. */
function gridTexts(plane: ReflectionPlane, referenceOhm: number, frame: Frame): string {
  const { palette, numbers, sizePx } = frame;
  const size = sizePx - 1;
  const written = (multiple: number) => numbers.significant(multiple * referenceOhm, 3);
  const look = { sizePx: size, fill: palette.quietText, halo: palette.background } as const;
  const resistances = multiples.map((r) => {
    const { x, y } = reflectionPoint(plane, (r - 1) / (r + 1), 0);
    return svgText(written(r), { x: x + 3, y: y - 3 }, look);
  });
  const reactances = reactanceTexts(plane, referenceOhm, frame).map(({ text, at, anchor }) =>
    svgText(text, at, { ...look, anchor }),
  );
  return (
    svgGroup('resistances', resistances.join('')) + svgGroup('reactances', reactances.join(''))
  );
}

interface RimText {
  readonly text: string;
  readonly at: Point;
  readonly anchor: 'start' | 'middle' | 'end';
}

/** Beside the rim where each arc ends. */
function reactanceTexts(
  plane: ReflectionPlane,
  referenceOhm: number,
  { numbers, sizePx }: Frame,
): readonly RimText[] {
  const size = sizePx - 1;
  return multiples.flatMap((multiple) =>
    [multiple, -multiple].map((x): RimText => {
      const square = x * x + 1;
      const re = (x * x - 1) / square;
      const im = (2 * x) / square;
      const { x: left, y } = reflectionPoint(plane, re, im);
      return {
        text: `${x < 0 ? '\u2212' : '+'}${numbers.significant(multiple * referenceOhm, 3)}`,
        at: { x: left + 6 * re, y: y - 6 * im + size * (0.36 - 0.4 * im) },
        anchor: re < -0.3 ? 'end' : re > 0.3 ? 'start' : 'middle',
      };
    }),
  );
}

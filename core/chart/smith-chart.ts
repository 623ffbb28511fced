import type { ComplexSweep } from '../sweep.ts';
import { around, type Box, type Point } from './boxes.ts';
import type { ChartStyle } from './chart-style.ts';
import { CoveredCells } from './covered-cells.ts';
import { type Frame, frameOf, headingSvg } from './frame.ts';
import { frequencyUnit, linearTicks } from './frequency-scale.ts';
import { labelsSvg } from './label-svg.ts';
import { type Label, placeLabels } from './labels.ts';
import { pathText, px } from './path-text.ts';
import {
  gridTextBoxes,
  type ReflectionPlane,
  reflectionPoint,
  smithGridSvg,
} from './smith-grid.ts';
import { markPx, svgDocument, svgGroup, svgMark, svgPath, svgText } from './svg.ts';
import type { SweepChart } from './sweep-chart.ts';
import { sweepMarks } from './sweep-marks.ts';
import { sweepWords } from './sweep-words.ts';
import { swrOrdinate } from './swr-ordinate.ts';
import type { PixelLine } from './thin-line.ts';
import { thinTrace } from './thin-trace.ts';

/** A sweep of signed phase: only then does its reflection have a place in the plane. */
export interface SmithChart extends SweepChart {
  readonly sweep: ComplexSweep;
}

/** Beyond the rim only errors lie; this much of it is drawn. */
const rimRoom = 1.04;
/** About so many frequencies are named along the trace. */
const namedFrequencies = 6;

/** The reflection in its plane, with the circles and arcs of the Smith chart behind it. */
export function smithChart(chart: SmithChart, style: ChartStyle): string {
  const { heading, sweep, summary, report } = chart;
  const frame = frameOf(style, { left: 40, right: 40, above: 22, below: 48 });
  const { plot, palette, numbers, sizePx } = frame;
  const radiusPx = Math.min(plot.right - plot.left, plot.bottom - plot.top) / 2 / rimRoom;
  const centre = { x: (plot.left + plot.right) / 2, y: (plot.top + plot.bottom) / 2 };
  const plane = { centre, radiusPx };
  const trace = traceOf(sweep, plane);
  const reference = numbers.significant(summary.referenceOhm, 3);
  const limitPx = swrOrdinate(report.maxSwr) * radiusPx;
  const body = [
    smithGridSvg(plane, summary.referenceOhm, frame),
    `<circle class="limit" cx="${px(centre.x)}" cy="${px(centre.y)}" r="${px(limitPx)}" fill="none" stroke="${palette.limit}" stroke-width="1.5" stroke-dasharray="6 4"/>`,
    svgPath('reflection', pathText(thinTrace(trace)), { stroke: palette.first, width: 2 }),
    marksSvg(chart, trace, plane, frame),
    svgText(
      `Circles: R, arcs: X, in Ω; centre ${reference} Ω`,
      { x: centre.x, y: style.heightPx - 10 },
      { sizePx, fill: palette.quietText, anchor: 'middle' },
    ),
    headingSvg(heading, frame),
  ];
  return svgDocument({
    ...style,
    background: palette.background,
    title: `${heading.title}: reflection on the Smith chart`,
    description: sweepWords(
      chart,
      `Reflection against ${reference} Ω on the Smith chart`,
      style.numbers,
    ),
    body: body.join(''),
  });
}

/** The reflections in pixels, held at the edge of what is drawn. */
function traceOf({ reflectionRe, reflectionIm }: ComplexSweep, plane: ReflectionPlane): PixelLine {
  const x = new Float64Array(reflectionRe.length);
  const y = new Float64Array(reflectionRe.length);
  for (let i = 0; i < x.length; i++) {
    const magnitude = Math.hypot(reflectionRe[i], reflectionIm[i]);
    const held = magnitude > rimRoom ? rimRoom / magnitude : 1;
    const place = reflectionPoint(plane, held * reflectionRe[i], held * reflectionIm[i]);
    x[i] = place.x;
    y[i] = place.y;
  }
  return { x, y };
}

function marksSvg(
  { sweep, summary, report }: SmithChart,
  trace: PixelLine,
  plane: ReflectionPlane,
  frame: Frame,
): string {
  const { palette, numbers, sizePx, style, plot } = frame;
  const unit = frequencyUnit(summary.span.highHz);
  const place = (hz: number) => placeOn(trace, sweep.frequencyHz, hz);
  const marks = sweepMarks(summary, unit, numbers).map((mark) => ({
    ...mark,
    at: place(mark.frequencyHz),
  }));
  const { lowHz, highHz } = summary.span;
  const named = linearTicks(lowHz, highHz, namedFrequencies, 1, unit.hertz, numbers).map(
    ({ at, text }) => ({ at: place(at), text: `${text} ${unit.name}` }),
  );
  const { centre, radiusPx } = plane;
  const limitAt = { x: centre.x, y: centre.y + swrOrdinate(report.maxSwr) * radiusPx };
  const limitText = `SWR ${numbers.significant(report.maxSwr, 3)}`;
  const cells = new CoveredCells(style.widthPx, style.heightPx, trace);
  const labels = placeLabels(
    [
      ...marks.map(({ text, at }): Label => ({ text, at, markPx })),
      { text: limitText, at: limitAt, markPx: 0 },
      ...named.map(({ text, at }): Label => ({ text, at, markPx: 3, isMinor: true })),
    ],
    {
      bounds: { left: 2, right: style.widthPx - 2, top: plot.top, bottom: plot.bottom },
      blocked: [
        ...gridTextBoxes(plane, summary.referenceOhm, frame),
        ...marks.map(({ at }) => around(at, markPx + 1)),
      ],
      isCrossed: (box) =>
        cells.crosses(box) ||
        (box.top < centre.y && box.bottom > centre.y) ||
        isOnCircle(box, centre, limitAt.y - centre.y),
      sizePx,
    },
  );
  const ticks = named.map(
    ({ at }) => `<circle cx="${px(at.x)}" cy="${px(at.y)}" r="3" fill="${palette.first}"/>`,
  );
  const shapes = marks.map(({ kind, shape, at }) =>
    svgGroup(kind, svgMark(shape, at, kind === 'minimum' ? palette.first : palette.third, palette)),
  );
  return (
    svgGroup('frequencies', ticks.join('')) +
    shapes.toReversed().join('') +
    labelsSvg(labels, frame)
  );
}

/** Whether a circle runs through a box. */
function isOnCircle({ left, right, top, bottom }: Box, { x, y }: Point, radiusPx: number): boolean {
  const nearX = Math.max(left - x, 0, x - right);
  const nearY = Math.max(top - y, 0, y - bottom);
  const farX = Math.max(Math.abs(left - x), Math.abs(right - x));
  const farY = Math.max(Math.abs(top - y), Math.abs(bottom - y));
  return Math.hypot(nearX, nearY) < radiusPx && Math.hypot(farX, farY) > radiusPx;
}

/** The place of a frequency on the trace, between its points in a straight line. */
function placeOn({ x, y }: PixelLine, frequencyHz: Float64Array, hz: number): Point {
  const after = frequencyHz.findIndex((f) => f >= hz);
  if (after < 0) return { x: x[x.length - 1], y: y[y.length - 1] };
  if (after === 0) return { x: x[0], y: y[0] };
  const part = (hz - frequencyHz[after - 1]) / (frequencyHz[after] - frequencyHz[after - 1]);
  return {
    x: x[after - 1] + part * (x[after] - x[after - 1]),
    y: y[after - 1] + part * (y[after] - y[after - 1]),
  };
}

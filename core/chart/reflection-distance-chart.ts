import { scaleLinear } from 'd3-scale';
import { around, type Box } from './boxes.ts';
import type { ChartHeading, ChartStyle } from './chart-style.ts';
import { Envelope } from './envelope.ts';
import { borderSvg, type Frame, frameOf, headingSvg, xAxisSvg, yAxisSvg } from './frame.ts';
import { linearTicks } from './frequency-scale.ts';
import { labelsSvg } from './label-svg.ts';
import { placeLabels } from './labels.ts';
import type { NumberText } from './number-text.ts';
import { pathText } from './path-text.ts';
import {
  type MarkShape,
  markPx,
  svgDocument,
  svgGroup,
  svgLine,
  svgMark,
  svgPath,
  svgText,
} from './svg.ts';
import { type PixelLine, thinLine } from './thin-line.ts';

type PlaceKind = 'near_end' | 'on_line' | 'end' | 'echo';

/** Reflection against distance, and what a check of the line found along it. */
export interface ReflectionDistanceChart {
  readonly heading: ChartHeading;
  /** Distance from one value to the next; the first is 0. */
  readonly stepM: number;
  readonly magnitude: ArrayLike<number>;
  readonly velocityFactor: number;
  /** Reflections below this are not told from noise and sidelobes. */
  readonly reflectionFloor: number;
  readonly places: readonly {
    readonly distanceM: number;
    readonly distanceU95M: number;
    readonly magnitude: number;
    readonly kind: PlaceKind;
  }[];
}

const kindNames: Readonly<Record<PlaceKind, string>> = {
  near_end: 'near end',
  on_line: 'reflection',
  end: 'end',
  echo: 'echo',
};
const kindShapes: Readonly<Record<PlaceKind, MarkShape>> = {
  near_end: 'square',
  on_line: 'diamond',
  end: 'disc',
  echo: 'square',
};

/** The ordinate ends this far below the floor. */
const belowFloorDb = 10;
const lowestDb = -90;

/**
 * The magnitude of the reflection in decibels (20 log10) against the distance from the analyzer,
 * with the places that were found; a fault of a hundredth of the end's height is still seen.
 */
export function reflectionDistanceChart(chart: ReflectionDistanceChart, style: ChartStyle): string {
  const { heading, stepM, magnitude, reflectionFloor } = chart;
  const frame = frameOf(style, { left: 58, right: 14, above: 8, below: 48 });
  const { plot, palette, numbers, sizePx } = frame;
  const furthestM = Math.max(stepM, stepM * (magnitude.length - 1));
  const x = scaleLinear([0, furthestM], [plot.left, plot.right]);
  const floorDb = decibels(reflectionFloor);
  const low = Math.max(lowestDb, Math.min(-40, 10 * Math.floor((floorDb - belowFloorDb) / 10)));
  const y = scaleLinear([low, 5], [plot.bottom, plot.top]).clamp(true);
  const line = {
    x: Float64Array.from(magnitude, (_, i) => x(i * stepM)),
    y: Float64Array.from(magnitude, (_, i) =>
      // Where nothing of the curve is above the foot there is none: the foot is no measurement.
      Math.max(at(magnitude, i - 1), at(magnitude, i), at(magnitude, i + 1)) < low
        ? Number.NaN
        : y(at(magnitude, i)),
    ),
  };
  const height = plot.bottom - plot.top;
  const body = [
    yAxisSvg(frame, linearTicks(low, 5, height, sizePx * 2.4, 1, numbers), y, 'Reflection (dB)'),
    xAxisSvg(
      frame,
      linearTicks(0, furthestM, plot.right - plot.left, sizePx * 5, 1, numbers),
      x,
      `Distance (m) at velocity factor ${numbers.significant(chart.velocityFactor, 3)}`,
    ),
    borderSvg(frame),
    svgPath('reflection', pathText(thinLine(line)), { stroke: palette.first, width: 2 }),
    svgGroup(
      'floor',
      svgLine(
        { x: plot.left, y: y(floorDb) },
        { x: plot.right, y: y(floorDb) },
        {
          stroke: palette.limit,
          dash: '2 4',
          width: 1.5,
        },
      ),
    ),
    marksSvg(chart, line, { x, y, floorY: y(floorDb) }, frame),
    headingSvg(heading, frame),
  ];
  return svgDocument({
    ...style,
    background: palette.background,
    title: `${heading.title}: reflection against distance`,
    description: words(chart, numbers),
    body: body.join(''),
  });
}

function decibels(magnitude: number): number {
  return 20 * Math.log10(Math.max(magnitude, 1e-9));
}

/** The reflection of a step; beyond the ends there is none. */
function at(magnitude: ArrayLike<number>, i: number): number {
  return decibels(magnitude[i] ?? 0);
}

interface Axes {
  readonly x: (m: number) => number;
  readonly y: (db: number) => number;
  readonly floorY: number;
}

function marksSvg(
  { places, reflectionFloor }: ReflectionDistanceChart,
  line: PixelLine,
  { x, y, floorY }: Axes,
  frame: Frame,
): string {
  const { plot, palette, numbers, sizePx, style } = frame;
  const marks = places.map((place) => ({
    ...place,
    at: { x: Math.min(plot.right, x(place.distanceM)), y: y(decibels(place.magnitude)) },
  }));
  const envelope = new Envelope(style.widthPx, [line]);
  const isCrossed = (box: Box) =>
    envelope.crosses(box) || (box.top < floorY + 1 && box.bottom > floorY - 1);
  const byWeight = marks.toSorted((a, b) => Number(b.kind === 'end') - Number(a.kind === 'end'));
  const floorText = `floor ${numbers.fixed(decibels(reflectionFloor), 0)} dB`;
  const labels = placeLabels(
    [
      ...byWeight.map(({ kind, distanceM, at }) => ({
        text: `${kindNames[kind]} ${numbers.fixed(distanceM, 2)} m`,
        at,
        markPx,
      })),
      { text: floorText, at: { x: plot.right - 40, y: floorY }, markPx: 0 },
    ],
    {
      bounds: plot,
      blocked: marks.map(({ at }) => around(at, markPx + 1)),
      isCrossed,
      sizePx,
    },
  );
  const shapes = marks.map(({ kind, at }) =>
    svgGroup(`place ${kind}`, svgMark(kindShapes[kind], at, palette.third, palette)),
  );
  const none =
    marks.length > 0
      ? ''
      : svgText(
          'Nothing stands out from the floor.',
          { x: plot.left + 8, y: plot.top + 18 },
          {
            sizePx,
            fill: palette.text,
          },
        );
  return shapes.join('') + none + labelsSvg(labels, frame);
}

function words(chart: ReflectionDistanceChart, numbers: NumberText): string {
  const { places, velocityFactor, reflectionFloor, heading } = chart;
  const found = places.map(
    ({ kind, distanceM, distanceU95M, magnitude }) =>
      `${kindNames[kind]} at ${numbers.fixed(distanceM, 2)} m (± ${numbers.significant(distanceU95M, 2)} m), ${numbers.fixed(decibels(magnitude), 1)} dB.`,
  );
  return [
    `Reflection against distance from the analyzer at a velocity factor of ${numbers.significant(velocityFactor, 3)}.`,
    ...found,
    `Reflections below ${numbers.fixed(decibels(reflectionFloor), 0)} dB are not told from noise.`,
    ...(heading.tableUrl === null ? [] : [`The figures as a table: ${heading.tableUrl}`]),
  ].join(' ');
}

import { sweepImpedances } from '../network/impedance.ts';
import type { ComplexSweep } from '../sweep.ts';
import { bandStripSvg, outsideBandsSvg, stripRowPx, stripRows } from './band-strip.ts';
import { around, type Box, type Point } from './boxes.ts';
import type { ChartStyle } from './chart-style.ts';
import { Envelope } from './envelope.ts';
import { borderSvg, type Frame, frameOf, headingSvg, yAxisSvg } from './frame.ts';
import { type FrequencyAxis, frequencyAxis, frequencyAxisSvg } from './frequency-axis.ts';
import { labelsSvg } from './label-svg.ts';
import { type Label, placeLabels } from './labels.ts';
import { pathText } from './path-text.ts';
import { ohmOrdinate } from './reactance-ordinate.ts';
import { markPx, svgDocument, svgGroup, svgLine, svgMark, svgPath } from './svg.ts';
import type { SweepChart } from './sweep-chart.ts';
import { sweepMarks } from './sweep-marks.ts';
import { sweepWords } from './sweep-words.ts';
import { type PixelLine, thinLine } from './thin-line.ts';

/** Distances from zero of the room in which R and X are named. */
const nameShares = [0.12, 0.3, 0.5, 0.7, 0.88];

/** A sweep with its phase: without it R and X are not known. */
export interface ImpedanceChart extends SweepChart {
  readonly sweep: ComplexSweep;
}

/**
 * Resistance and reactance against frequency with the line of zero reactance, on which the
 * resonances are marked. Without its sign the reactance is drawn, and named, as a magnitude.
 */
export function impedanceChart(chart: ImpedanceChart, style: ChartStyle): string {
  const { heading, sweep, summary, report } = chart;
  const above = stripRows * stripRowPx + 6;
  const frame = frameOf(style, { left: 62, right: 14, above, below: 48 });
  const { plot, palette, numbers, sizePx } = frame;
  const axis = frequencyAxis(sweep, frame);
  const { resistanceOhm, reactanceOhm } = sweepImpedances(sweep);
  const height = plot.bottom - plot.top;
  const { share, ticks, isLinear } = ohmOrdinate(
    extremes(resistanceOhm, reactanceOhm),
    summary.referenceOhm,
    height,
    sizePx * 1.4,
    numbers,
  );
  const y = (ohm: number) => plot.bottom - share(ohm) * height;
  const reactanceName = sweep.phase === 'signed' ? 'X' : '|X|';
  const x = sweep.frequencyHz.map(axis.x);
  const resistance = { x, y: resistanceOhm.map(y) };
  const reactance = { x, y: reactanceOhm.map(y) };
  const half = numbers.significant(summary.referenceOhm / 2, 3);
  const scaleName = isLinear ? 'Ω' : `Ω; logarithmic beyond ±${half}`;
  const body = [
    outsideBandsSvg(report.bands, axis, frame),
    yAxisSvg(frame, ticks, y, `R and ${reactanceName} (${scaleName})`),
    frequencyAxisSvg(axis, frame),
    borderSvg(frame),
    bandStripSvg(report.bands, axis, frame),
    svgGroup(
      'zero',
      svgLine(
        { x: plot.left, y: y(0) },
        { x: plot.right, y: y(0) },
        {
          stroke: palette.text,
          width: 1.2,
        },
      ),
    ),
    svgPath('reactance', pathText(thinLine(reactance)), {
      stroke: palette.second,
      width: 2,
      dash: '7 3',
    }),
    svgPath('resistance', pathText(thinLine(resistance)), { stroke: palette.first, width: 2 }),
    marksSvg(chart, { resistance, reactance, reactanceName }, axis, y, frame),
    headingSvg(heading, frame),
  ];
  const what = `Resistance R and ${sweep.phase === 'signed' ? 'reactance X' : 'magnitude of the reactance (its sign is not known)'}`;
  return svgDocument({
    ...style,
    background: palette.background,
    title: `${heading.title}: R and ${reactanceName} against frequency`,
    description: sweepWords(chart, what, style.numbers),
    body: body.join(''),
  });
}

interface Curves {
  readonly resistance: PixelLine;
  readonly reactance: PixelLine;
  readonly reactanceName: string;
}

function extremes(...columns: readonly Float64Array[]): { least: number; most: number } {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (const column of columns) {
    for (const value of column) {
      if (value < least) least = value;
      if (value > most) most = value;
    }
  }
  return { least, most };
}

function marksSvg(
  { summary }: SweepChart,
  { resistance, reactance, reactanceName }: Curves,
  axis: FrequencyAxis,
  y: (ohm: number) => number,
  frame: Frame,
): string {
  const { plot, palette, numbers, sizePx, style } = frame;
  const marks = sweepMarks(summary, axis.unit, numbers, frame.isNarrow)
    .filter(({ kind }) => kind !== 'minimum')
    .map((mark) => ({ ...mark, at: { x: axis.x(mark.frequencyHz), y: y(0) } }));
  const envelope = new Envelope(style.widthPx, [resistance, reactance]);
  const isCrossed = (box: Box) =>
    envelope.crosses(box) || (box.top < y(0) + 1 && box.bottom > y(0) - 1);
  const labels = placeLabels(
    [
      curveName('R', resistance, reactance),
      curveName(reactanceName, reactance, resistance),
      ...marks.map(({ text, at }) => ({ text, at, markPx })),
    ],
    {
      bounds: { ...plot, left: plot.left + 2 },
      blocked: marks.map(({ at }) => around(at, markPx + 1)),
      isCrossed,
      sizePx,
    },
  );
  const shapes = marks.map(({ kind, shape, at }) =>
    svgGroup(kind, svgMark(shape, at, palette.third, palette)),
  );
  return shapes.toReversed().join('') + labelsSvg(labels, frame);
}

/** The name of a curve, beside it where the other is farthest away. */
function curveName(text: string, own: PixelLine, other: PixelLine): Label {
  const last = own.x.length - 1;
  const indices = nameShares
    .map((share) => Math.round(share * last))
    .filter((i) => !Number.isNaN(own.y[i]));
  const distance = (i: number) => Math.abs(own.y[i] - other.y[i]);
  const best = indices.reduce((a, b) => (distance(b) > distance(a) + 20 ? b : a), indices[0] ?? 0);
  const at: Point = { x: own.x[best], y: own.y[best] };
  return { text, at, markPx: 2 };
}

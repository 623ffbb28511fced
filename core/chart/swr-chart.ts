import type { UsableSpan } from '../analysis/summary.ts';
import type { UsableReport } from '../bands/usable-report.ts';
import { bandStripSvg, outsideBandsSvg, stripRowPx, stripRows } from './band-strip.ts';
import { around, type Box, type Point } from './boxes.ts';
import type { ChartStyle } from './chart-style.ts';
import { Envelope } from './envelope.ts';
import { borderSvg, type Frame, frameOf, headingSvg } from './frame.ts';
import { type FrequencyAxis, frequencyAxis, frequencyAxisSvg } from './frequency-axis.ts';
import { labelsSvg } from './label-svg.ts';
import { type Label, placeLabels } from './labels.ts';
import { pathText, px } from './path-text.ts';
import { markPx, svgDocument, svgGroup, svgLine, svgMark, svgPath, svgText } from './svg.ts';
import type { SweepChart } from './sweep-chart.ts';
import { type SweepMark, sweepMarks } from './sweep-marks.ts';
import { sweepWords } from './sweep-words.ts';
import { pointsSvg, type SwrAxis, swrAxis, swrAxisSvg, swrLine } from './swr-axis.ts';
import { textWidth } from './text-width.ts';
import { type PixelLine, thinLine } from './thin-line.ts';

const usableBarPx = 5;
/** Where along its line the limit may be named, the best first. */
const nameShares = [1, 0, 0.75, 0.25, 0.5];

/**
 * SWR against frequency: the plan's bands and segments, the limit, where SWR is within it, the parts
 * of bands that are usable, least SWR and resonances. Its ordinate is linear in the magnitude of the
 * reflection (see `swrOrdinate`).
 */
export function swrChart(chart: SweepChart, style: ChartStyle): string {
  const { heading, sweep, summary, report } = chart;
  const above = stripRows * stripRowPx + 6;
  const frame = frameOf(style, { left: 52, right: 14, above, below: 48 });
  const { palette, numbers } = frame;
  const axis = frequencyAxis(sweep, frame);
  const y = swrAxis(frame);
  const against = `against ${numbers.significant(summary.referenceOhm, 3)} Ω`;
  const line = swrLine(sweep, axis, frame);
  const body = [
    outsideBandsSvg(report.bands, axis, frame),
    swrAxisSvg(y, summary.referenceOhm, frame),
    frequencyAxisSvg(axis, frame),
    borderSvg(frame),
    bandStripSvg(report.bands, axis, frame),
    usableBarsSvg(chart, axis, frame),
    limitSvg(report.maxSwr, summary.spans, axis, y, frame),
    svgPath('swr', pathText(thinLine(line)), { stroke: palette.first, width: 2.4 }),
    pointsSvg(line, palette.first),
    marksSvg(chart, line, axis, y, frame),
    headingSvg(heading, frame),
  ];
  return svgDocument({
    ...style,
    background: palette.background,
    title: `${heading.title}: SWR against frequency`,
    description: sweepWords(chart, `SWR ${against}`, style.numbers),
    body: body.join(''),
  });
}

/** Along the foot of the plot: permitted by the plan and within the limit. */
function usableBarsSvg({ report }: SweepChart, { x }: FrequencyAxis, frame: Frame): string {
  const { plot, palette } = frame;
  const bars = report.bands
    .flatMap(({ spans }) => spans)
    .map(({ lowHz, highHz }) => {
      const left = x(lowHz);
      const width = Math.max(1, x(highHz) - left);
      return `<rect x="${px(left)}" y="${px(plot.bottom - usableBarPx)}" width="${px(width)}" height="${usableBarPx}" fill="${palette.usable}"/>`;
    });
  return svgGroup('usable', bars.join(''));
}

/** The limit: dashed all along, and drawn through where SWR is within it; open ends have no stop. */
function limitSvg(
  maxSwr: number,
  spans: readonly UsableSpan[],
  { x }: FrequencyAxis,
  y: SwrAxis,
  { plot, palette }: Frame,
): string {
  const at = y(maxSwr);
  const stop = (hz: number) =>
    svgLine(
      { x: x(hz), y: at - 5 },
      { x: x(hz), y: at + 5 },
      { stroke: palette.limit, width: 1.6 },
    );
  const within = spans.map(
    ({ lowHz, highHz, lowOpen, highOpen }) =>
      svgLine(
        { x: x(lowHz), y: at },
        { x: x(highHz), y: at },
        { stroke: palette.limit, width: 1.6 },
      ) +
      (lowOpen ? '' : stop(lowHz)) +
      (highOpen ? '' : stop(highHz)),
  );
  return svgGroup(
    'limit',
    svgLine(
      { x: plot.left, y: at },
      { x: plot.right, y: at },
      { stroke: palette.limit, dash: '6 4' },
    ) + within.join(''),
  );
}

/** The limit's name beside its line, where no curve runs through it. */
function limitName(maxSwr: number, y: SwrAxis, envelope: Envelope, frame: Frame) {
  const { plot, numbers, sizePx } = frame;
  const text = `limit ${numbers.significant(maxSwr, 3)}`;
  const width = textWidth(text, sizePx) + 4;
  const height = 1.3 * sizePx;
  const room = plot.right - plot.left - width - 4;
  const boxes = nameShares.flatMap((share) =>
    [y(maxSwr) - height - 1, y(maxSwr) + 2].map((top) => {
      const left = plot.left + 2 + share * room;
      return { left, right: left + width, top, bottom: top + height };
    }),
  );
  const box = boxes.find((candidate) => !envelope.crosses(candidate)) ?? boxes[0];
  return { text, box };
}

function marksSvg(
  { summary, report }: SweepChart,
  line: PixelLine,
  axis: FrequencyAxis,
  y: SwrAxis,
  frame: Frame,
): string {
  const { plot, palette, numbers, sizePx } = frame;
  const marks = sweepMarks(summary, axis.unit, numbers, frame.isNarrow).map((mark) => ({
    ...mark,
    at: placeOf(mark, line, axis, y),
  }));
  const limitY = y(report.maxSwr);
  const envelope = new Envelope(frame.style.widthPx, [line]);
  const limit = limitName(report.maxSwr, y, envelope, frame);
  const stemmed = marks.filter(({ kind }) => kind !== 'minimum');
  const isCrossed = (box: Box) =>
    envelope.crosses(box) ||
    (box.top < limitY + 2 && box.bottom > limitY - 2) ||
    stemmed.some(({ at }) => box.left < at.x && box.right > at.x && box.bottom > at.y);
  const labels = placeLabels(
    [...marks.map(({ text, at }) => ({ text, at, markPx })), ...usableNames(report, axis, plot)],
    {
      bounds: { ...plot, bottom: plot.bottom - usableBarPx - 1, left: plot.left + 2 },
      blocked: [limit.box, ...marks.map(({ at }) => around(at, markPx + 1))],
      isCrossed,
      sizePx,
    },
  );
  const stems = stemmed.map(({ at }) =>
    svgLine(at, { x: at.x, y: plot.bottom }, { stroke: palette.third, width: 1.5, dash: '2 3' }),
  );
  const limitText = svgText(
    limit.text,
    { x: limit.box.left + 2, y: limit.box.bottom - 0.3 * sizePx },
    { sizePx, fill: palette.limit, halo: palette.background },
  );
  const shapes = marks.map(({ kind, shape, at }) =>
    svgGroup(kind, svgMark(shape, at, kind === 'minimum' ? palette.first : palette.third, palette)),
  );
  return stems.join('') + limitText + shapes.toReversed().join('') + labelsSvg(labels, frame);
}

/** The name of the widest of the bars along the foot. */
function usableNames({ bands }: UsableReport, { x }: FrequencyAxis, { bottom }: Box): Label[] {
  const widths = bands.flatMap(({ spans }) => spans);
  const [widest] = widths.toSorted((a, b) => b.highHz - b.lowHz - (a.highHz - a.lowHz));
  if (widest === undefined) return [];
  const at = { x: x((widest.lowHz + widest.highHz) / 2), y: bottom - usableBarPx };
  return [{ text: 'usable', at, markPx: 0, isMinor: true }];
}

/** On the curve where the SWR of the mark is not known. */
function placeOf(mark: SweepMark, line: PixelLine, axis: FrequencyAxis, y: SwrAxis): Point {
  const x = axis.x(mark.frequencyHz);
  if (mark.swr !== null) return { x, y: y(mark.swr) };
  const after = line.x.findIndex((at) => at >= x);
  if (after <= 0) return { x, y: line.y[0] };
  const part = (x - line.x[after - 1]) / (line.x[after] - line.x[after - 1]);
  return { x, y: line.y[after - 1] + part * (line.y[after] - line.y[after - 1]) };
}

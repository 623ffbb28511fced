import { scaleLinear } from 'd3-scale';
import { around, type Box } from './boxes.ts';
import type { ChartHeading, ChartStyle } from './chart-style.ts';
import { Envelope } from './envelope.ts';
import { borderSvg, type Frame, frameOf, headingSvg, xAxisSvg, yAxisSvg } from './frame.ts';
import { linearTicks } from './frequency-scale.ts';
import { labelsSvg } from './label-svg.ts';
import { type Label, placeLabels } from './labels.ts';
import type { NumberText } from './number-text.ts';
import type { Palette } from './palettes.ts';
import { px } from './path-text.ts';
import { svgDocument, svgGroup, svgLine, svgText } from './svg.ts';
import { fittingText } from './text-width.ts';
import { isoTime, timeTicks } from './time-axis.ts';
import { type KnownWeather, weatherLegend, weatherMark, weatherName } from './weather-marks.ts';

/** One measured value; `u95` is its half-width, null if unknown. */
export interface HistoryPoint {
  readonly atMs: number;
  readonly value: number;
  readonly u95: number | null;
  readonly weather: KnownWeather;
  readonly eraIndex: number;
}

/** A measure through time; the name is told where there is more than one. */
export interface HistorySeries {
  readonly name: string;
  /** Ascending in time. */
  readonly points: readonly HistoryPoint[];
}

/** A measure of an antenna over time, with the work that began its eras. */
export interface HistoryChart {
  readonly heading: ChartHeading;
  /** What is measured, with its unit in brackets. */
  readonly measure: string;
  /** One unit of the axis in the unit of the values. */
  readonly unit: number;
  readonly series: readonly HistorySeries[];
  readonly eras: readonly { readonly atMs: number; readonly name: string }[];
  /** In words: what was left out. */
  readonly note: string | null;
}

const dashes = ['', '7 3', '2 3'] as const;
const capPx = 3;
/** Half-widths beyond this many times the spread of the values are drawn as far as the plot goes. */
const mostSpreads = 2;

/**
 * A measure against time: a mark for each sweep, its shape telling the weather, its bar the 95 %
 * half-width; joined within an era and never across work on the antenna.
 */
export function historyChart(chart: HistoryChart, style: ChartStyle): string {
  const { heading, series, measure, unit } = chart;
  const frame = frameOf(style, { left: 72, right: 16, above: 42, below: 48 });
  const { plot, palette, numbers, sizePx } = frame;
  const points = series.flatMap((one) => one.points);
  const [fromMs, untilMs] = timeSpan(points.map(({ atMs }) => atMs));
  const [low, high] = valueSpan(points);
  const x = scaleLinear([fromMs, untilMs], [plot.left, plot.right]);
  const y = scaleLinear([low, high], [plot.bottom, plot.top]).clamp(true);
  const axes = { x, y };
  const eras = chart.eras.filter(({ atMs }) => atMs > fromMs && atMs < untilMs);
  const width = plot.right - plot.left;
  const height = plot.bottom - plot.top;
  const body = [
    yAxisSvg(frame, linearTicks(low, high, height, sizePx * 2.6, unit, numbers), y, measure),
    xAxisSvg(frame, timeTicks(fromMs, untilMs, width, sizePx * 8), x, 'Date (UTC)'),
    borderSvg(frame),
    erasSvg(eras, x, frame),
    ...series.map((one, i) => seriesSvg(one, i, axes, frame)),
    namesSvg(series, axes, frame),
    weatherLegend(new Set(points.map(({ weather }) => weather)), frame),
    points.length > 0
      ? ''
      : svgText(
          'Nothing was measured of this.',
          { x: plot.left + 10, y: plot.top + 24 },
          {
            sizePx,
            fill: palette.text,
          },
        ),
    headingSvg(heading, frame),
  ];
  return svgDocument({
    ...style,
    background: palette.background,
    title: `${heading.title}: ${measure} over time`,
    description: words(chart, numbers),
    body: body.join(''),
  });
}

interface Axes {
  readonly x: (ms: number) => number;
  readonly y: (value: number) => number;
}

const dayMs = 86_400_000;

/** With a little room on both sides, so that no mark lies on the border. */
function timeSpan(instants: readonly number[]): readonly [number, number] {
  if (instants.length === 0) return [0, dayMs];
  const from = instants.reduce((a, b) => Math.min(a, b));
  const until = instants.reduce((a, b) => Math.max(a, b));
  const room = Math.max(5 * dayMs, 0.03 * (until - from));
  return [from - room, until + room];
}

/** All values, and their half-widths unless these would flatten everything else. */
function valueSpan(points: readonly HistoryPoint[]): readonly [number, number] {
  if (points.length === 0) return [0, 1];
  const values = points.map(({ value }) => value);
  const least = values.reduce((a, b) => Math.min(a, b));
  const most = values.reduce((a, b) => Math.max(a, b));
  const spread = Math.max(most - least, Math.abs(most) * 1e-3, 1e-9);
  const bar = ({ u95 }: HistoryPoint) => Math.min(u95 ?? 0, mostSpreads * spread);
  const low = points.reduce((end, point) => Math.min(end, point.value - bar(point)), least);
  const high = points.reduce((end, point) => Math.max(end, point.value + bar(point)), most);
  const room = 0.08 * Math.max(high - low, spread);
  return [low - room, high + room];
}

function colourOf(i: number, palette: Palette): string {
  return [palette.first, palette.second, palette.third][i % dashes.length];
}

/** Each series has a colour and a dash of its own. */
function seriesSvg({ points }: HistorySeries, i: number, { x, y }: Axes, frame: Frame): string {
  const { palette, plot } = frame;
  const stroke = colourOf(i, palette);
  const dash = dashes[i % dashes.length];
  const places = points.map((point) => ({ ...point, x: x(point.atMs), y: y(point.value) }));
  const joins = places.map((place, n) => {
    const isJoined = n > 0 && places[n - 1].eraIndex === place.eraIndex;
    return `${isJoined ? 'L' : 'M'}${px(place.x)} ${px(place.y)}`;
  });
  const line = `<path d="${joins.join('')}" fill="none" stroke="${stroke}" stroke-width="1.2"${dash === '' ? '' : ` stroke-dasharray="${dash}"`}/>`;
  const bars = places.map(({ value, u95, x: at }) => {
    if (u95 === null) return '';
    const top = y(value + u95);
    const bottom = y(value - u95);
    const cap = (end: number, border: number) =>
      end === border ? '' : `M${px(at - capPx)} ${px(end)}h${2 * capPx}`;
    return `M${px(at)} ${px(top)}V${px(bottom)}${cap(top, plot.top)}${cap(bottom, plot.bottom)}`;
  });
  const marks = places.map(({ weather, ...place }) =>
    weatherMark(weather, place, stroke, palette.background),
  );
  return svgGroup(
    'series',
    `${line}<path class="bars" d="${bars.join('')}" fill="none" stroke="${stroke}"/>${svgGroup('marks', marks.join(''))}`,
  );
}

/** The work that began each era, named along its line. */
function erasSvg(
  eras: HistoryChart['eras'],
  x: Axes['x'],
  { plot, palette, sizePx }: Frame,
): string {
  const size = sizePx - 1;
  const body = eras.map(({ atMs, name }, i) => {
    const left = x(atMs);
    const until = i + 1 < eras.length ? x(eras[i + 1].atMs) : plot.right;
    const text = fittingText(name, size, until - left - 6);
    const line = svgLine(
      { x: left, y: plot.top - 14 },
      { x: left, y: plot.bottom },
      {
        stroke: palette.text,
        dash: '1 3',
        width: 1.4,
      },
    );
    const isNamed = text.length > 3 || text === name;
    return (
      line +
      (isNamed
        ? svgText(text, { x: left + 4, y: plot.top - 5 }, { sizePx: size, fill: palette.text })
        : '')
    );
  });
  return svgGroup('eras', body.join(''));
}

function namesSvg(series: readonly HistorySeries[], { x, y }: Axes, frame: Frame): string {
  if (series.length < 2) return '';
  const { plot, sizePx } = frame;
  const places = series.flatMap(({ points }) =>
    points.map(({ atMs, value }) => around({ x: x(atMs), y: y(value) }, 6)),
  );
  const labels = series.flatMap(({ name, points }): Label[] => {
    const last = points[points.length - 1];
    return last === undefined
      ? []
      : [{ text: name, at: { x: x(last.atMs), y: y(last.value) }, markPx: 6 }];
  });
  const lines = series.map(({ points }) => ({
    x: Float64Array.from(points, ({ atMs }) => x(atMs)),
    y: Float64Array.from(points, ({ value }) => y(value)),
  }));
  const envelope = new Envelope(frame.style.widthPx, lines);
  const isCrossed = (box: Box) => envelope.crosses(box);
  return labelsSvg(
    placeLabels(labels, { bounds: plot, blocked: places, isCrossed, sizePx }),
    frame,
  );
}

/** Longer histories are told by their ends; the table has all. */
function words({ measure, series, eras, unit, note, heading }: HistoryChart, numbers: NumberText) {
  const day = (atMs: number) => isoTime(atMs).slice(0, 10);
  const value = ({ atMs, value: measured, u95, weather }: HistoryPoint) =>
    `${numbers.significant(measured / unit, 6)}${u95 === null ? '' : ` ± ${numbers.significant(u95 / unit, 2)}`} on ${day(atMs)} (${weatherName(weather)})`;
  const told = series.map(({ name, points }) => {
    const first = points[0];
    const last = points[points.length - 1];
    if (first === undefined || last === undefined) return `${name}: nothing measured.`;
    const count = `${points.length} ${points.length === 1 ? 'value' : 'values'}`;
    return `${name}: ${count}, first ${value(first)}, last ${value(last)}.`;
  });
  return [
    `${measure} over time.`,
    ...told,
    ...eras.map(({ atMs, name }) => `${day(atMs)}: ${name}.`),
    ...(note === null ? [] : [note]),
    ...(heading.tableUrl === null ? [] : [`The figures as a table: ${heading.tableUrl}`]),
  ].join(' ');
}

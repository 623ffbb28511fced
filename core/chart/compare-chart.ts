import type { ChangeVerdict, Comparison } from '../record/compare.ts';
import type { Sweep } from '../sweep.ts';
import type { Point } from './boxes.ts';
import type { ChartHeading, ChartStyle } from './chart-style.ts';
import { borderSvg, type Frame, frameOf, headingSvg } from './frame.ts';
import { type FrequencyAxis, frequencyAxisOver, frequencyAxisSvg } from './frequency-axis.ts';
import { frequencyText } from './frequency-scale.ts';
import { pathText } from './path-text.ts';
import {
  type MarkShape,
  svgDocument,
  svgGroup,
  svgLine,
  svgMark,
  svgPath,
  svgText,
} from './svg.ts';
import { pointsSvg, type SwrAxis, swrAxis, swrAxisSvg, swrLine } from './swr-axis.ts';
import { fittingText, textWidth } from './text-width.ts';
import { thinLine } from './thin-line.ts';

/** A sweep at the reference of the comparison, and what it is called. */
export interface NamedSweep {
  readonly name: string;
  readonly sweep: Sweep;
}

export interface CompareChart {
  readonly heading: ChartHeading;
  readonly first: NamedSweep;
  readonly second: NamedSweep;
  readonly referenceOhm: number;
  readonly comparison: Pick<Comparison, 'obstacles' | 'verdict' | 'bands'>;
}

const verdicts: Readonly<Record<ChangeVerdict, string>> = {
  same_within_uncertainty: 'The same within their half-widths.',
  changed: 'Something changed by more than the half-widths of both.',
  cannot_tell: 'A half-width is unknown: it cannot be told whether anything changed.',
};

/** The first is dashed, so that the two stay apart without colour. */
const firstDash = '6 3';
const samplePx = 26;

/**
 * The SWR of two sweeps against frequency, with the least SWR and the resonances that both have.
 * Where the two cannot be compared it says why and draws neither.
 */
export function compareChart(chart: CompareChart, style: ChartStyle): string {
  const { heading, first, second, referenceOhm, comparison } = chart;
  const frame = frameOf(style, { left: 52, right: 14, above: 26, below: 48 });
  const { palette } = frame;
  const [a, b] = [first.sweep.frequencyHz, second.sweep.frequencyHz];
  const axis = frequencyAxisOver(
    Math.min(a[0], b[0]),
    Math.max(a[a.length - 1], b[b.length - 1]),
    frame,
  );
  const y = swrAxis(frame);
  const isCompared = comparison.obstacles.length === 0;
  const body = [
    swrAxisSvg(y, referenceOhm, frame),
    frequencyAxisSvg(axis, frame),
    borderSvg(frame),
    isCompared ? curvesSvg(chart, axis, y, frame) : obstaclesSvg(chart, frame),
    headingSvg(heading, frame),
  ];
  return svgDocument({
    ...style,
    background: palette.background,
    title: `${heading.title}: SWR of two sweeps`,
    description: words(chart, axis, frame),
    body: body.join(''),
  });
}

function obstaclesSvg({ comparison }: CompareChart, { plot, palette, sizePx }: Frame): string {
  const lines = comparison.obstacles.map(({ detail }, i) =>
    svgText(
      fittingText(detail, sizePx, plot.right - plot.left - 20),
      { x: plot.left + 10, y: plot.top + (i + 2) * 1.5 * sizePx },
      { sizePx, fill: palette.text, halo: palette.background },
    ),
  );
  return svgGroup('obstacles', lines.join(''));
}

interface CompareMark {
  readonly shape: MarkShape;
  readonly stroke: string;
  readonly at: Point;
}

function curvesSvg(chart: CompareChart, axis: FrequencyAxis, y: SwrAxis, frame: Frame): string {
  const { first, second } = chart;
  const { palette } = frame;
  const lines = [first, second].map(({ sweep }) => swrLine(sweep, axis, frame));
  const [one, other] = lines;
  const marks = marksOf(chart, axis, y, frame);
  return [
    svgPath('first', pathText(thinLine(one)), {
      stroke: palette.second,
      width: 2,
      dash: firstDash,
    }),
    svgPath('second', pathText(thinLine(other)), { stroke: palette.first, width: 2 }),
    pointsSvg(one, palette.second),
    pointsSvg(other, palette.first),
    svgGroup(
      'marks',
      marks.map(({ shape, stroke, at }) => svgMark(shape, at, stroke, palette)).join(''),
    ),
    legendSvg(chart, frame),
  ].join('');
}

/** Each name with a piece of its line: curves that lie close cannot be named beside them. */
function legendSvg({ first, second }: CompareChart, { plot, palette, sizePx }: Frame): string {
  const y = plot.top - 10;
  const rows = [
    { name: first.name, look: { stroke: palette.second, width: 2, dash: firstDash } },
    { name: second.name, look: { stroke: palette.first, width: 2 } },
  ];
  let left = 12;
  const body = rows.map(({ name, look }) => {
    const end = left + samplePx;
    const entry =
      svgLine({ x: left, y: y - 4 }, { x: end, y: y - 4 }, look) +
      svgText(name, { x: end + 6, y }, { sizePx, fill: palette.text });
    left = end + 22 + textWidth(name, sizePx);
    return entry;
  });
  return svgGroup('legend', body.join(''));
}

function marksOf(
  { comparison }: CompareChart,
  { x }: FrequencyAxis,
  y: SwrAxis,
  { palette }: Frame,
): readonly CompareMark[] {
  const sides = [
    { side: 'first', stroke: palette.second },
    { side: 'second', stroke: palette.first },
  ] as const;
  return sides.flatMap(({ side, stroke }) =>
    comparison.bands.flatMap(({ resonances, minimumHz, minimumSwr }): CompareMark[] => [
      ...resonances.flatMap(({ frequencyHz, swr }): CompareMark[] =>
        swr === null
          ? []
          : [{ shape: 'diamond', stroke, at: { x: x(frequencyHz[side]), y: y(swr[side]) } }],
      ),
      ...(minimumHz === null || minimumSwr === null
        ? []
        : [
            {
              shape: 'disc' as const,
              stroke,
              at: { x: x(minimumHz[side]), y: y(minimumSwr[side]) },
            },
          ]),
    ]),
  );
}

function words(
  { heading, first, second, comparison }: CompareChart,
  { unit }: FrequencyAxis,
  { numbers }: Frame,
): string {
  const hertz = (hz: number) => frequencyText(hz, null, unit, numbers);
  const bands = comparison.bands.flatMap(({ band, resonances, minimumHz, minimumSwr }) => [
    ...resonances.map(
      ({ kind, frequencyHz }) =>
        `${band}: ${kind} resonance ${hertz(frequencyHz.first)}, then ${hertz(frequencyHz.second)}.`,
    ),
    ...(minimumHz === null || minimumSwr === null
      ? []
      : [
          `${band}: least SWR ${numbers.fixed(minimumSwr.first, 2)} at ${hertz(minimumHz.first)}, then ${numbers.fixed(minimumSwr.second, 2)} at ${hertz(minimumHz.second)}.`,
        ]),
  ]);
  return [
    `SWR of two sweeps against frequency: ${first.name} (dashed) and ${second.name}.`,
    ...comparison.obstacles.map(({ detail }) => detail),
    ...bands,
    ...(comparison.obstacles.length === 0 ? [verdicts[comparison.verdict]] : []),
    ...(heading.tableUrl === null ? [] : [`The figures as a table: ${heading.tableUrl}`]),
  ].join(' ');
}

import type { SegmentFamily } from '../bands/plan.ts';
import type { BandUse, SegmentUse } from '../bands/usable-report.ts';
import type { Frame } from './frame.ts';
import type { FrequencyAxis } from './frequency-axis.ts';
import { px } from './path-text.ts';
import { svgGroup, svgText } from './svg.ts';
import { textWidth } from './text-width.ts';

/** The strip's rows above the plot: the bands, and the segments of those wide enough to show them. */
export const stripRows = 2;
export const stripRowPx = 17;

/** Short names of uses, as much as a segment has room for. */
const familyNames: Readonly<Record<SegmentFamily, readonly string[]>> = {
  allocation: [],
  cw: ['CW'],
  narrow: ['narrow'],
  digital: ['digital', 'dig.'],
  phone: ['phone', 'ph.'],
  all: ['all modes', 'all'],
  fm: ['FM'],
  beacon: ['beacons', 'bcn'],
  satellite: ['satellite', 'sat.'],
  guard: ['guard'],
  channel: [],
};

/** Bands narrower than this show no segments. */
const leastBandPx = 90;

/** What lies outside every band is shaded, so that a band reads as the clear part of the plot. */
export function outsideBandsSvg(
  bands: readonly BandUse[],
  axis: FrequencyAxis,
  frame: Frame,
): string {
  const { plot, palette } = frame;
  let from = plot.left;
  let body = '';
  const shade = (left: number, right: number) => {
    if (right - left < 0.05) return;
    body += `<rect x="${px(left)}" y="${px(plot.top)}" width="${px(right - left)}" height="${px(plot.bottom - plot.top)}" fill="${palette.outside}"/>`;
  };
  for (const band of bands) {
    const cut = cutToAxis(band, axis);
    if (cut === null) continue;
    shade(from, cut.left);
    from = Math.max(from, cut.right);
  }
  shade(from, plot.right);
  return svgGroup('outside-bands', body);
}

/** Names of bands and segments above the plot, each over its own width. */
export function bandStripSvg(bands: readonly BandUse[], axis: FrequencyAxis, frame: Frame): string {
  const bandTop = frame.plot.top - stripRows * stripRowPx - 3;
  const body = bands.flatMap((band) => {
    const cut = cutToAxis(band, axis);
    if (cut === null) return [];
    const top = { ...cut, top: bandTop };
    const segments =
      cut.right - cut.left < leastBandPx
        ? []
        : segmentCells(band.segments, axis).map((cell) =>
            cellSvg({ ...cell, top: bandTop + stripRowPx }, frame),
          );
    return [cellSvg({ ...top, texts: [band.band], isBand: true }, frame), ...segments];
  });
  return svgGroup('bands', body.join(''));
}

interface Cell {
  readonly left: number;
  readonly right: number;
  /** From the longest on, the first that fits is written. */
  readonly texts: readonly string[];
  readonly isBand: boolean;
}

/** Rows that overlap, as those of several operator classes, are shown once: the first is. */
function segmentCells(segments: readonly SegmentUse[], axis: FrequencyAxis): readonly Cell[] {
  const cells: Cell[] = [];
  let from = Number.NEGATIVE_INFINITY;
  for (const segment of segments) {
    const cut = cutToAxis(segment, axis);
    if (cut === null || segment.lowHz < from || familyNames[segment.family].length === 0) continue;
    from = segment.highHz;
    cells.push({ ...cut, texts: familyNames[segment.family], isBand: false });
  }
  return cells;
}

function cellSvg(
  { left, right, top, texts, isBand }: Cell & { readonly top: number },
  frame: Frame,
) {
  const { palette, sizePx } = frame;
  const size = isBand ? sizePx : sizePx - 1;
  const text = texts.find((candidate) => textWidth(candidate, size) + 4 <= right - left);
  const middle = { x: (left + right) / 2, y: top + stripRowPx - 4 };
  const fill = isBand ? palette.text : palette.quietText;
  return (
    `<path d="M${px(left)} ${px(top + stripRowPx)}V${px(top + 2)}H${px(right)}V${px(top + stripRowPx)}" fill="none" stroke="${palette.frame}"/>` +
    (text === undefined ? '' : svgText(text, middle, { sizePx: size, fill, anchor: 'middle' }))
  );
}

/** A range in pixels, cut to the axis; null where it does not reach it. */
function cutToAxis(
  range: { readonly lowHz: number; readonly highHz: number },
  { lowHz, highHz, x }: FrequencyAxis,
): { readonly left: number; readonly right: number } | null {
  if (range.highHz <= lowHz || range.lowHz >= highHz) return null;
  return { left: x(Math.max(range.lowHz, lowHz)), right: x(Math.min(range.highHz, highHz)) };
}

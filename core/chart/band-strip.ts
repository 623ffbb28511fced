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
  const swept = bands.flatMap((band) => {
    const cut = cutToAxis(band, axis);
    return cut === null ? [] : [{ band, cut }];
  });
  const body = swept.flatMap(({ band, cut }, i) => {
    // The name of a narrow band stands beside it, if the next one leaves it room.
    const until = swept[i + 1]?.cut.left ?? frame.style.widthPx;
    const top = { ...cut, until, top: bandTop };
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
  /** How far a text may stand beside it. */
  readonly until: number;
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
    cells.push({ ...cut, until: cut.right, texts: familyNames[segment.family], isBand: false });
  }
  return cells;
}

function cellSvg(
  { left, right, until, top, texts, isBand }: Cell & { readonly top: number },
  frame: Frame,
): string {
  const { palette, sizePx } = frame;
  const size = isBand ? sizePx : sizePx - 1;
  const fits = (width: number) => (text: string) => textWidth(text, size) + 4 <= width;
  const inside = texts.find(fits(right - left));
  const text = inside ?? texts.find(fits(until - right - 2));
  const baseline = top + stripRowPx - 4;
  const fill = isBand ? palette.text : palette.quietText;
  return (
    `<path d="M${px(left)} ${px(top + stripRowPx)}V${px(top + 2)}H${px(right)}V${px(top + stripRowPx)}" fill="none" stroke="${palette.frame}"/>` +
    (text === undefined
      ? ''
      : inside === undefined
        ? svgText(text, { x: right + 3, y: baseline }, { sizePx: size, fill })
        : svgText(
            text,
            { x: (left + right) / 2, y: baseline },
            { sizePx: size, fill, anchor: 'middle' },
          ))
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

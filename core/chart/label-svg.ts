import type { Frame } from './frame.ts';
import type { PlacedLabel } from './labels.ts';
import { svgGroup, svgLine, svgText } from './svg.ts';

/** Labels where they were placed, with leaders to their marks; those without room are left out. */
export function labelsSvg(labels: readonly (PlacedLabel | null)[], frame: Frame): string {
  const { palette, sizePx } = frame;
  const placed = labels.filter((label) => label !== null);
  const leaders = placed.map(({ leader }) =>
    leader === null ? '' : svgLine(leader[0], leader[1], { stroke: palette.quietText }),
  );
  const texts = placed.map(({ text, baseline }) =>
    svgText(text, baseline, { sizePx, fill: palette.text, halo: palette.background }),
  );
  return svgGroup('labels', leaders.join('') + texts.join(''));
}

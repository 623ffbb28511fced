import type { PixelLine } from './thin-line.ts';

/** A line as the `d` of an SVG path, in tenths of a pixel; steps are relative, so they are short. */
export function pathText({ x, y }: PixelLine): string {
  let text = '';
  let atX = 0;
  let atY = 0;
  let isOpen = false;
  for (let i = 0; i < x.length; i++) {
    if (Number.isNaN(y[i])) {
      isOpen = false;
      continue;
    }
    const toX = Math.round(x[i] * 10);
    const toY = Math.round(y[i] * 10);
    if (isOpen) text += ` ${(toX - atX) / 10} ${(toY - atY) / 10}`;
    else text += `M${toX / 10} ${toY / 10}l0 0`;
    isOpen = true;
    atX = toX;
    atY = toY;
  }
  return text;
}

/** A coordinate in tenths of a pixel. */
export function px(value: number): string {
  return String(Math.round(value * 10) / 10 || 0);
}

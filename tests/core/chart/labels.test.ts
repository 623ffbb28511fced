import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { Resvg } from '@resvg/resvg-js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { around, holds, overlap } from '../../../core/chart/boxes.ts';
import { Envelope } from '../../../core/chart/envelope.ts';
import { type Label, placeLabels } from '../../../core/chart/labels.ts';
import { fittingText, textWidth } from '../../../core/chart/text-width.ts';

const bounds = { left: 0, top: 0, right: 400, bottom: 250 };
const room = { bounds, blocked: [], isCrossed: () => false, sizePx: 12 };
const labelAt = (x: number, y: number, text = 'X = 0 at 14.150 MHz'): Label => ({
  text,
  at: { x, y },
  markPx: 6,
});

describe('labels', () => {
  it('never overlap each other, a mark or the bounds, wherever their marks are', () => {
    const place = fc.record({
      x: fc.integer({ min: 0, max: 400 }),
      y: fc.integer({ min: 0, max: 250 }),
    });
    fc.assert(
      fc.property(fc.array(place, { minLength: 1, maxLength: 12 }), (places) => {
        const blocked = places.map((at) => around(at, 6));
        const labels = places.map(({ x, y }) => labelAt(x, y));
        const boxes = placeLabels(labels, { ...room, blocked }).flatMap((l) => l?.box ?? []);
        boxes.forEach((box, i) => {
          expect(holds(bounds, box)).toBe(true);
          expect(blocked.some((mark) => overlap(mark, box))).toBe(false);
          expect(boxes.slice(i + 1).some((other) => overlap(other, box))).toBe(false);
        });
      }),
      { numRuns: 200 },
    );
  });

  it('stand beside their mark, without a leader, where there is room', () => {
    const [placed] = placeLabels([labelAt(100, 100)], room);
    expect(placed?.leader).toBeNull();
    expect(placed?.box.left).toBeCloseTo(110, 6);
  });

  it('of two marks in one place are both there, the second with a leader if it is far', () => {
    const placed = placeLabels([labelAt(200, 100), labelAt(200, 100)], room);
    expect(placed.every((label) => label !== null)).toBe(true);
  });

  it('keep clear of a curve while any other place is free', () => {
    const envelope = new Envelope(400, [
      { x: Float64Array.of(0, 400), y: Float64Array.of(100, 100) },
    ]);
    const isCrossed = envelope.crosses.bind(envelope);
    const [placed] = placeLabels([labelAt(200, 100)], { ...room, isCrossed });
    expect(placed === null || placed === undefined || envelope.crosses(placed.box)).toBe(false);
  });

  it('are left out where there is no room', () => {
    const narrow = { ...room, bounds: { ...bounds, right: 60 } };
    expect(placeLabels([labelAt(30, 100)], narrow)).toEqual([null]);
  });
});

describe('the width of a text', () => {
  it.each(['least SWR 1.32 at 14.150 MHz', 'Hilltop 20 m dipole', 'R and |X| (Ω)', 'WAVE ~ }{'])(
    'is that of the font to a pixel, or more: %s',
    (text) => {
      const folder = createRequire(import.meta.url).resolve('dejavu-fonts-ttf/package.json');
      const file = folder.replace('package.json', 'ttf/DejaVuSans.ttf');
      expect(readFileSync(file).length).toBeGreaterThan(100_000);
      const escaped = text.replaceAll('&', '&amp;');
      const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="900" height="50"><text x="10" y="30" font-size="20" font-family="DejaVu Sans">${escaped}</text></svg>`;
      const drawn = new Resvg(svg, { font: { loadSystemFonts: false, fontFiles: [file] } });
      const inked = drawn.getBBox()?.width ?? Number.NaN;
      expect(textWidth(text, 20)).toBeGreaterThan(inked - 1);
      expect(textWidth(text, 20)).toBeLessThan(inked * 1.06 + 5);
    },
  );

  it('cuts a text that is too long, and leaves one that fits', () => {
    expect(fittingText('Hilltop', 12, 200)).toBe('Hilltop');
    const cut = fittingText('A very long name of an antenna', 12, 100);
    expect(cut).toMatch(/^A very.*…$/);
    expect(textWidth(cut, 12)).toBeLessThanOrEqual(100);
  });
});

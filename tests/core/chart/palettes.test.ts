import { describe, expect, it } from 'vitest';
import { type Palette, palettes, themeNames } from '../../../core/chart/palettes.ts';

type Rgb = readonly [number, number, number];

/** Linear light of an sRGB colour (IEC 61966-2-1; WCAG 2.2, "relative luminance"). */
function linear(colour: string): Rgb {
  const channel = (at: number) => {
    const value = Number.parseInt(colour.slice(at, at + 2), 16) / 255;
    return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4;
  };
  return [channel(1), channel(3), channel(5)];
}

function luminance([r, g, b]: Rgb): number {
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/** WCAG 2.2, "contrast ratio". */
function contrast(a: string, b: string): number {
  const [low, high] = [luminance(linear(a)), luminance(linear(b))].sort((x, y) => x - y);
  return (high + 0.05) / (low + 0.05);
}

/**
 * What full protanopia and deuteranopia leave of linear light: Machado, Oliveira, Fernandes, IEEE
 * Trans. Vis. Comput. Graph. 15(6), 2009, severity 1.0. Values from memory; each row adds up to 1.
 */
const deficiencies: Readonly<Record<string, readonly Rgb[]>> = {
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
};

/** CIE 1976 L*a*b* of linear sRGB light, white D65. */
function lab([r, g, b]: Rgb): Rgb {
  const f = (t: number) => (t > (6 / 29) ** 3 ? Math.cbrt(t) : t / (3 * (6 / 29) ** 2) + 4 / 29);
  const x = f((0.4124 * r + 0.3576 * g + 0.1805 * b) / 0.9505);
  const y = f(0.2126 * r + 0.7152 * g + 0.0722 * b);
  const z = f((0.0193 * r + 0.1192 * g + 0.9505 * b) / 1.089);
  return [116 * y - 16, 500 * (x - y), 200 * (y - z)];
}

function difference(a: Rgb, b: Rgb): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}

const lines: readonly (keyof Palette)[] = ['first', 'second', 'third', 'limit', 'usable', 'frame'];
const texts: readonly (keyof Palette)[] = ['text', 'quietText', 'limit'];

describe.each(themeNames)('the %s theme', (name) => {
  const palette = palettes[name];
  const grounds = [palette.background, palette.outside];

  it('has lines of contrast 3 and more (WCAG 2.2, 1.4.11)', () => {
    for (const ground of grounds) {
      for (const line of lines) {
        expect(contrast(palette[line], ground), line).toBeGreaterThanOrEqual(3);
      }
    }
  });

  it('has texts of contrast 4.5 and more (WCAG 2.2, 1.4.3)', () => {
    for (const ground of grounds) {
      for (const text of texts) {
        expect(contrast(palette[text], ground), text).toBeGreaterThanOrEqual(4.5);
      }
    }
  });
});

describe.each(['light', 'dark'] as const)('the curves of the %s theme', (name) => {
  const { first, second, third } = palettes[name];

  it.each(Object.entries(deficiencies))('stay apart for a reader with %s', (_, matrix) => {
    const seen = (colour: string): Rgb => {
      const light = linear(colour);
      const [r, g, b] = matrix.map((row) =>
        Math.min(1, Math.max(0, row[0] * light[0] + row[1] * light[1] + row[2] * light[2])),
      );
      return lab([r, g, b]);
    };
    // A difference of 2.3 is just noticed (Mahy, Van Eycken, Oosterlinck 1994); six times that.
    for (const [a, b] of [
      [first, second],
      [second, third],
      [first, third],
    ] as const) {
      expect(difference(seen(a), seen(b))).toBeGreaterThan(14);
    }
  });
});

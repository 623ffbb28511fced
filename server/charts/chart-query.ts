import { z } from 'zod';
import type { ChartStyle } from '../../core/chart/chart-style.ts';
import { themeNames } from '../../core/chart/palettes.ts';
import { readHeaders } from '../wire/common.ts';

const leastWidthPx = 280;
const usualWidthPx = 720;
const leastHeightPx = 220;
const mostPx = 2400;

function isLanguage(tag: string): boolean {
  try {
    return Intl.getCanonicalLocales(tag).length === 1;
  } catch {
    return false;
  }
}

/** What every chart may be asked for. */
export const chartQuery = {
  width: z.coerce
    .number()
    .int()
    .min(leastWidthPx)
    .max(mostPx)
    .default(usualWidthPx)
    .meta({ description: 'Pixels.' }),
  height: z.coerce
    .number()
    .int()
    .min(leastHeightPx)
    .max(mostPx)
    .optional()
    .meta({ description: 'Pixels; default: three fifths of the width, at least 280.' }),
  theme: z.enum(themeNames).default('light').meta({ description: '`print` needs black ink only.' }),
  numbers: z
    .string()
    .max(35)
    .refine(isLanguage, 'Not a language tag (BCP 47).')
    .default('en')
    .meta({ description: 'Language of the decimal sign, as a BCP 47 tag.', examples: ['de'] }),
};

interface AskedStyle {
  readonly width: number;
  readonly height?: number | undefined;
  readonly theme: ChartStyle['theme'];
  readonly numbers: string;
}

/** The style that a query asks for; `heightShare`: the usual height over the width. */
export function styleOf(
  { width, height, theme, numbers }: AskedStyle,
  heightShare = 0.6,
): ChartStyle {
  const usual = Math.max(280, Math.min(usualWidthPx, Math.round(width * heightShare)));
  return { widthPx: width, heightPx: height ?? usual, theme, numbers };
}

/** Headers of a chart's request. */
export const chartHeaders = readHeaders.extend({
  accept: z.string().optional().meta({ description: '`image/svg+xml` or `image/png`.' }),
});

/** The two forms of a chart, for the document. */
export const chartAnswer = {
  description:
    'The chart. The `Link` header leads to its figures as a table, and `<desc>` has the facts in words.',
  content: { 'image/svg+xml': { schema: z.string() }, 'image/png': { schema: z.string() } },
};

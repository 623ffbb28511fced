import type { ThemeName } from './palettes.ts';

/** How a chart is to look. */
export interface ChartStyle {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly theme: ThemeName;
  /** BCP 47 tag of the language whose decimal sign is used. */
  readonly numbers: string;
}

/** What a chart is of, in the words of its owner. */
export interface ChartHeading {
  readonly title: string;
  readonly subtitle: string;
  /** Where the same figures are as a table; null: nowhere. */
  readonly tableUrl: string | null;
}

/** The colours of a theme; each is told apart from its neighbours by a dash or a mark as well. */
export interface Palette {
  readonly background: string;
  readonly text: string;
  readonly quietText: string;
  /** Grid and frame: there to be overlooked, so they need no contrast. */
  readonly grid: string;
  readonly frame: string;
  /** Where no band is. */
  readonly outside: string;
  readonly first: string;
  readonly second: string;
  readonly third: string;
  readonly limit: string;
  readonly usable: string;
}

export const themeNames = ['light', 'dark', 'print'] as const;
export type ThemeName = (typeof themeNames)[number];

/**
 * Blue, brown-orange and rose differ in lightness as well as in hue, so that they stay apart
 * without red or green; print needs black ink only.
 */
export const palettes: Readonly<Record<ThemeName, Palette>> = {
  light: {
    background: '#ffffff',
    text: '#1c2126',
    quietText: '#545d66',
    grid: '#d5dade',
    frame: '#848d96',
    outside: '#f1f3f5',
    first: '#0b4f8a',
    second: '#c2570c',
    third: '#c8508a',
    limit: '#a8321f',
    usable: '#0f7a5f',
  },
  dark: {
    background: '#14181c',
    text: '#eceff2',
    quietText: '#aab4be',
    grid: '#2d343b',
    frame: '#7d8791',
    outside: '#1d2329',
    first: '#7cc0ff',
    second: '#f0933b',
    third: '#d070a0',
    limit: '#ff8f7d',
    usable: '#4fcfa8',
  },
  print: {
    background: '#ffffff',
    text: '#000000',
    quietText: '#333333',
    grid: '#d4d4d4',
    frame: '#555555',
    outside: '#f0f0f0',
    first: '#000000',
    second: '#5e5e5e',
    third: '#3c3c3c',
    limit: '#000000',
    usable: '#4a4a4a',
  },
};

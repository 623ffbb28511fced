import type { Weather } from '../record/conditions.ts';
import type { Point } from './boxes.ts';
import type { Frame } from './frame.ts';
import { px } from './path-text.ts';
import { svgGroup, svgText } from './svg.ts';
import { textWidth } from './text-width.ts';

/** The weather of a measurement, as far as it is known. */
export type KnownWeather = Weather | 'unknown';

const names: Readonly<Record<KnownWeather, string>> = {
  dry: 'dry',
  rain: 'rain',
  wet_after_rain: 'wet after rain',
  snow_or_ice: 'snow or ice',
  unknown: 'weather not told',
};
const order: readonly KnownWeather[] = ['dry', 'rain', 'wet_after_rain', 'snow_or_ice', 'unknown'];

/** The mark of a measurement: its shape tells the weather, in any colour and in none. */
export function weatherMark(
  weather: KnownWeather,
  { x, y }: Point,
  stroke: string,
  ground: string,
): string {
  const look = (fill: string) => `fill="${fill}" stroke="${stroke}" stroke-width="1.6"/>`;
  switch (weather) {
    case 'dry':
      return `<circle cx="${px(x)}" cy="${px(y)}" r="4" ${look(ground)}`;
    case 'rain':
      return `<circle cx="${px(x)}" cy="${px(y)}" r="4" ${look(stroke)}`;
    case 'wet_after_rain':
      return `<path d="M${px(x - 4.5)} ${px(y - 3.5)}h9l-4.5 8z" ${look(stroke)}`;
    case 'snow_or_ice':
      return `<path d="M${px(x - 4)} ${px(y - 4)}h8v8h-8z" ${look(ground)}`;
    case 'unknown':
      return `<path d="M${px(x - 4)} ${px(y - 4)}l8 8m0 -8l-8 8" ${look('none')}`;
  }
}

/** What the marks mean, those that are there, in a row above the plot. */
export function weatherLegend(present: ReadonlySet<KnownWeather>, frame: Frame): string {
  const { plot, palette, sizePx, style } = frame;
  const size = sizePx - 1;
  let left = 14;
  const y = plot.top - 22;
  const entries: string[] = [];
  for (const weather of order) {
    if (!present.has(weather)) continue;
    const width = 20 + textWidth(names[weather], size);
    if (left + width > style.widthPx) break;
    entries.push(
      weatherMark(weather, { x: left, y: y - 4 }, palette.text, palette.background) +
        svgText(names[weather], { x: left + 9, y }, { sizePx: size, fill: palette.text }),
    );
    left += width + 6;
  }
  return svgGroup('legend', entries.join(''));
}

/** The name of a weather in a sentence. */
export function weatherName(weather: KnownWeather): string {
  return names[weather];
}

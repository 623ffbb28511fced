/** How wet an antenna was when it was measured, and whether something lay on it. */
export const weathers = ['dry', 'rain', 'wet_after_rain', 'snow_or_ice'] as const;
export type Weather = (typeof weathers)[number];

/** What is under the antenna. */
export const grounds = ['dry', 'moist', 'wet', 'flooded', 'frozen', 'snow_covered'] as const;
export type Ground = (typeof grounds)[number];

/** The conditions that a sweep was measured in; null is not known. */
export interface Conditions {
  readonly weather: Weather | null;
  readonly windMS: number | null;
  readonly temperatureC: number | null;
  readonly ground: Ground | null;
}

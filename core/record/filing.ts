import type { HzRange } from '../bands/ranges.ts';

/** A band that a frequency may be filed under. */
export interface FilingBand extends HzRange {
  readonly band: string;
  /** The antenna is meant for it. */
  readonly isDesign: boolean;
}

/** A frequency farther from a band than this ratio does not belong to it (our choice). */
const reach = 1.15;

/**
 * The band that a frequency belongs to: the one that holds it, else the nearest design band within
 * reach, else the nearest other one. An antenna that is cut too long resonates below its band, and
 * its record must not lose it there. Null where no band is near.
 */
export function bandToFile(bands: readonly FilingBand[], frequencyHz: number): string | null {
  const holding = bands.find(({ lowHz, highHz }) => lowHz <= frequencyHz && frequencyHz <= highHz);
  if (holding !== undefined) return holding.band;
  const design = nearest(
    bands.filter(({ isDesign }) => isDesign),
    frequencyHz,
  );
  return design ?? nearest(bands, frequencyHz);
}

function nearest(bands: readonly FilingBand[], frequencyHz: number): string | null {
  let found: string | null = null;
  let least = reach;
  for (const { band, lowHz, highHz } of bands) {
    const ratio = Math.max(lowHz / frequencyHz, frequencyHz / highHz);
    if (ratio > least) continue;
    least = ratio;
    found = band;
  }
  return found;
}

import type { Resonance, Summary } from '../analysis/summary.ts';
import type { BandUse } from '../bands/usable-report.ts';
import { trimBehaviour } from './antenna-kind.ts';
import { type Finding, type FindingFacts, khz, mhz } from './finding.ts';

/** A resonance this far off, as a fraction, is not the one that was meant for a band. */
const MEANT_FOR = 0.2;

/** What to do about one band, by the resonance or, through a line, by the least SWR. */
export function bandFindings(
  summary: Summary,
  band: BandUse,
  facts: FindingFacts,
): readonly Finding[] {
  if (band.verdict === 'not_swept') {
    return [
      {
        code: 'band_not_swept',
        detail: `The sweep does not reach ${band.band}, for which the antenna is meant.`,
        next: 'sweep_again',
        band: band.band,
      },
    ];
  }
  if (band.verdict === 'usable') {
    return [
      {
        code: 'band_usable',
        detail: `All of ${band.band} is within SWR ${facts.maxSwr}: leave it.`,
        next: 'leave',
        band: band.band,
      },
    ];
  }
  const found = placeFindings(summary, band, facts);
  if (found.length > 0) return found;
  const share = (100 * band.usableFraction).toFixed(0);
  return [
    {
      code: 'band_wider_than_antenna',
      detail: `${share} % of ${band.band} is known to be within SWR ${facts.maxSwr}, and the antenna stands where it should: a match can widen it.`,
      next: 'match',
      band: band.band,
    },
  ];
}

function placeFindings(summary: Summary, band: BandUse, facts: FindingFacts): readonly Finding[] {
  const throughLine =
    summary.plane === 'measured' &&
    facts.lineFlags.some((flag) => flag.code === 'line_moves_resonance');
  if (throughLine || summary.phase !== 'signed') return byMinimum(summary, band, facts);
  return byResonance(summary, band, facts);
}

function byResonance(summary: Summary, band: BandUse, facts: FindingFacts): readonly Finding[] {
  const resonance = nearestResonance(summary.resonances, band);
  if (resonance === null) {
    return [
      {
        code: 'no_resonance_near_band',
        detail: `No resonance lies near ${band.band}. Sweep wider, or match the antenna as it is.`,
        next: 'match',
        band: band.band,
      },
    ];
  }
  const place = placed('resonance', 'resonance', resonance, band, facts);
  return [...place, ...resistanceFinding(resonance, summary.referenceOhm, band, facts)];
}

/** Seen through a line the least SWR stays near the antenna's own, a resonance does not. */
function byMinimum(summary: Summary, band: BandUse, facts: FindingFacts): readonly Finding[] {
  const near = summary.swrMinima.filter(
    (minimum) => !minimum.atEdge && isNear(minimum.frequencyHz, band),
  );
  const minimum = near.reduce<(typeof near)[number] | null>(
    (best, each) => (best === null || distance(each, band) < distance(best, band) ? each : best),
    null,
  );
  if (minimum === null) return [];
  const place = placed('swr_minimum', 'the least SWR', minimum, band, facts);
  if (minimum.swr <= facts.maxSwr) return place;
  return [
    ...place,
    {
      code: 'minimum_above_limit',
      detail: `Even at its least, ${minimum.swr.toFixed(1)} at ${mhz(minimum.frequencyHz)} MHz, the SWR is above ${facts.maxSwr}: a match, not a trim.`,
      next: 'match',
      band: band.band,
    },
  ];
}

/** Where a frequency lies against a band, beyond its half-width. */
function placed(
  code: 'resonance' | 'swr_minimum',
  name: string,
  at: { readonly frequencyHz: number; readonly frequencyU95Hz: number | null },
  band: BandUse,
  facts: FindingFacts,
): readonly Finding[] {
  const halfWidth = at.frequencyU95Hz ?? 0;
  const below = band.lowHz - at.frequencyHz;
  const above = at.frequencyHz - band.highHz;
  if (below <= halfWidth && above <= halfWidth) return [];
  const isBelow = below > halfWidth;
  const trim = trimBehaviour(facts.kind);
  const verb = isBelow ? 'shorten' : 'lengthen';
  const action = {
    bare: `${verb} it`,
    own_way: `${verb} it by a small trial, and sweep again`,
    not_by_length: `tune its capacitor ${isBelow ? 'up' : 'down'} in frequency`,
  }[trim];
  return [
    {
      code: `${code}_${isBelow ? 'below' : 'above'}_band`,
      detail: `${capital(name)} is ${khz(isBelow ? below : above)} kHz ${isBelow ? 'below' : 'above'} ${band.band}: ${action}.`,
      next: 'trim',
      band: band.band,
    },
  ];
}

function resistanceFinding(
  resonance: Resonance,
  referenceOhm: number,
  band: BandUse,
  facts: FindingFacts,
): readonly Finding[] {
  const { resistanceOhm } = resonance;
  if (resistanceOhm === null) return [];
  const ratio = Math.max(resistanceOhm / referenceOhm, referenceOhm / resistanceOhm);
  if (ratio <= facts.maxSwr) return [];
  return [
    {
      code: resistanceOhm < referenceOhm ? 'resistance_low' : 'resistance_high',
      detail: `R at resonance is ${resistanceOhm.toPrecision(2)} ohm: a match, not a trim, brings it to ${referenceOhm} ohm.`,
      next: 'match',
      band: band.band,
    },
  ];
}

function nearestResonance(resonances: readonly Resonance[], band: BandUse): Resonance | null {
  return resonances
    .filter((resonance) => resonance.kind === 'series' && isNear(resonance.frequencyHz, band))
    .reduce<Resonance | null>(
      (best, each) => (best === null || distance(each, band) < distance(best, band) ? each : best),
      null,
    );
}

/** Distance to the band in hertz, 0 inside it. */
function distance(at: { readonly frequencyHz: number }, band: BandUse): number {
  return Math.max(0, band.lowHz - at.frequencyHz, at.frequencyHz - band.highHz);
}

function isNear(hz: number, band: BandUse): boolean {
  return distance({ frequencyHz: hz }, band) <= (MEANT_FOR * (band.lowHz + band.highHz)) / 2;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

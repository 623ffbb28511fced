import type { Resonance, Summary } from '../analysis/summary.ts';
import type { BandUse } from '../bands/usable-report.ts';
import { type AntennaKind, trimBehaviour } from './antenna-kind.ts';
import { type Aim, type Finding, type FindingFacts, khz, mhz } from './finding.ts';

/** A resonance this far off, as a fraction, is not the one that was meant for a band. */
const MEANT_FOR = 0.2;
/** Kinds whose working resonance may be a parallel one: high impedance, or coupled to the feed. */
const PARALLEL_KINDS: readonly AntennaKind[] = ['end_fed', 'small_loop', 'other'];

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
  const aim = { name: band.band, lowHz: band.lowHz, highHz: band.highHz };
  const found = aimFindings(summary, aim, facts);
  if (found.length > 0) return found;
  if (band.verdict === 'partly_swept') {
    return [
      {
        code: 'band_partly_swept',
        detail: `Only ${percent(band.sweptFraction)} of ${band.band} was swept. Sweep all of it.`,
        next: 'sweep_again',
        band: band.band,
      },
    ];
  }
  return [
    {
      code: 'band_wider_than_antenna',
      detail: `${percent(band.usableFraction)} of ${band.band} is within SWR ${facts.maxSwr}, and the antenna stands where it should: a match can widen it.`,
      next: 'match',
      band: band.band,
    },
  ];
}

/** How the antenna stands to a band or segment: place of its resonance, and resistance there. */
export function aimFindings(summary: Summary, aim: Aim, facts: FindingFacts): readonly Finding[] {
  const throughLine =
    summary.plane === 'measured' &&
    facts.lineFlags.some((flag) => flag.code === 'line_moves_resonance');
  if (throughLine || summary.phase !== 'signed') return byMinimum(summary, aim, facts);
  return byResonance(summary, aim, facts);
}

function byResonance(summary: Summary, aim: Aim, facts: FindingFacts): readonly Finding[] {
  const resonance = nearestResonance(summary.resonances, aim, facts.kind);
  if (resonance === null) {
    return [
      {
        code: 'no_resonance_near',
        detail: `No resonance lies near ${aim.name}. Sweep wider, or match the antenna as it is.`,
        next: 'match',
        band: aim.name,
      },
    ];
  }
  const place = placed('resonance', 'resonance', resonance, aim, facts);
  return [...place, ...resistanceFinding(resonance, summary.referenceOhm, aim, facts)];
}

/** Seen through a line the least SWR stays near the antenna's own, a resonance does not. */
function byMinimum(summary: Summary, aim: Aim, facts: FindingFacts): readonly Finding[] {
  const near = summary.swrMinima.filter(
    (minimum) => !minimum.atEdge && isNear(minimum.frequencyHz, aim),
  );
  const minimum = near.reduce<(typeof near)[number] | null>(
    (best, each) => (best === null || distance(each, aim) < distance(best, aim) ? each : best),
    null,
  );
  if (minimum === null) {
    return [
      {
        code: 'no_minimum_near',
        detail: `The SWR has no minimum near ${aim.name}. Sweep wider, or match the antenna as it is.`,
        next: 'match',
        band: aim.name,
      },
    ];
  }
  const place = placed('swr_minimum', 'the least SWR', minimum, aim, facts);
  if (minimum.swr <= facts.maxSwr) return place;
  return [
    ...place,
    {
      code: 'minimum_above_limit',
      detail: `Even at its least, ${minimum.swr.toFixed(1)} at ${mhz(minimum.frequencyHz)} MHz, the SWR is above ${facts.maxSwr}: a match, not a trim.`,
      next: 'match',
      band: aim.name,
    },
  ];
}

/** Where a frequency lies against a band, beyond its half-width. */
function placed(
  code: 'resonance' | 'swr_minimum',
  name: string,
  at: { readonly frequencyHz: number; readonly frequencyU95Hz: number | null },
  aim: Aim,
  facts: FindingFacts,
): readonly Finding[] {
  const halfWidth = at.frequencyU95Hz ?? 0;
  const below = aim.lowHz - at.frequencyHz;
  const above = at.frequencyHz - aim.highHz;
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
      code: `${code}_${isBelow ? 'below' : 'above'}`,
      detail: `${capital(name)} is ${khz(isBelow ? below : above)} kHz ${isBelow ? 'below' : 'above'} ${aim.name}: ${action}.`,
      next: 'trim',
      band: aim.name,
    },
  ];
}

function resistanceFinding(
  resonance: Resonance,
  referenceOhm: number,
  aim: Aim,
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
      band: aim.name,
    },
  ];
}

function nearestResonance(
  resonances: readonly Resonance[],
  aim: Aim,
  kind: AntennaKind,
): Resonance | null {
  const either = PARALLEL_KINDS.includes(kind);
  return resonances
    .filter((resonance) => either || resonance.kind === 'series')
    .filter((resonance) => isNear(resonance.frequencyHz, aim))
    .reduce<Resonance | null>(
      (best, each) => (best === null || distance(each, aim) < distance(best, aim) ? each : best),
      null,
    );
}

/** Distance to the band in hertz, 0 inside it. */
function distance(at: { readonly frequencyHz: number }, aim: Aim): number {
  return Math.max(0, aim.lowHz - at.frequencyHz, at.frequencyHz - aim.highHz);
}

function isNear(hz: number, aim: Aim): boolean {
  return distance({ frequencyHz: hz }, aim) <= (MEANT_FOR * (aim.lowHz + aim.highHz)) / 2;
}

function percent(fraction: number): string {
  return `${(100 * fraction).toFixed(0)} %`;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

import type { QualityFlag, Summary } from '../analysis/summary.ts';
import type { Result } from '../result.ts';
import type { Sweep } from '../sweep.ts';
import { magnitude } from './complex.ts';
import type { FeedLine, FeedLineError } from './feed-line.ts';
import { electricalLength, matchedLossDb, toFeedPoint } from './line.ts';
import { handbookTotalLossDb, lossThroughLine, swrAtLoad } from './loss-with-swr.ts';

/** A line at one frequency, seen from both of its ends. */
export interface BothEnds {
  readonly frequencyHz: number;
  /** Null for a reflection of 1 or more. */
  readonly swrShack: number | null;
  readonly swrAntenna: number | null;
  readonly matchedLossDb: number;
  /** What the mismatch adds; may be below zero on a short line (the load favours its low-loss wave). */
  readonly mismatchLossDb: number | null;
  readonly totalLossDb: number | null;
  /** The handbook form for real impedance; null where the line has several or not the reference. */
  readonly handbookTotalLossDb: number | null;
  /** `magnitude_only`: no phase was measured, so only the handbook form could be used. */
  readonly method: 'complex' | 'magnitude_only';
}

/** What lies between analyzer and antenna, and what it does to the answer. */
export interface LineReport {
  /** At the SWR minimum and the resonances of the measured plane, ascending. */
  readonly ends: readonly BothEnds[];
  readonly flags: readonly QualityFlag[];
}

/** From this length, in wavelengths, a line moves a resonance visibly (common practice, no source). */
const SIGNIFICANT_LENGTH = 0.01;
/** The mismatch counts as hidden where the antenna's SWR exceeds the shack's this many times. */
const HIDING_RATIO = 1.25;

/**
 * The two ends of the line at the frequencies of a summary made at the measured plane, with flags:
 * `line_length_unknown`, `line_unknown`, `line_moves_resonance`, `loss_hides_mismatch`.
 */
export function lineReport(
  measured: Sweep,
  summary: Summary,
  line: Result<FeedLine, FeedLineError>,
  maxSwr: number,
): LineReport {
  if (!line.ok) return { ends: [], flags: unknownLine(line.error) };
  const asked = new Set([
    ...(summary.minimumSwr === null ? [] : [summary.minimumSwr.frequencyHz]),
    ...summary.resonances.map((resonance) => resonance.frequencyHz),
  ]);
  const ends = [...asked]
    .sort((a, b) => a - b)
    .flatMap((frequencyHz) => bothEnds(measured, line.value, frequencyHz) ?? []);
  const flags = [
    ...movedResonance(line.value, (summary.span.lowHz + summary.span.highHz) / 2),
    ...hiddenMismatch(ends, maxSwr),
  ];
  return { ends, flags };
}

/**
 * Both ends at one frequency inside the sweep (the reflection is interpolated between its points).
 * Null outside the sweep, and without phase where the line is not of the reference's impedance.
 */
export function bothEnds(measured: Sweep, line: FeedLine, frequencyHz: number): BothEnds | null {
  const at = interpolated(measured, frequencyHz);
  if (at === null) return null;
  return at.phase === 'signed' ? complexEnds(at, line) : magnitudeEnds(at, line);
}

function complexEnds(at: Sweep, line: FeedLine): BothEnds | null {
  const moved = toFeedPoint(at, line);
  if (!moved.ok || at.phase === 'none') return null;
  const frequencyHz = at.frequencyHz[0];
  const load = { re: moved.value.reflectionRe[0], im: moved.value.reflectionIm[0] };
  const { totalLossDb, reflection } = lossThroughLine(line, frequencyHz, load, at.referenceOhm);
  const matched = matchedLossDb(line, frequencyHz);
  const rho = magnitude(load);
  return {
    frequencyHz,
    swrShack: swrOf(magnitude(reflection)),
    swrAntenna: swrOf(rho),
    matchedLossDb: matched,
    mismatchLossDb: totalLossDb === null ? null : totalLossDb - matched,
    totalLossDb,
    handbookTotalLossDb: isUniform(line, at.referenceOhm)
      ? handbookTotalLossDb(matched, rho)
      : null,
    method: 'complex',
  };
}

function magnitudeEnds(at: Sweep, line: FeedLine): BothEnds | null {
  if (!isUniform(line, at.referenceOhm)) return null;
  const frequencyHz = at.frequencyHz[0];
  const matched = matchedLossDb(line, frequencyHz);
  const swrShack = swrOf(
    at.phase === 'none'
      ? at.reflectionMagnitude[0]
      : Math.hypot(at.reflectionRe[0], at.reflectionIm[0]),
  );
  const swrAntenna = swrShack === null ? null : swrAtLoad(swrShack, matched);
  const total =
    swrAntenna === null ? null : handbookTotalLossDb(matched, (swrAntenna - 1) / (swrAntenna + 1));
  return {
    frequencyHz,
    swrShack,
    swrAntenna,
    matchedLossDb: matched,
    mismatchLossDb: total === null ? null : total - matched,
    totalLossDb: total,
    handbookTotalLossDb: total,
    method: 'magnitude_only',
  };
}

/** A sweep of the one point asked for, linear between its neighbours. */
function interpolated(sweep: Sweep, frequencyHz: number): Sweep | null {
  const f = sweep.frequencyHz;
  const upper = f.findIndex((each) => each >= frequencyHz);
  if (upper < 0 || (upper === 0 && f[0] !== frequencyHz)) return null;
  const lower = Math.max(0, upper - 1);
  const share = upper === lower ? 0 : (frequencyHz - f[lower]) / (f[upper] - f[lower]);
  const between = (values: Float64Array) =>
    Float64Array.of(values[lower] + share * (values[upper] - values[lower]));
  const at = { frequencyHz: Float64Array.of(frequencyHz), referenceOhm: sweep.referenceOhm };
  if (sweep.phase === 'none') {
    return { ...at, phase: 'none', reflectionMagnitude: between(sweep.reflectionMagnitude) };
  }
  return {
    ...at,
    phase: sweep.phase,
    reflectionRe: between(sweep.reflectionRe),
    reflectionIm: between(sweep.reflectionIm),
  };
}

function isUniform(line: FeedLine, referenceOhm: number): boolean {
  return line.sections.every((section) => section.cable.characteristicOhm === referenceOhm);
}

function swrOf(rho: number): number | null {
  return rho < 1 ? (1 + rho) / (1 - rho) : null;
}

function unknownLine(error: FeedLineError): readonly QualityFlag[] {
  return [
    {
      code: error.code,
      detail: `${error.detail} All figures hold where the analyzer was connected; the antenna's own are not known.`,
    },
    {
      code: 'line_moves_resonance',
      detail:
        'A resonance seen through an unknown line is not that of the antenna: the line turns the impedance, and its reactance can be zero at other frequencies.',
    },
  ];
}

function movedResonance(line: FeedLine, frequencyHz: number): readonly QualityFlag[] {
  const wavelengths = electricalLength(line, frequencyHz);
  if (wavelengths < SIGNIFICANT_LENGTH) return [];
  return [
    {
      code: 'line_moves_resonance',
      detail: `The line is ${wavelengths.toFixed(2)} wavelengths long in the middle of the sweep: a resonance seen at the shack is not that of the antenna. Look at the feed point for it.`,
    },
  ];
}

function hiddenMismatch(ends: readonly BothEnds[], maxSwr: number): readonly QualityFlag[] {
  const hidden = ends.find(({ swrShack, swrAntenna }) => {
    if (swrShack === null || swrShack > maxSwr) return false;
    return swrAntenna === null || (swrAntenna > maxSwr && swrAntenna > HIDING_RATIO * swrShack);
  });
  if (hidden === undefined) return [];
  const antenna = hidden.swrAntenna === null ? 'beyond any limit' : hidden.swrAntenna.toFixed(2);
  return [
    {
      code: 'loss_hides_mismatch',
      detail: `At ${(hidden.frequencyHz / 1e6).toFixed(3)} MHz the SWR is ${hidden.swrShack?.toFixed(2)} at the shack but ${antenna} at the antenna: ${hidden.matchedLossDb.toFixed(1)} dB of line loss hide the mismatch.`,
    },
  ];
}

import type { Assumption } from '../formats/read-types.ts';
import { reflectionMagnitude } from '../sweep.ts';
import type { Analysis } from './analysis.ts';
import { clippedRuns } from './clipped.ts';
import type { QualityFlag, Resonance, SwrMinimum } from './summary.ts';

/** Every code that a quality flag can have. */
export const qualityFlagCodes = [
  'passivity_broken',
  'coarse_grid',
  'noisy',
  'sweep_too_narrow',
  'looks_open_or_short',
  'values_clipped',
  'reactance_never_negative',
  'swr_grazes_limit',
  'bandwidth_disagrees',
  'frequencies_mended',
  'assumptions_made',
] as const;

type QualityFlagCode = (typeof qualityFlagCodes)[number];
type Flag = QualityFlag & { readonly code: QualityFlagCode };

/** Fewer points than this in a resonance's bandwidth leave its shape to guessing. */
const fewestPointsInBandwidth = 5;
const noisyAbove = 0.01;
const totalAbove = 0.98;
/** Bandwidths that differ by less than this part agree: the prediction is an approximation. */
const bandwidthTolerance = 0.1;
/** What a reader of files assumes when it puts frequencies in order or joins equal ones. */
const mendingAssumptions = new Set(['points_sorted', 'points_reversed', 'points_twice']);

/** What was found of a sweep before its flags are. */
export interface Findings {
  readonly resonances: readonly Resonance[];
  readonly minimum: SwrMinimum | null;
  /** Frequencies at which the SWR touches a limit within the noise. */
  readonly grazingHz: readonly { readonly maxSwr: number; readonly frequencyHz: number }[];
  readonly assumptions: readonly Assumption[];
}

/** What the keeper should know of the sweep itself, each with what to do about it. */
export function qualityFlags(analysis: Analysis, findings: Findings): readonly QualityFlag[] {
  return [
    ...passivityFlag(analysis),
    ...coarseGridFlags(analysis, findings),
    ...noiseFlag(analysis),
    ...narrowFlag(findings),
    ...openOrShortFlag(analysis),
    ...clippedFlags(analysis),
    ...neverNegativeFlag(analysis),
    ...grazingFlags(findings),
    ...bandwidthFlags(findings),
    ...mendedFlag(findings),
    ...assumptionsFlag(findings),
  ];
}

function megahertz(frequencyHz: number): string {
  return `${(frequencyHz / 1e6).toFixed(3)} MHz`;
}

function passivityFlag({ sweep, noise }: Analysis): Flag[] {
  const magnitude = reflectionMagnitude(sweep);
  const { frequencyHz } = sweep;
  // So far above 1 the noise on a total reflection may reach somewhere among so many points.
  const reach = 1 + Math.sqrt(2 * Math.log(magnitude.length));
  const limit = 1 + reach * (noise ?? 0) + 1e-9;
  const above = magnitude.reduce((count, m) => (m > limit ? count + 1 : count), 0);
  if (above === 0) return [];
  const lowHz = frequencyHz[magnitude.findIndex((m) => m > limit)];
  const highHz = frequencyHz[magnitude.findLastIndex((m) => m > limit)];
  const detail = `${above} of ${magnitude.length} points, between ${megahertz(lowHz)} and ${megahertz(highHz)}, reflect more than was sent. Repeat the calibration and check the connectors.`;
  return [{ code: 'passivity_broken', detail, lowHz, highHz }];
}

function coarseGridFlags({ sweep }: Analysis, { resonances }: Findings): Flag[] {
  const { frequencyHz } = sweep;
  const coarse = resonances.filter((resonance) => {
    if (resonance.q === null || resonance.grazing) return false;
    const next = frequencyHz.findIndex((f) => f >= resonance.frequencyHz);
    const upper = Math.max(1, next);
    const stepHz = frequencyHz[upper] - frequencyHz[upper - 1];
    return resonance.frequencyHz / resonance.q < fewestPointsInBandwidth * stepHz;
  });
  if (coarse.length === 0) return [];
  const places = placesOf(coarse.map((resonance) => resonance.frequencyHz));
  const detail = `Fewer than ${fewestPointsInBandwidth} points lie in the bandwidth of ${coarse.length === 1 ? 'the resonance' : `${coarse.length} resonances`} at ${places}. Sweep again with more points or a narrower span.`;
  return [{ code: 'coarse_grid', detail, ...stretchOf(coarse.map((r) => r.frequencyHz)) }];
}

/** Up to five frequencies by name. */
function placesOf(frequencyHz: readonly number[]): string {
  const named = frequencyHz.slice(0, 5).map(megahertz).join(', ');
  return frequencyHz.length > 5 ? `${named} and others` : named;
}

function stretchOf(frequencyHz: readonly number[]) {
  return { lowHz: Math.min(...frequencyHz), highHz: Math.max(...frequencyHz) };
}

function noiseFlag({ noise }: Analysis): Flag[] {
  if (noise === null || noise <= noisyAbove) return [];
  const detail = `The reflection scatters by ${noise.toPrecision(2)} from point to point. Tighten the connectors, average more, and look for a strong transmitter nearby.`;
  return [{ code: 'noisy', detail }];
}

function narrowFlag({ minimum }: Findings): Flag[] {
  if (minimum?.atEdge !== true) return [];
  const detail = `The lowest SWR is at an end of the sweep, ${megahertz(minimum.frequencyHz)}, so the true minimum lies outside. Sweep wider on that side.`;
  return [{ code: 'sweep_too_narrow', detail }];
}

function openOrShortFlag({ sweep }: Analysis): Flag[] {
  if (!reflectionMagnitude(sweep).every((m) => m > totalAbove)) return [];
  const detail =
    'Nearly everything is reflected at every frequency: this looks like an open or a short. Check that the antenna and its line are connected.';
  return [{ code: 'looks_open_or_short', detail }];
}

function clippedFlags({ sweep }: Analysis): Flag[] {
  const { frequencyHz } = sweep;
  return clippedRuns(reflectionMagnitude(sweep)).map(({ first, last }): Flag => {
    const lowHz = frequencyHz[first];
    const highHz = frequencyHz[last];
    const detail = `From ${megahertz(lowHz)} to ${megahertz(highHz)} the reflection stands still at its greatest value: the instrument seems to cut off what lies above. Do not rely on SWR or impedance there; use an instrument or a setting with a wider range.`;
    return { code: 'values_clipped', detail, lowHz, highHz };
  });
}

function neverNegativeFlag({ sweep }: Analysis): Flag[] {
  if (sweep.phase !== 'signed' || sweep.frequencyHz.length < 5) return [];
  const im = sweep.reflectionIm;
  if (!im.every((x) => x >= 0)) return [];
  let at = 0;
  for (let i = 0; i < im.length; i++) if (im[i] < im[at]) at = i;
  const isInside = at > 0 && at < im.length - 1;
  const swing = Math.min(largestOf(im, 0, at), largestOf(im, at, im.length - 1));
  if (!isInside || im[at] > 0.05 * swing) return [];
  const detail = `The reactance falls to zero near ${megahertz(sweep.frequencyHz[at])} and rises again but is never negative: the file may hold its magnitude only. If so, send it again with a mapping that says the sign is unknown.`;
  return [{ code: 'reactance_never_negative', detail }];
}

function largestOf(values: Float64Array, from: number, to: number): number {
  let largest = values[from];
  for (let i = from; i <= to; i++) largest = Math.max(largest, values[i]);
  return largest;
}

function grazingFlags({ grazingHz }: Findings): Flag[] {
  const limits = [...new Set(grazingHz.map(({ maxSwr }) => maxSwr))];
  return limits.map((limit): Flag => {
    const at = grazingHz.filter(({ maxSwr }) => maxSwr === limit).map((g) => g.frequencyHz);
    const detail = `Near ${placesOf(at)} the SWR touches ${limit} within the noise: whether it passes cannot be told, and no span edge was set there. Sweep that stretch again with more points or more averaging.`;
    return { code: 'swr_grazes_limit', detail, ...stretchOf(at) };
  });
}

function bandwidthFlags({ resonances }: Findings): Flag[] {
  return resonances.flatMap(({ frequencyHz, matchedBandwidth }): Flag[] => {
    if (matchedBandwidth === null) return [];
    const { predictedHz, predictedU95Hz, measuredHz, measuredU95Hz, maxSwr } = matchedBandwidth;
    if (measuredHz === null || measuredU95Hz === null || predictedU95Hz === null) return [];
    const difference = Math.abs(measuredHz - predictedHz);
    const isExplained = difference <= Math.hypot(measuredU95Hz, predictedU95Hz);
    if (isExplained || difference < bandwidthTolerance * predictedHz) return [];
    const detail = `At ${megahertz(frequencyHz)} the Q predicts ${(predictedHz / 1e3).toFixed(1)} kHz between the points of SWR ${maxSwr} of the matched antenna, the sweep shows ${(measuredHz / 1e3).toFixed(1)} kHz: another resonance or a line shapes the curve there. Rely on the measured span.`;
    return [{ code: 'bandwidth_disagrees', detail }];
  });
}

function mendedFlag({ assumptions }: Findings): Flag[] {
  if (!assumptions.some(({ code }) => mendingAssumptions.has(code))) return [];
  const detail =
    'The file held frequencies twice or out of order, and they were put right in reading. Check that the file is one sweep and not two joined.';
  return [{ code: 'frequencies_mended', detail }];
}

function assumptionsFlag({ assumptions }: Findings): Flag[] {
  if (assumptions.length === 0) return [];
  const what =
    assumptions.length === 1 ? 'One assumption was' : `${assumptions.length} assumptions were`;
  const detail = `${what} made in reading the file: read them in \`assumptions\` and send the file again if one is wrong.`;
  return [{ code: 'assumptions_made', detail }];
}

import type { Assumption } from '../formats/read-types.ts';
import { reflectionMagnitude } from '../sweep.ts';
import type { Analysis } from './analysis.ts';
import type { QualityFlag, Resonance, SwrMinimum } from './summary.ts';

/** Fewer points than this in a resonance's bandwidth leave its shape to guessing. */
const fewestPointsInBandwidth = 5;
const noisyAbove = 0.01;
const totalAbove = 0.98;

/** What the keeper should know of the sweep itself, each with what to do about it. */
export function qualityFlags(
  analysis: Analysis,
  resonances: readonly Resonance[],
  minimum: SwrMinimum | null,
  assumptions: readonly Assumption[],
): readonly QualityFlag[] {
  return [
    ...passivityFlag(analysis),
    ...coarseGridFlags(analysis, resonances),
    ...noiseFlag(analysis),
    ...narrowFlag(minimum),
    ...openOrShortFlag(analysis),
    ...neverNegativeFlag(analysis),
    ...assumptionsFlag(assumptions),
  ];
}

function passivityFlag({ sweep }: Analysis): QualityFlag[] {
  const magnitude = reflectionMagnitude(sweep);
  const points = magnitude.reduce((count, m) => (m > 1 ? count + 1 : count), 0);
  if (points === 0) return [];
  const detail = `${points} of ${magnitude.length} points reflect more than was sent. Repeat the calibration and check the connectors.`;
  return [{ code: 'passivity_broken', detail }];
}

function coarseGridFlags({ sweep }: Analysis, resonances: readonly Resonance[]): QualityFlag[] {
  const { frequencyHz } = sweep;
  const meanStepHz =
    (frequencyHz[frequencyHz.length - 1] - frequencyHz[0]) / (frequencyHz.length - 1);
  return resonances.flatMap((resonance) => {
    if (resonance.q === null || resonance.grazing) return [];
    const points = resonance.frequencyHz / resonance.q / meanStepHz;
    if (points >= fewestPointsInBandwidth) return [];
    const detail = `The resonance at ${(resonance.frequencyHz / 1e6).toFixed(3)} MHz has ${points.toFixed(1)} points in its bandwidth. Sweep again with more points or a narrower span.`;
    return [{ code: 'coarse_grid', detail }];
  });
}

function noiseFlag({ noise }: Analysis): QualityFlag[] {
  if (noise === null || noise <= noisyAbove) return [];
  const detail = `The reflection scatters by ${noise.toPrecision(2)} from point to point. Tighten the connectors, average more, and look for a strong transmitter nearby.`;
  return [{ code: 'noisy', detail }];
}

function narrowFlag(minimum: SwrMinimum | null): QualityFlag[] {
  if (minimum?.atEdge !== true) return [];
  const detail =
    'The lowest SWR is at an end of the sweep, so the true minimum lies outside. Sweep wider on that side.';
  return [{ code: 'sweep_too_narrow', detail }];
}

function openOrShortFlag({ sweep }: Analysis): QualityFlag[] {
  if (!reflectionMagnitude(sweep).every((m) => m > totalAbove)) return [];
  const detail =
    'Nearly everything is reflected at every frequency: this looks like an open or a short. Check that the antenna and its line are connected.';
  return [{ code: 'looks_open_or_short', detail }];
}

function neverNegativeFlag({ sweep }: Analysis): QualityFlag[] {
  if (sweep.phase !== 'signed' || sweep.frequencyHz.length < 5) return [];
  const im = sweep.reflectionIm;
  if (!im.every((x) => x >= 0)) return [];
  let at = 0;
  for (let i = 0; i < im.length; i++) if (im[i] < im[at]) at = i;
  const isInside = at > 0 && at < im.length - 1;
  const swing = Math.min(Math.max(...im.subarray(0, at + 1)), Math.max(...im.subarray(at)));
  if (!isInside || im[at] > 0.05 * swing) return [];
  const detail =
    'The reactance falls to zero and rises again but is never negative: the file may hold its magnitude only. If so, send it again with a mapping that says the sign is unknown.';
  return [{ code: 'reactance_never_negative', detail }];
}

function assumptionsFlag(assumptions: readonly Assumption[]): QualityFlag[] {
  if (assumptions.length === 0) return [];
  const detail = `${assumptions.length} assumptions were made in reading the file; see \`assumptions\`.`;
  return [{ code: 'assumptions_made', detail }];
}

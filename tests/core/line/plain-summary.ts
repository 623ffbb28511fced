import type { Resonance, Summary, SwrMinimum, UsableSpan } from '../../../core/analysis/summary.ts';
import { reflectionMagnitude, type Sweep } from '../../../core/sweep.ts';

/**
 * A summary by the plainest means (linear crossings, best point of the grid), so that tests of what
 * a line does to a summary do not hang on how a summary is made.
 */
export function plainSummary(sweep: Sweep): Summary {
  const { frequencyHz } = sweep;
  const swr = reflectionMagnitude(sweep).map((rho) => (1 + rho) / (1 - rho));
  const best = swr.indexOf(Math.min(...swr));
  const minimum: SwrMinimum = {
    frequencyHz: frequencyHz[best],
    frequencyU95Hz: 100,
    swr: swr[best],
    swrU95: 0.001,
    resistanceOhm: null,
    reactanceOhm: null,
    returnLossDb: null,
    atEdge: best === 0 || best === swr.length - 1,
  };
  return {
    analysisVersion: 'plain',
    plane: 'measured',
    referenceOhm: sweep.referenceOhm,
    phase: sweep.phase,
    span: {
      lowHz: frequencyHz[0],
      highHz: frequencyHz[frequencyHz.length - 1],
      points: frequencyHz.length,
      medianStepHz: null,
    },
    minimumSwr: minimum,
    swrMinima: [minimum],
    resonances: resonances(sweep),
    reactanceMagnitudeMinima: [],
    resonanceOffsetHz: null,
    spans: spans(frequencyHz, swr, 2),
    quality: { flags: [], reflectionNoise: null },
    absent: [],
    assumptions: [],
    cautions: [],
  };
}

function resonances(sweep: Sweep): readonly Resonance[] {
  if (sweep.phase === 'none') return [];
  const { frequencyHz: f, reflectionRe: re, reflectionIm: im } = sweep;
  const found: Resonance[] = [];
  for (let i = 1; i < f.length; i++) {
    if (im[i - 1] > 0 === im[i] > 0) continue;
    const share = im[i - 1] / (im[i - 1] - im[i]);
    const at = re[i - 1] + share * (re[i] - re[i - 1]);
    found.push({
      frequencyHz: f[i - 1] + share * (f[i] - f[i - 1]),
      frequencyU95Hz: 100,
      kind: im[i] > im[i - 1] ? 'series' : 'parallel',
      resistanceOhm: (sweep.referenceOhm * (1 + at)) / (1 - at),
      resistanceU95Ohm: 0.01,
      swr: (1 + Math.abs(at)) / (1 - Math.abs(at)),
      swrU95: 0.001,
      q: 10,
      qU95: null,
      matchedBandwidth: null,
      grazing: false,
    });
  }
  return found;
}

function spans(f: Float64Array, swr: Float64Array, maxSwr: number): readonly UsableSpan[] {
  const inside = Array.from(swr, (value) => value <= maxSwr);
  const first = inside.indexOf(true);
  if (first < 0) return [];
  const last = inside.lastIndexOf(true);
  return [
    {
      maxSwr,
      lowHz: f[first],
      lowU95Hz: first === 0 ? null : 100,
      highHz: f[last],
      highU95Hz: last === f.length - 1 ? null : 100,
      widthHz: f[last] - f[first],
      lowOpen: first === 0,
      highOpen: last === f.length - 1,
    },
  ];
}

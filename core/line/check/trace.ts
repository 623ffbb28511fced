import { attenuationDbPer100M } from '../attenuation.ts';
import type { Cable } from '../cable.ts';
import { DB_PER_NEPER } from '../propagation.ts';
import { inverseTransform } from './fourier.ts';
import type { ReflectometryGrid } from './grid.ts';
import type { Window } from './windows.ts';

/** Reflection against distance. */
export interface ReflectionTrace {
  /** Distance of bin 0 is 0; this much further each, metres. */
  readonly binM: number;
  /** |reflection| of every bin up to the alias-free range; a lone total reflection reads 1. */
  readonly magnitude: Float64Array;
  readonly aliasFreeM: number;
  readonly resolutionM: number;
  readonly window: Window;
  readonly lossCompensated: boolean;
}

/** Zero padding: bins to one resolution at least. It interpolates and adds no resolution. */
const PADDING = 8;

/**
 * Windowed inverse DFT of the reflection, h(d) = sum w G e^(+j 4 pi f d/(c VF))/sum w, zero-padded.
 * With a cable, each bin is raised by the two-way loss to its distance at the middle of the sweep.
 */
export function reflectionTrace(
  grid: ReflectometryGrid,
  window: Window,
  compensateFor: Cable | null,
): ReflectionTrace {
  const { reflectionRe, reflectionIm, frequencyHz } = grid.sweep;
  const points = frequencyHz.length;
  const size = 2 ** Math.ceil(Math.log2(PADDING * points));
  const weights = window.weights(points);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  for (let n = 0; n < points; n++) {
    re[n] = (weights[n] * reflectionRe[n]) / total;
    im[n] = (weights[n] * reflectionIm[n]) / total;
  }
  inverseTransform(re, im);
  const binM = grid.aliasFreeM / size;
  const middleHz = (frequencyHz[0] + frequencyHz[points - 1]) / 2;
  const alpha =
    compensateFor === null
      ? 0
      : attenuationDbPer100M(compensateFor.attenuation, middleHz) / 100 / DB_PER_NEPER;
  const magnitude = re.map(
    (real, m) => Math.sqrt(real * real + im[m] * im[m]) * Math.exp(2 * alpha * m * binM),
  );
  return {
    binM,
    magnitude,
    aliasFreeM: grid.aliasFreeM,
    resolutionM: grid.resolutionM,
    window,
    lossCompensated: compensateFor !== null,
  };
}

import type { ReflectionTrace } from './trace.ts';
import type { Window } from './windows.ts';

/** A place where part of the wave turns back. */
export interface Discontinuity {
  /** From the analyzer; slightly below zero is the analyzer's own connector. */
  readonly distanceM: number;
  /** |reflection| as it arrives, without compensation for the line's loss. */
  readonly magnitude: number;
  /** From noise alone; the velocity factor's share is the caller's. */
  readonly distanceNoiseU95M: number;
}

/** Reflections that a trace shows beyond doubt, strongest first, and what it could not have shown. */
export interface FoundDiscontinuities {
  readonly found: readonly Discontinuity[];
  /** Weaker reflections than this are lost in noise or in the window's sidelobes. */
  readonly floor: number;
  /** Two reflections nearer than this are seen as one, metres. */
  readonly separableM: number;
}

/** Reflections below this are connectors and tolerances everywhere (common practice, no source). */
const LEAST_REFLECTION = 0.01;
/** Lossy lines raise the sidelobes of a window a little: twice the published level is allowed. */
const SIDELOBE_MARGIN = 2;
/** Of Rayleigh-distributed noise 1 bin in 10^7 exceeds this many times its rms. */
const NOISE_MARGIN = 4;
const MOST_FOUND = 32;

/**
 * Local maxima of a trace that noise and the sidelobes of the strongest cannot explain, refined
 * below the bin by a parabola through the logarithms of three bins. The trace must be raw (not
 * compensated for loss) and hold `points` frequencies.
 */
export function findDiscontinuities(trace: ReflectionTrace, points: number): FoundDiscontinuities {
  const { magnitude, window, resolutionM } = trace;
  const separableM = window.widthAtHalf * resolutionM;
  const strongest = magnitude.reduce((most, value) => Math.max(most, value), 0);
  const noise = rmsNoise(magnitude);
  const floor = Math.max(
    LEAST_REFLECTION,
    SIDELOBE_MARGIN * 10 ** (window.sidelobeDb / 20) * strongest,
    NOISE_MARGIN * noise,
  );
  const noiseToDistance = delayNoise(window, points) * resolutionM;
  const found: Discontinuity[] = [];
  const maxima = localMaxima(magnitude, floor).sort((a, b) => magnitude[b] - magnitude[a]);
  for (const bin of maxima) {
    if (found.length === MOST_FOUND) break;
    const refined = refine(trace, bin);
    const near = found.some((other) => apart(other, refined, trace.aliasFreeM) < separableM);
    if (near) continue;
    const distanceNoiseU95M = (noiseToDistance * noise) / refined.magnitude;
    found.push({ ...refined, distanceNoiseU95M });
  }
  return { found, floor, separableM };
}

/**
 * 95 % half-width of a distance, in resolutions, for a noise of 1 and a peak of 1 in the trace: the
 * maximum of |h| moves by sum(w x n)/(2 pi sum(w x^2)) to first order, x the frequency over the span.
 */
function delayNoise(window: Window, points: number): number {
  let sum = 0;
  let squares = 0;
  let moment = 0;
  let noiseMoment = 0;
  for (const [n, weight] of window.weights(points).entries()) {
    const xSq = (n / (points - 1) - 0.5) ** 2;
    sum += weight;
    squares += weight * weight;
    moment += weight * xSq;
    noiseMoment += weight * weight * xSq;
  }
  const pointNoise = sum / Math.sqrt(squares);
  return (2 * pointNoise * Math.sqrt(noiseMoment / 2)) / (2 * Math.PI * moment);
}

/** Rms of the noise in the trace from its median: a Rayleigh median is sqrt(ln 2) of the rms. */
function rmsNoise(magnitude: Float64Array): number {
  return magnitude.toSorted()[magnitude.length >> 1] / Math.sqrt(Math.LN2);
}

function localMaxima(magnitude: Float64Array, floor: number): number[] {
  const size = magnitude.length;
  const bins: number[] = [];
  for (let i = 0; i < size; i++) {
    const value = magnitude[i];
    const before = magnitude[(i + size - 1) % size];
    const after = magnitude[(i + 1) % size];
    if (value >= floor && value > before && value >= after) bins.push(i);
  }
  return bins;
}

function refine(
  trace: ReflectionTrace,
  bin: number,
): { readonly distanceM: number; readonly magnitude: number } {
  const { magnitude, binM, aliasFreeM } = trace;
  const size = magnitude.length;
  const left = Math.log(magnitude[(bin + size - 1) % size]);
  const top = Math.log(magnitude[bin]);
  const right = Math.log(magnitude[(bin + 1) % size]);
  const curvature = left - 2 * top + right;
  const offset = (0.5 * (left - right)) / curvature;
  const distance = (bin + offset) * binM;
  const lobe = trace.window.firstNull * trace.resolutionM;
  return {
    distanceM: distance > aliasFreeM - lobe ? distance - aliasFreeM : distance,
    magnitude: Math.exp(top - 0.25 * (left - right) * offset),
  };
}

/** Distance between two reflections on a trace that closes on itself. */
function apart(
  a: { readonly distanceM: number },
  b: { readonly distanceM: number },
  aliasFreeM: number,
): number {
  const direct = Math.abs(a.distanceM - b.distanceM);
  return Math.min(direct, aliasFreeM - direct);
}

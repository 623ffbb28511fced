import type { ComplexSweep } from '../../sweep.ts';
import { LIGHT_M_PER_S } from '../propagation.ts';

/** The end of a line from the phase of its total reflection. */
export interface EndFit {
  /** Length of the same delay in vacuum, metres. */
  readonly electricalM: number;
  readonly electricalU95M: number;
  /** Root mean square of the phase about the straight line, radians. */
  readonly phaseRms: number;
}

/**
 * Length from the slope of phase against frequency, phi = phi0 - 4 pi f l/c, by least squares after
 * turning back a first estimate of the length (which unwraps the phase). What is left over are
 * ripples of other reflections, one for each turn of the phase, so that a turn counts as one
 * independent point in the half-width.
 */
export function fitEnd(sweep: ComplexSweep, firstElectricalM: number): EndFit {
  const { frequencyHz, reflectionRe, reflectionIm } = sweep;
  const points = frequencyHz.length;
  const turnPerHz = (4 * Math.PI) / LIGHT_M_PER_S;
  const phase = new Float64Array(points);
  let previous = 0;
  for (let i = 0; i < points; i++) {
    const raw =
      Math.atan2(reflectionIm[i], reflectionRe[i]) + turnPerHz * firstElectricalM * frequencyHz[i];
    phase[i] = raw - 2 * Math.PI * Math.round((raw - previous) / (2 * Math.PI));
    previous = phase[i];
  }
  const spanHz = frequencyHz[points - 1] - frequencyHz[0];
  const { slope, rms } = straightLine(frequencyHz, phase);
  const electricalM = firstElectricalM - slope / turnPerHz;
  const turns = Math.max(2, (electricalM * spanHz * 2) / LIGHT_M_PER_S);
  const slopeU95 = (2 * rms * Math.sqrt(12 / Math.min(points, turns))) / spanHz;
  return { electricalM, electricalU95M: slopeU95 / turnPerHz, phaseRms: rms };
}

function straightLine(
  x: Float64Array,
  y: Float64Array,
): { readonly slope: number; readonly rms: number } {
  const n = x.length;
  const meanX = x.reduce((sum, value) => sum + value, 0) / n;
  const meanY = y.reduce((sum, value) => sum + value, 0) / n;
  let xx = 0;
  let xy = 0;
  for (let i = 0; i < n; i++) {
    xx += (x[i] - meanX) ** 2;
    xy += (x[i] - meanX) * (y[i] - meanY);
  }
  const slope = xy / xx;
  let left = 0;
  for (let i = 0; i < n; i++) left += (y[i] - meanY - slope * (x[i] - meanX)) ** 2;
  return { slope, rms: Math.sqrt(left / n) };
}

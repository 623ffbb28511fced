import type { ComplexSweep } from '../../sweep.ts';
import { attenuationDbPer100M } from '../attenuation.ts';
import type { Cable } from '../cable.ts';
import { DB_PER_NEPER } from '../propagation.ts';

/** One-way matched loss of a line whose far end reflects all. */
export interface EndLoss {
  readonly frequencyHz: Float64Array;
  /** Half of the return loss at each frequency, with the ripples of other reflections. */
  readonly lossDb: Float64Array;
  /** Its smooth part, k1 sqrt(f) + k2 f. */
  readonly smoothLossDb: Float64Array;
  /** Half-width of one point of `lossDb` about the smooth loss. */
  readonly pointU95Db: number;
  /** Half-width of the smooth loss. */
  readonly smoothU95Db: number;
  /** What the cable's data say of this length; null without a cable. */
  readonly expectedLossDb: Float64Array | null;
  /** Measured over expected loss, and its half-width from the ripples; null without a cable. */
  readonly ratio: number | null;
  readonly ratioU95: number | null;
}

/**
 * Loss from |reflection| of an open or short: return loss / 2. `turns` is the number of turns of
 * the phase over the sweep: ripples repeat with it, so it is the number of independent points.
 */
export function endLoss(
  sweep: ComplexSweep,
  turns: number,
  cable: Cable | null,
  lengthM: number,
): EndLoss {
  const { frequencyHz, reflectionRe: re, reflectionIm: im } = sweep;
  const lossDb = re.map(
    (real, i) => (-DB_PER_NEPER / 4) * Math.log(Math.max(1e-12, real * real + im[i] * im[i])),
  );
  const smoothLossDb = smoothed(frequencyHz, lossDb);
  const rms = Math.sqrt(
    lossDb.reduce((sum, value, i) => sum + (value - smoothLossDb[i]) ** 2, 0) / lossDb.length,
  );
  const independent = Math.max(2, Math.min(turns, lossDb.length));
  const smoothU95Db = (2 * rms) / Math.sqrt(independent);
  const measured = { frequencyHz, lossDb, smoothLossDb, pointU95Db: 2 * rms, smoothU95Db };
  if (cable === null) return { ...measured, expectedLossDb: null, ratio: null, ratioU95: null };
  const expectedLossDb = frequencyHz.map(
    (f) => (attenuationDbPer100M(cable.attenuation, f) * lengthM) / 100,
  );
  const expectedSq = expectedLossDb.reduce((sum, value) => sum + value * value, 0);
  const product = expectedLossDb.reduce((sum, value, i) => sum + value * lossDb[i], 0);
  const expectedRms = Math.sqrt(expectedSq / lossDb.length);
  return {
    ...measured,
    expectedLossDb,
    ratio: product / expectedSq,
    ratioU95: smoothU95Db / expectedRms,
  };
}

/** Least squares of k1 sqrt(f) + k2 f; of one of the two where the other comes out below zero. */
function smoothed(frequencyHz: Float64Array, lossDb: Float64Array): Float64Array {
  const top = frequencyHz[frequencyHz.length - 1];
  let rr = 0;
  let rl = 0;
  let ll = 0;
  let ry = 0;
  let ly = 0;
  for (let i = 0; i < lossDb.length; i++) {
    const linear = frequencyHz[i] / top;
    const root = Math.sqrt(linear);
    rr += linear;
    rl += root * linear;
    ll += linear * linear;
    ry += root * lossDb[i];
    ly += linear * lossDb[i];
  }
  const determinant = rr * ll - rl * rl;
  let k1 = (ry * ll - ly * rl) / determinant;
  let k2 = (ly * rr - ry * rl) / determinant;
  if (k2 < 0) [k1, k2] = [Math.max(0, ry / rr), 0];
  else if (k1 < 0) [k1, k2] = [0, ly / ll];
  return frequencyHz.map((f) => k1 * Math.sqrt(f / top) + (k2 * f) / top);
}

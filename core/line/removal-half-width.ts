import { ok, type Result } from '../result.ts';
import { type ComplexSweep, reflectionMagnitude, type Sweep } from '../sweep.ts';
import type { FeedLine } from './feed-line.ts';
import { type LineError, toFeedPoint } from './line.ts';
import { lineVariants } from './variants.ts';

/** A reflection moved to the feed point with 95 % half-widths of every point. */
export interface Removal {
  readonly sweep: ComplexSweep;
  /** Of the complex reflection, as a radius. */
  readonly reflectionU95: Float64Array;
  /** Of its magnitude. */
  readonly magnitudeU95: Float64Array;
  /** How much a small error of the measured reflection grows on the way. */
  readonly magnification: Float64Array;
}

/**
 * Removes the line and propagates what is uncertain: the measured reflection (`measuredU95`, a
 * radius) by the derivative of the removal, each quantity of the line by moving it to both ends of
 * its interval; combined as a root sum of squares.
 */
export function removeLine(
  measured: Sweep,
  line: FeedLine,
  measuredU95: number,
): Result<Removal, LineError> {
  const points = measured.frequencyHz.length;
  const magnification = new Float64Array(points);
  const moved = toFeedPoint(measured, line, magnification);
  if (!moved.ok) return moved;
  const reflectionU95 = magnification.map((growth) => (growth * measuredU95) ** 2);
  const magnitudeU95 = reflectionU95.slice();
  for (const { plus, minus } of lineVariants(line)) {
    const upper = toFeedPoint(measured, plus);
    if (!upper.ok) return upper;
    const lower = toFeedPoint(measured, minus);
    if (!lower.ok) return lower;
    addSquares(upper.value, lower.value, reflectionU95, magnitudeU95);
  }
  for (let i = 0; i < points; i++) {
    reflectionU95[i] = Math.sqrt(reflectionU95[i]);
    magnitudeU95[i] = Math.sqrt(magnitudeU95[i]);
  }
  return ok({ sweep: moved.value, reflectionU95, magnitudeU95, magnification });
}

function addSquares(
  upper: ComplexSweep,
  lower: ComplexSweep,
  reflectionSq: Float64Array,
  magnitudeSq: Float64Array,
): void {
  const upperSize = reflectionMagnitude(upper);
  const lowerSize = reflectionMagnitude(lower);
  for (let i = 0; i < reflectionSq.length; i++) {
    const re = upper.reflectionRe[i] - lower.reflectionRe[i];
    const im = upper.reflectionIm[i] - lower.reflectionIm[i];
    reflectionSq[i] += (re * re + im * im) / 4;
    magnitudeSq[i] += (upperSize[i] - lowerSize[i]) ** 2 / 4;
  }
}

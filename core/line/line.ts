import { fail, ok, type Result } from '../result.ts';
import type { ComplexSweep, Sweep } from '../sweep.ts';
import { attenuationDbPer100M } from './attenuation.ts';
import type { FeedLine, LineSection } from './feed-line.ts';
import { DB_PER_NEPER, propagation } from './propagation.ts';

export type LineErrorCode = 'phase_needed' | 'line_loss_too_great' | 'line_removal_not_finite';

export interface LineError {
  readonly code: LineErrorCode;
  readonly detail: string;
}

/** Beyond this matched loss nothing of the antenna comes back to any analyzer, dB. */
const GREATEST_LOSS_DB = 60;

/** Loss of the line with every section ended in its own impedance, dB. */
export function matchedLossDb(line: FeedLine, frequencyHz: number): number {
  let loss = 0;
  for (const section of line.sections) loss += sectionLossDb(section, frequencyHz);
  return loss;
}

/** Matched loss of one section with its connectors, dB. */
export function sectionLossDb(section: LineSection, frequencyHz: number): number {
  const { cable, lengthM, extraLossDb } = section;
  return (attenuationDbPer100M(cable.attenuation, frequencyHz) * lengthM) / 100 + extraLossDb;
}

/** Length of the line in wavelengths on the line. */
export function electricalLength(line: FeedLine, frequencyHz: number): number {
  let wavelengths = 0;
  for (const { cable, lengthM } of line.sections) {
    wavelengths += (propagation(cable, frequencyHz).beta * lengthM) / (2 * Math.PI);
  }
  return wavelengths;
}

/** The reflection where the analyzer is, from that at the feed point; same real reference. */
export function fromFeedPoint(sweep: Sweep, line: FeedLine): Result<ComplexSweep, LineError> {
  return shifted(sweep, line, -1, null);
}

/**
 * The reflection at the feed point, from that where the analyzer is: the exact inverse of
 * `fromFeedPoint`. A reflection above 1 in the answer contradicts the stated loss; see
 * `judgeRemoval`. `magnification`, if given, receives |d feed point / d measured| of every point.
 */
export function toFeedPoint(
  sweep: Sweep,
  line: FeedLine,
  magnification: Float64Array | null = null,
): Result<ComplexSweep, LineError> {
  return shifted(sweep, line, 1, magnification);
}

function shifted(
  sweep: Sweep,
  line: FeedLine,
  sign: 1 | -1,
  magnification: Float64Array | null,
): Result<ComplexSweep, LineError> {
  if (sweep.phase !== 'signed') {
    return fail({
      code: 'phase_needed',
      detail:
        'A line can be added or removed only where the full complex reflection was measured; this sweep lacks the sign of its reactance.',
    });
  }
  const { frequencyHz, referenceOhm } = sweep;
  const loss = matchedLossDb(line, frequencyHz[frequencyHz.length - 1]);
  if (loss > GREATEST_LOSS_DB) {
    return fail({
      code: 'line_loss_too_great',
      detail: `The stated line loses ${loss.toFixed(0)} dB one way; above ${GREATEST_LOSS_DB} dB nothing of the antenna comes back.`,
    });
  }
  const re = sweep.reflectionRe.slice();
  const im = sweep.reflectionIm.slice();
  magnification?.fill(1);
  const order = sign === 1 ? line.sections : line.sections.toReversed();
  for (const section of order) {
    shiftThrough(section, sign, frequencyHz, referenceOhm, re, im, magnification);
  }
  if (!(re.every(Number.isFinite) && im.every(Number.isFinite))) {
    return fail({
      code: 'line_removal_not_finite',
      detail: 'The stated line and this reflection together have no finite answer.',
    });
  }
  return ok({ phase: 'signed', frequencyHz, referenceOhm, reflectionRe: re, reflectionIm: im });
}

/**
 * In place: to the section's own complex impedance by (G + k)/(1 + k G), k = (R - Zc)/(R + Zc),
 * along it by e^(+-2 gamma l) (D. M. Pozar, Microwave Engineering, sec. 2.3 and 2.7), and back. The
 * extra loss acts on the wave like a matched attenuator, wherever in the section it sits.
 */
function shiftThrough(
  section: LineSection,
  sign: 1 | -1,
  frequencyHz: Float64Array,
  referenceOhm: number,
  re: Float64Array,
  im: Float64Array,
  magnification: Float64Array | null,
): void {
  const { cable, lengthM, extraLossDb } = section;
  const extra = extraLossDb / DB_PER_NEPER;
  for (let i = 0; i < frequencyHz.length; i++) {
    const { alpha, beta, characteristic } = propagation(cable, frequencyHz[i]);
    const sumRe = referenceOhm + characteristic.re;
    const difRe = referenceOhm - characteristic.re;
    const ci = characteristic.im;
    const sumSq = sumRe * sumRe + ci * ci;
    const kr = (difRe * sumRe - ci * ci) / sumSq;
    const ki = (-ci * sumRe - difRe * ci) / sumSq;

    const inRe = 1 + kr * re[i] - ki * im[i];
    const inIm = kr * im[i] + ki * re[i];
    const inSq = inRe * inRe + inIm * inIm;
    const upRe = re[i] + kr;
    const upIm = im[i] + ki;
    const sRe = (upRe * inRe + upIm * inIm) / inSq;
    const sIm = (upIm * inRe - upRe * inIm) / inSq;

    const size = Math.exp(sign * 2 * (alpha * lengthM + extra));
    const angle = sign * 2 * beta * lengthM;
    const wr = size * Math.cos(angle);
    const wi = size * Math.sin(angle);
    const tRe = sRe * wr - sIm * wi;
    const tIm = sRe * wi + sIm * wr;

    const outRe = 1 - kr * tRe + ki * tIm;
    const outIm = -kr * tIm - ki * tRe;
    const outSq = outRe * outRe + outIm * outIm;
    const downRe = tRe - kr;
    const downIm = tIm - ki;
    re[i] = (downRe * outRe + downIm * outIm) / outSq;
    im[i] = (downIm * outRe - downRe * outIm) / outSq;
    if (magnification !== null) {
      // |1 - k^2|^2 of both changes of reference, which share k
      const oneLessRe = 1 - (kr * kr - ki * ki);
      const oneLessIm = -2 * kr * ki;
      const both = oneLessRe * oneLessRe + oneLessIm * oneLessIm;
      magnification[i] *= (size * both) / (inSq * outSq);
    }
  }
}

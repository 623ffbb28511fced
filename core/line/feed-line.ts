import type { Assumption } from '../formats/read-types.ts';
import { fail, ok, type Result } from '../result.ts';
import type { Cable } from './cable.ts';

/** One section as a record states it, from the analyzer's end to the antenna. Null is unknown. */
export interface FeedLineSection {
  readonly cable: string;
  readonly lengthM: number | null;
  readonly lengthU95M: number | null;
  /** Loss of connectors and the like when matched, dB, beside the cable's own. */
  readonly extraLossDb: number;
  readonly choke: boolean;
}

/** A section of which all is known that a calculation needs. */
export interface LineSection {
  readonly cable: Cable;
  readonly lengthM: number;
  readonly lengthU95M: number;
  readonly extraLossDb: number;
}

/** A feed line in order from the analyzer to the antenna; no section: nothing lies between. */
export interface FeedLine {
  readonly sections: readonly LineSection[];
  readonly assumptions: readonly Assumption[];
}

export type FeedLineErrorCode =
  | 'line_unknown'
  | 'line_length_unknown'
  | 'line_length_invalid'
  | 'line_loss_invalid'
  | 'cable_unknown';

export interface FeedLineError {
  readonly code: FeedLineErrorCode;
  readonly detail: string;
  /** Zero-based section at fault. */
  readonly section?: number;
}

/** Half-width of a length that was stated without one, as a fraction (common practice, no source). */
const LENGTH_SPREAD = 0.05;

/**
 * Joins the stated sections with their cables. `null` is a line nobody described; it and a section
 * without a length are errors, because then nothing can be said but at the measured plane.
 */
export function resolveFeedLine(
  stated: readonly FeedLineSection[] | null,
  cableOf: (id: string) => Cable | null,
): Result<FeedLine, FeedLineError> {
  if (stated === null) {
    return fail({
      code: 'line_unknown',
      detail: 'Whether a feed line lies between analyzer and antenna was not stated.',
    });
  }
  const sections: LineSection[] = [];
  const assumptions: Assumption[] = [];
  for (const [index, section] of stated.entries()) {
    const resolved = resolveSection(section, index, cableOf, assumptions);
    if (!resolved.ok) return resolved;
    sections.push(resolved.value);
  }
  return ok({ sections, assumptions });
}

function resolveSection(
  stated: FeedLineSection,
  index: number,
  cableOf: (id: string) => Cable | null,
  assumptions: Assumption[],
): Result<LineSection, FeedLineError> {
  const place = `Section ${index + 1} of the feed line`;
  const { lengthM, lengthU95M, extraLossDb } = stated;
  if (lengthM === null) {
    return fail({
      code: 'line_length_unknown',
      detail: `${place} has no stated length.`,
      section: index,
    });
  }
  if (!(lengthM >= 0 && Number.isFinite(lengthM)) || (lengthU95M !== null && !(lengthU95M >= 0))) {
    return fail({
      code: 'line_length_invalid',
      detail: `${place} needs a length and half-width of zero or more metres.`,
      section: index,
    });
  }
  if (!(extraLossDb >= 0 && Number.isFinite(extraLossDb))) {
    return fail({
      code: 'line_loss_invalid',
      detail: `${place} needs an extra loss of zero or more dB.`,
      section: index,
    });
  }
  const cable = cableOf(stated.cable);
  if (cable === null) {
    return fail({
      code: 'cable_unknown',
      detail: `${place} names the cable "${stated.cable}", which is not on the list.`,
      section: index,
    });
  }
  if (lengthU95M === null) {
    assumptions.push({
      code: 'line_length_half_width_assumed',
      detail: `${place} states no half-width of its length; 5 % is assumed.`,
    });
  }
  if (stated.choke) {
    assumptions.push({
      code: 'choke_transparent',
      detail: `${place} holds a choke; it is taken to leave the wave inside the line alone.`,
    });
  }
  return ok({ cable, lengthM, lengthU95M: lengthU95M ?? LENGTH_SPREAD * lengthM, extraLossDb });
}

/** What is assumed of the loss of a line's cables outside the frequencies of their data. */
export function extrapolatedLoss(
  line: FeedLine,
  lowHz: number,
  highHz: number,
): readonly Assumption[] {
  const cables = new Set(line.sections.map((section) => section.cable));
  return [...cables]
    .filter(({ attenuation }) => lowHz < attenuation.lowHz || highHz > attenuation.highHz)
    .map(({ name, attenuation }) => ({
      code: 'cable_loss_extrapolated',
      detail: `Loss of ${name} is known from ${attenuation.lowHz / 1e6} to ${attenuation.highHz / 1e6} MHz; beyond, the law k1 sqrt(f) + k2 f is followed.`,
    }));
}

import { ok, type Result } from '../../result.ts';
import { makeSweep } from '../../sweep.ts';
import type { ReadError, ReadLimits, ReadSweep } from '../read-types.ts';
import { toleratedAssumptions } from './data-line.ts';
import { refuse } from './faults.ts';
import { normalisationOf } from './normalisation.ts';
import { pointsOfVersion1 } from './points-v1.ts';
import { pointsOfVersion2 } from './points-v2.ts';
import { choosePort, type PortHints } from './port-choice.ts';
import { readReflections } from './reflections.ts';
import { readSections } from './sections.ts';
import { suspicions } from './suspicions.ts';

export interface TouchstoneOptions extends PortHints {
  /** Whether version 1 immittances are divided by the reference, as the format says; default true. */
  readonly immittanceNormalised?: boolean;
  /** An option line for a file that lacks one. */
  readonly optionLine?: string;
  readonly limits: Pick<ReadLimits, 'maxPoints'>;
}

/**
 * Reads a Touchstone file of version 1, 2.0 or 2.1 with one or two ports. Tolerant: every liberty is
 * an assumption in the answer; what would be a guess is refused with line, column and remedy.
 */
export function readTouchstone(
  text: string,
  options: TouchstoneOptions,
): Result<ReadSweep, ReadError> {
  const { limits, optionLine, immittanceNormalised = true } = options;
  const sections = readSections(text, optionLine);
  if (!sections.ok) return sections;
  const { keywords, network, scanner, option } = sections.value;
  const points =
    keywords === null
      ? pointsOfVersion1(scanner, network)
      : pointsOfVersion2(scanner, network, keywords);
  if (!points.ok) return points;
  const { count, layout } = points.value;
  if (count > limits.maxPoints) {
    const detail = `The file has ${count} points; at most ${limits.maxPoints} are read.`;
    return refuse('too_many_points', detail, 'Sweep with fewer points.');
  }
  const choice = choosePort(points.value, sections.value, options);
  if (!choice.ok) return choice;
  const { port } = choice.value;
  const normalisation = normalisationOf(points.value, sections.value, port, immittanceNormalised);
  if (!normalisation.ok) return normalisation;
  const read = readReflections(sections.value, points.value, normalisation.value);
  if (!read.ok) return read;
  const { reference1, reference2 } = normalisation.value;
  const { frequencyHz, reflectionRe, reflectionIm } = read.value.reflections;
  const referenceOhm = port === 1 ? reference1 : reference2;
  const sweep = makeSweep({
    phase: 'signed',
    frequencyHz,
    reflectionRe,
    reflectionIm,
    referenceOhm,
  });
  if (!sweep.ok) return refuse(sweep.error.code, sweep.error.detail, 'Export the file again.');
  return ok({
    sweep: sweep.value,
    format: keywords === null ? 'touchstone-1' : 'touchstone-2',
    assumptions: [
      ...sections.value.assumptions,
      ...points.value.assumptions,
      ...choice.value.assumptions,
      ...toleratedAssumptions(sections.value.tolerated),
      ...read.value.assumptions,
      ...suspicions(read.value.reflections, option, normalisation.value),
    ],
    ...(layout.ports === 2 ? { port } : {}),
  });
}

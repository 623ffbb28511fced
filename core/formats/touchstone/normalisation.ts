import { ok, type Result } from '../../result.ts';
import type { ReadError } from '../read-types.ts';
import { refuse } from './faults.ts';
import type { Points } from './points.ts';
import type { Normalisation } from './port-reflection.ts';
import type { Sections } from './sections.ts';

/**
 * References of the ports, and whether immittances are divided by them. Errors: `references_differ`,
 * `parameters_incomplete` where the file's entries do not say what the reflection is.
 */
export function normalisationOf(
  points: Points,
  { keywords, option }: Sections,
  port: 1 | 2,
  immittanceNormalised: boolean,
): Result<Normalisation, ReadError> {
  const given = keywords?.referenceOhm ?? option.referenceOhm;
  const line = points.line[0];
  if (given.length !== 1 && given.length !== points.layout.ports) {
    const detail = `The file gives ${given.length} references for ${points.layout.ports} ports.`;
    return refuse('references_differ', detail, 'Give one reference, or one for each port.', {
      line,
    });
  }
  if (keywords !== null && option.referenceOhm.length > 1) {
    const detail = 'The option line of a version 2 file gives references of several ports.';
    return refuse('references_differ', detail, 'Give them by `[Reference]`.', { line });
  }
  const [reference1, reference2 = reference1] = given;
  const isNormalised = keywords === null && immittanceNormalised;
  if (option.parameter !== 'S' && isNormalised && reference1 !== reference2) {
    const detail = 'Immittances normalised to unequal references are not defined by the format.';
    return refuse('references_differ', detail, 'Export S-parameters.', { line });
  }
  const isHybrid = option.parameter === 'H' || option.parameter === 'G';
  if (points.layout.ports === 1 && isHybrid) {
    const detail = `${option.parameter}-parameters take two ports, and the file has one.`;
    return refuse('parameters_incomplete', detail, 'Export S-parameters.', { line });
  }
  if (points.layout.ports === 2 && points.layout.at22 === null && option.parameter !== 'S') {
    const detail = `The file holds two of four ${option.parameter}-parameters; the reflection takes all.`;
    return refuse('parameters_incomplete', detail, 'Export S-parameters.', { line });
  }
  return ok({ port, reference1, reference2, isNormalised });
}

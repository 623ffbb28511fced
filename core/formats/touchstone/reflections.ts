import { ok, type Result } from '../../result.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { inOrder } from './ascending.ts';
import { refuse } from './faults.ts';
import type { PointLayout, Points } from './points.ts';
import { type Normalisation, reflectionAt } from './port-reflection.ts';
import type { Sections } from './sections.ts';

/** Points of one port, each with its line in the file. */
export interface Reflections {
  readonly frequencyHz: Float64Array;
  readonly reflectionRe: Float64Array;
  readonly reflectionIm: Float64Array;
  readonly line: Int32Array;
}

export interface ReadReflections {
  readonly reflections: Reflections;
  readonly assumptions: readonly Assumption[];
}

/**
 * The reflections at the asked port in ascending frequency. Points that are no finite numbers are
 * left out. Errors: `sweep_frequency_negative`, `no_points` and those of `inOrder`.
 */
export function readReflections(
  sections: Sections,
  points: Points,
  normalisation: Normalisation,
): Result<ReadReflections, ReadError> {
  const all = allReflections(sections, points, normalisation);
  for (let i = 0; i < all.line.length; i++) {
    if (!(all.frequencyHz[i] < 0)) continue;
    const line = all.line[i];
    const detail = `Line ${line} has the negative frequency ${all.frequencyHz[i]} Hz.`;
    return refuse('sweep_frequency_negative', detail, 'Correct the frequency.', { line });
  }
  const finite = finiteOnly(all);
  if (finite.frequencyHz.length === 0) {
    const detail = 'No point of the file is a finite number.';
    return refuse('no_points', detail, 'Export the file again.', { line: points.line[0] });
  }
  const ordered = inOrder(finite, sections.keywords === null && points.layout.ports === 2);
  if (!ordered.ok) return ordered;
  const assumptions = [
    ...leftOut(points.count - finite.frequencyHz.length),
    ...folded(sections, points, normalisation),
    ...zeroFrequency(ordered.value.reflections),
    ...ordered.value.assumptions,
  ];
  return ok({ reflections: ordered.value.reflections, assumptions });
}

/** Offset of the pair that is the reflection at the port. */
function pairOf({ at11, at22 }: PointLayout, port: 1 | 2): number {
  return port === 1 ? at11 : (at22 ?? at11);
}

function allReflections(
  { network: { values }, option }: Sections,
  points: Points,
  normalisation: Normalisation,
): Reflections {
  const { count, start, layout } = points;
  const frequencyHz = new Float64Array(count);
  const reflectionRe = new Float64Array(count);
  const reflectionIm = new Float64Array(count);
  const pair = pairOf(layout, normalisation.port);
  const isPlain = option.parameter === 'S' && option.format === 'RI';
  for (let i = 0; i < count; i++) {
    const at = start[i];
    frequencyHz[i] = values[at];
    if (isPlain) {
      reflectionRe[i] = values[at + pair];
      reflectionIm[i] = values[at + pair + 1];
    } else {
      const [re, im] = reflectionAt(values, at, layout, option, normalisation);
      reflectionRe[i] = re;
      reflectionIm[i] = im;
    }
  }
  return { frequencyHz, reflectionRe, reflectionIm, line: points.line.subarray(0, count) };
}

function finiteOnly(all: Reflections): Reflections {
  let whole = 0;
  while (whole < all.line.length && isPoint(all, whole)) whole += 1;
  if (whole === all.line.length) return all;
  const keep = (_: number, i: number) => isPoint(all, i);
  return {
    frequencyHz: all.frequencyHz.filter(keep),
    reflectionRe: all.reflectionRe.filter(keep),
    reflectionIm: all.reflectionIm.filter(keep),
    line: all.line.filter(keep),
  };
}

function isPoint({ frequencyHz, reflectionRe, reflectionIm }: Reflections, i: number): boolean {
  return (
    Number.isFinite(frequencyHz[i]) &&
    Number.isFinite(reflectionRe[i]) &&
    Number.isFinite(reflectionIm[i])
  );
}

function leftOut(count: number): Assumption[] {
  if (count === 0) return [];
  const detail = `${count} points were left out because they are not finite numbers; there the antenna counts as not swept.`;
  return [{ code: 'points_left_out', detail }];
}

function folded(
  { network: { values }, option }: Sections,
  points: Points,
  { port }: Normalisation,
): Assumption[] {
  if (option.format !== 'MA') return [];
  const pair = pairOf(points.layout, port);
  for (let i = 0; i < points.count; i++) {
    if (!(values[points.start[i] + pair] < 0)) continue;
    const detail = 'Negative magnitudes were read as positive ones turned by 180 degrees.';
    return [{ code: 'magnitude_negative', detail, line: points.line[i] }];
  }
  return [];
}

function zeroFrequency({ frequencyHz, line }: Reflections): Assumption[] {
  if (frequencyHz[0] !== 0) return [];
  const detail = 'The point at 0 Hz was kept; nothing is said of wavelengths there.';
  return [{ code: 'zero_frequency', detail, line: line[0] }];
}

import type { Sweep } from '../../sweep.ts';
import { sweepJsonSchema } from './schema.ts';

/**
 * Writes a sweep as the JSON sweep of `sweepJsonSchema`, in one line. Numbers are the shortest that
 * read back bit for bit, a negative zero included.
 */
export function writeSweepJson(sweep: Sweep, { note }: { readonly note?: string } = {}): string {
  const { format, version } = sweepJsonSchema.properties;
  const fields: [name: string, json: string][] = [
    ['format', JSON.stringify(format.const)],
    ['version', JSON.stringify(version.const)],
    ...(note === undefined ? [] : [['note', JSON.stringify(note)] as [string, string]]),
    ['reference_ohm', String(sweep.referenceOhm)],
    ['phase', JSON.stringify(sweep.phase)],
    ['frequency_hz', numbersText(sweep.frequencyHz)],
  ];
  if (sweep.phase === 'none') {
    fields.push(['reflection_magnitude', numbersText(sweep.reflectionMagnitude)]);
  } else {
    fields.push(['reflection_re', numbersText(sweep.reflectionRe)]);
    fields.push(['reflection_im', numbersText(sweep.reflectionIm)]);
  }
  return `{${fields.map(([name, json]) => `"${name}":${json}`).join(',')}}\n`;
}

function numbersText(values: Float64Array): string {
  return `[${Array.from(values, (value) => (Object.is(value, -0) ? '-0' : String(value))).join(',')}]`;
}

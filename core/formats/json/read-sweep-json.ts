import { ok, type Result } from '../../result.ts';
import { makeSweep, type PhaseKnowledge, type Sweep } from '../../sweep.ts';
import { converterOf } from '../delimited/to-reflection.ts';
import type { ReadError, ReadLimits, ReadSweep } from '../read-types.ts';
import { pointerOf, refuseAt } from './json-fault.ts';
import { parseJson } from './parse-json.ts';
import { jsonContents, sweepJsonSchema } from './schema.ts';

type Fields = Readonly<Record<string, unknown>>;
type Content = (typeof jsonContents)[number];

const knownFields = Object.keys(sweepJsonSchema.properties);
const longestNote = 2000;
const seeSchema = 'See the schema of the JSON sweep.';

/**
 * Reads the JSON sweep that `sweepJsonSchema` describes. Strict: unknown or repeated fields, gaps,
 * unequal lengths and frequencies that do not ascend are refused, with a JSON pointer in the detail.
 */
export function readSweepJson(
  text: string,
  limits: Pick<ReadLimits, 'maxPoints'>,
): Result<ReadSweep, ReadError> {
  const parsed = parseJson(text);
  if (!parsed.ok) return parsed;
  const fields = fieldsOf(parsed.value, text);
  if (!fields.ok) return fields;
  const reference = referenceOf(fields.value);
  if (!reference.ok) return reference;
  const content = contentOf(fields.value);
  if (!content.ok) return content;
  const phase = phaseOf(fields.value, content.value);
  if (!phase.ok) return phase;
  const columns = columnsOf(fields.value, content.value, phase.value, limits.maxPoints);
  if (!columns.ok) return columns;
  const candidate = sweepFrom(columns.value, content.value, phase.value, reference.value);
  const sweep = makeSweep(candidate);
  if (sweep.ok) return ok({ sweep: sweep.value, format: 'json', assumptions: [] });
  const { code, detail, index } = sweep.error;
  const pointer = `/${code.includes('frequency') || code.includes('ascending') ? 'frequency_hz' : content.value.fields[0]}${index === undefined ? '' : `/${index}`}`;
  return refuseAt(pointer, code, `is not as it must be. ${detail}`, seeSchema);
}

function fieldsOf(value: unknown, text: string): Result<Fields, ReadError> {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    return refuseAt('', 'json_not_a_sweep', 'is not an object.', seeSchema);
  }
  const fields: Fields = Object.fromEntries(Object.entries(value));
  const { format, version } = sweepJsonSchema.properties;
  if (fields['format'] !== format.const) {
    return refuseAt('/format', 'json_not_a_sweep', `is not "${format.const}".`, seeSchema);
  }
  if (fields['version'] !== version.const) {
    return refuseAt('/version', 'json_version', 'is not 1.', 'Write the sweep as version 1.');
  }
  const unknown = Object.keys(fields).find((key) => !knownFields.includes(key));
  if (unknown !== undefined) {
    const remedy = `Remove it; the fields are ${knownFields.join(', ')}.`;
    return refuseAt(pointerOf(unknown), 'json_field_unknown', 'is not a field of a sweep.', remedy);
  }
  const twice = knownFields.find((key) => timesWritten(text, key) > 1);
  if (twice !== undefined) {
    return refuseAt(pointerOf(twice), 'json_field_twice', 'stands twice.', 'Write it once.');
  }
  const { note } = fields;
  if (note !== undefined && (typeof note !== 'string' || note.length > longestNote)) {
    const found = `is not a text of at most ${longestNote} characters.`;
    return refuseAt('/note', 'json_field_type', found, 'Shorten or remove it.');
  }
  return ok(fields);
}

/** A parser keeps the last of two equal keys. Inside a text the closing quote would be escaped. */
function timesWritten(text: string, key: string): number {
  const quoted = `"${key}"`;
  let times = 0;
  for (let at = text.indexOf(quoted); at >= 0; at = text.indexOf(quoted, at + 1)) {
    if (/^[ \t\r\n]*:/.test(text.slice(at + quoted.length, at + quoted.length + 20))) times += 1;
  }
  return times;
}

function referenceOf({ reference_ohm: ohms }: Fields): Result<number, ReadError> {
  if (typeof ohms === 'number' && ohms > 0 && Number.isFinite(ohms)) return ok(ohms);
  const found = ohms === undefined ? 'is missing.' : 'is not a positive number.';
  const remedy = 'Give the resistance, in ohm, against which the reflection or SWR holds.';
  return refuseAt('/reference_ohm', 'json_field_type', found, remedy);
}

function contentOf(fields: Fields): Result<Content, ReadError> {
  const has = (field: string) => fields[field] !== undefined;
  const present = jsonContents.filter((content) => content.fields.some(has));
  const wanted = jsonContents.map((content) => content.fields.join(' with ')).join(', or ');
  const [content] = present;
  if (content === undefined || present.length > 1) {
    const found = `has ${content === undefined ? 'none' : 'more than one'} of: ${wanted}.`;
    return refuseAt('', 'json_content', found, 'Give exactly one of them.');
  }
  const missing = content.fields.find((field) => !has(field));
  if (missing === undefined) return ok(content);
  return refuseAt(`/${missing}`, 'json_field_missing', 'is missing.', 'Give both of the pair.');
}

function phaseOf({ phase }: Fields, { phases }: Content): Result<PhaseKnowledge, ReadError> {
  if (phase === undefined) return ok(phases[0]);
  const known = phases.find((one) => one === phase);
  if (known !== undefined) return ok(known);
  const found = `is not ${phases.map((one) => `"${one}"`).join(' or ')}, which these fields allow.`;
  return refuseAt('/phase', 'json_phase', found, 'Correct it, or leave it out.');
}

function columnsOf(
  fields: Fields,
  content: Content,
  phase: PhaseKnowledge,
  maxPoints: number,
): Result<readonly Float64Array[], ReadError> {
  const names = ['frequency_hz', ...content.fields];
  const columns: Float64Array[] = [];
  for (const name of names) {
    const lowest = lowestOf(name, phase);
    const column = columnOf(fields[name], name, lowest, maxPoints);
    if (!column.ok) return column;
    if (columns.length > 0 && column.value.length !== columns[0].length) {
      const found = `has ${column.value.length} numbers, frequency_hz has ${columns[0].length}.`;
      return refuseAt(`/${name}`, 'json_lengths', found, 'Give one for each frequency.');
    }
    columns.push(column.value);
  }
  return ok(columns);
}

function lowestOf(name: string, phase: PhaseKnowledge): number {
  if (name === 'swr') return 1;
  const isMagnitude = name === 'reactance_ohm' || name === 'reflection_im';
  const isBounded = name === 'frequency_hz' || name === 'reflection_magnitude';
  return isBounded || (isMagnitude && phase === 'unsigned') ? 0 : Number.NEGATIVE_INFINITY;
}

function columnOf(
  value: unknown,
  name: string,
  lowest: number,
  maxPoints: number,
): Result<Float64Array, ReadError> {
  const pointer = `/${name}`;
  if (!Array.isArray(value) || value.length === 0) {
    const found = value === undefined ? 'is missing.' : 'is not an array of numbers.';
    return refuseAt(pointer, 'json_field_type', found, 'Give one number for each point.');
  }
  if (value.length > maxPoints) {
    const found = `has ${value.length} points; at most ${maxPoints} are read.`;
    return refuseAt(pointer, 'too_many_points', found, 'Sweep with fewer points.');
  }
  const column = new Float64Array(value.length);
  for (let i = 0; i < value.length; i++) {
    const number: unknown = value[i];
    if (typeof number !== 'number' || !Number.isFinite(number)) {
      const remedy = 'Give finite numbers; leave out points that were not measured.';
      return refuseAt(`${pointer}/${i}`, 'not_a_number', 'is not a finite number.', remedy);
    }
    if (number < lowest) {
      const found = `is ${number}, below ${lowest}.`;
      return refuseAt(`${pointer}/${i}`, 'json_number_range', found, 'Correct the number.');
    }
    column[i] = number;
  }
  return ok(column);
}

function sweepFrom(
  [frequencyHz, first, second]: readonly Float64Array[],
  { fields }: Content,
  phase: PhaseKnowledge,
  referenceOhm: number,
): Sweep {
  const base = { frequencyHz, referenceOhm };
  if (phase === 'none') {
    const magnitude = fields[0] === 'swr' ? first.map((swr) => (swr - 1) / (swr + 1)) : first;
    return { ...base, phase, reflectionMagnitude: magnitude };
  }
  if (fields[0] === 'reflection_re') {
    return { ...base, phase, reflectionRe: first, reflectionIm: second };
  }
  const toReflection = converterOf({ kind: 'series', phase, from: ['resistance', 'reactance'] });
  const reflectionRe = new Float64Array(first.length);
  const reflectionIm = new Float64Array(first.length);
  const out = new Float64Array(2);
  for (let i = 0; i < first.length; i++) {
    toReflection(first[i], second[i], referenceOhm, out);
    reflectionRe[i] = out[0];
    reflectionIm[i] = out[1];
  }
  return { ...base, phase, reflectionRe, reflectionIm };
}

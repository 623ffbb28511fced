import { Ajv2020 } from 'ajv/dist/2020.js';
import { describe, expect, it } from 'vitest';
import { readSweepJson } from '../../../../core/formats/json/read-sweep-json.ts';
import { sweepJsonSchema } from '../../../../core/formats/json/schema.ts';
import { writeSweepJson } from '../../../../core/formats/json/write-sweep-json.ts';
import type { Sweep } from '../../../../core/sweep.ts';
import { complexOf, readText, refusalOf, scalarOf } from '../../../support/reading.ts';

const schemaAccepts = new Ajv2020({ strict: true, strictRequired: false }).compile(sweepJsonSchema);

const head = { format: 'sweep-ledger/sweep', version: 1, reference_ohm: 50 };
const frequencies = { frequency_hz: [7e6, 7.1e6] };
const reflections = { reflection_re: [0.1, 0.2], reflection_im: [-0.1, 0.3] };
const good = { ...head, ...frequencies, ...reflections };

function read(value: object) {
  return readText(JSON.stringify(value));
}

describe('a JSON sweep', () => {
  it('holds reflections, their phase signed unless it says otherwise', () => {
    const sweep = complexOf(read(good));
    expect(sweep).toEqual({
      phase: 'signed',
      referenceOhm: 50,
      frequencyHz: Float64Array.of(7e6, 7.1e6),
      reflectionRe: Float64Array.of(0.1, 0.2),
      reflectionIm: Float64Array.of(-0.1, 0.3),
    });
    const unsigned = { ...good, phase: 'unsigned', reflection_im: [0.1, 0.3] };
    expect(read(unsigned).sweep.phase).toBe('unsigned');
  });

  it('holds impedances', () => {
    // The half-wave dipole (C. A. Balanis, Antenna Theory), reflection computed outside this project.
    const dipole = {
      ...head,
      ...frequencies,
      resistance_ohm: [73.1, 73.1],
      reactance_ohm: [42.5, 42.5],
    };
    const sweep = complexOf(read(dipole));
    expect(sweep.reflectionRe[1]).toBeCloseTo(0.274168537, 9);
    expect(sweep.reflectionIm[1]).toBeCloseTo(0.250591691, 9);
    expect(read({ ...dipole, phase: 'unsigned' }).sweep.phase).toBe('unsigned');
  });

  it('holds SWR or magnitudes, of no known phase', () => {
    expect([
      ...scalarOf(read({ ...head, ...frequencies, swr: [1, 3] })).reflectionMagnitude,
    ]).toEqual([0, 0.5]);
    const magnitudes = { ...head, ...frequencies, reflection_magnitude: [0, 1.5], phase: 'none' };
    expect([...scalarOf(read(magnitudes)).reflectionMagnitude]).toEqual([0, 1.5]);
  });

  it('may carry a note, begin with a byte order mark, and be one long line', () => {
    expect(read({ ...good, note: 'a "frequency_hz": in a text' }).format).toBe('json');
    expect(readText(`\ufeff \n${JSON.stringify(good)}`).format).toBe('json');
    const points = Array.from({ length: 30_000 }, (_, i) => i);
    const long = { ...head, frequency_hz: points, swr: points.map(() => 1.5) };
    expect(read(long).sweep.frequencyHz).toHaveLength(30_000);
  });

  it.each<[string, object, string, string]>([
    ['another format', { ...good, format: 'x' }, 'json_not_a_sweep', '/format'],
    ['another version', { ...good, version: 2 }, 'json_version', '/version'],
    ['an unknown field', { ...good, 'a/b~c': 1 }, 'json_field_unknown', '/a~1b~0c'],
    ['a very long unknown field', { ...good, ['x'.repeat(99)]: 1 }, 'json_field_unknown', '/xxx'],
    ['no reference', { ...good, reference_ohm: undefined }, 'json_field_type', '/reference_ohm'],
    ['a reference of zero', { ...good, reference_ohm: 0 }, 'json_field_type', '/reference_ohm'],
    ['a note that is no text', { ...good, note: 5 }, 'json_field_type', '/note'],
    ['a note too long', { ...good, note: 'x'.repeat(2001) }, 'json_field_type', '/note'],
    ['no content', { ...head, ...frequencies }, 'json_content', 'none of'],
    ['two contents', { ...good, swr: [1, 1] }, 'json_content', 'more than one'],
    [
      'half a pair',
      { ...head, ...frequencies, reflection_re: [1, 1] },
      'json_field_missing',
      '/reflection_im',
    ],
    ['no frequencies', { ...head, ...reflections }, 'json_field_type', '/frequency_hz'],
    [
      'frequencies that are no array',
      { ...good, frequency_hz: 7 },
      'json_field_type',
      '/frequency_hz',
    ],
    ['an empty array', { ...good, frequency_hz: [] }, 'json_field_type', '/frequency_hz'],
    ['a phase that does not go with it', { ...good, phase: 'none' }, 'json_phase', '/phase'],
    ['lengths that differ', { ...good, reflection_im: [1] }, 'json_lengths', '/reflection_im'],
    [
      'a text for a number',
      { ...good, reflection_re: [0.1, '0.2'] },
      'not_a_number',
      '/reflection_re/1',
    ],
    [
      'null for a number',
      { ...good, reflection_re: [null, 0.2] },
      'not_a_number',
      '/reflection_re/0',
    ],
    [
      'an SWR below one',
      { ...head, ...frequencies, swr: [1.5, 0.9] },
      'json_number_range',
      '/swr/1',
    ],
    [
      'a negative magnitude',
      { ...head, ...frequencies, reflection_magnitude: [-1, 0] },
      'json_number_range',
      '/reflection_magnitude/0',
    ],
    [
      'a negative frequency',
      { ...good, frequency_hz: [-1, 0] },
      'json_number_range',
      '/frequency_hz/0',
    ],
    [
      'a sign where none is known',
      { ...good, phase: 'unsigned' },
      'json_number_range',
      '/reflection_im/0',
    ],
    [
      'frequencies that do not ascend',
      { ...good, frequency_hz: [2, 2] },
      'sweep_not_ascending',
      '/frequency_hz/1',
    ],
    [
      'no finite reflection',
      { ...head, ...frequencies, resistance_ohm: [-50, 1], reactance_ohm: [0, 1] },
      'sweep_not_finite',
      '/resistance_ohm/0',
    ],
  ])('with %s is refused', (_, value, code, where) => {
    const error = refusalOf(JSON.stringify(value));
    expect(error.code).toBe(code);
    expect(error.detail).toContain(where);
    expect(error.remedy).not.toBe('');
  });

  it.each([
    ['a number beyond all range', JSON.stringify(good).replace('[0.1,', '[1e999,'), 'not_a_number'],
    ['a field twice', JSON.stringify(good).replace('{', '{"version" : 2,'), 'json_field_twice'],
    [
      'a prototype',
      JSON.stringify(good).replace('{', '{"__proto__":{"swr":[1,1]},'),
      'json_field_unknown',
    ],
    ['an array around it', `[${JSON.stringify(good)}]`, 'json_not_a_sweep'],
  ])('with %s is refused', (_, text, code) => {
    expect(refusalOf(text).code).toBe(code);
  });

  it('is refused with line and column where it is not JSON', () => {
    expect(refusalOf('{\n  "format": x\n}')).toMatchObject({
      code: 'json_syntax',
      line: 2,
      column: 13,
    });
    expect(refusalOf('{\n  "format": "')).toMatchObject({
      code: 'json_syntax',
      line: 2,
    });
    expect(refusalOf(`{"note":${' '.repeat(1_000_001)}x}`).line).toBeUndefined();
    expect(refusalOf('{"note":]}').line).toBeUndefined();
    expect(refusalOf('['.repeat(90_000)).code).toBe('json_syntax');
    expect(readSweepJson('null', { maxPoints: 1 })).toMatchObject({
      error: { code: 'json_not_a_sweep' },
    });
  });

  it('with more points than the limit is refused', () => {
    const limits = { maxBytes: 10_000, maxLineLength: 100, maxPoints: 1 };
    expect(refusalOf(JSON.stringify(good), { limits }).code).toBe('too_many_points');
  });
});

describe('the schema of the JSON sweep', () => {
  const swr = { ...head, ...frequencies, swr: [1, 2] };

  it.each<[string, object, boolean]>([
    ['reflections', good, true],
    ['reflections of unsigned phase', { ...good, phase: 'unsigned', reflection_im: [0, 1] }, true],
    ['SWR', swr, true],
    ['SWR with its phase', { ...swr, phase: 'none' }, true],
    ['SWR with a signed phase', { ...swr, phase: 'signed' }, false],
    ['an unknown field', { ...swr, ohms: 50 }, false],
    ['two contents', { ...good, ...swr }, false],
    ['half a pair beside SWR', { ...swr, reflection_re: [1, 1] }, false],
    ['no content', { ...head, ...frequencies }, false],
    ['another version', { ...swr, version: 2 }, false],
    ['an SWR below one', { ...swr, swr: [0.5, 1] }, false],
    ['no reference', { ...swr, reference_ohm: undefined }, false],
  ])('and the reader agree on %s', (_, value, isGood) => {
    const plain: unknown = JSON.parse(JSON.stringify(value));
    expect(schemaAccepts(plain)).toBe(isGood);
    expect(readSweepJson(JSON.stringify(value), { maxPoints: 10 }).ok).toBe(isGood);
  });
});

describe('a sweep written as JSON', () => {
  const base = { frequencyHz: Float64Array.of(0, 0.1, 7e6), referenceOhm: 49.9 };
  it.each<[string, Sweep]>([
    [
      'signed',
      {
        ...base,
        phase: 'signed',
        reflectionRe: Float64Array.of(-0, 1e-300, 0.1),
        reflectionIm: Float64Array.of(-0.1, -0, 5e-324),
      },
    ],
    [
      'unsigned',
      {
        ...base,
        phase: 'unsigned',
        reflectionRe: Float64Array.of(-1, 1, 0.1),
        reflectionIm: Float64Array.of(0.1, 0, 1),
      },
    ],
    ['none', { ...base, phase: 'none', reflectionMagnitude: Float64Array.of(0.1, 0, 1.5) }],
  ])('fits its schema and reads back bit for bit, phase %s', (_, sweep) => {
    const text = writeSweepJson(sweep, { note: 'of "two" lines\n' });
    expect(schemaAccepts(JSON.parse(text))).toBe(true);
    expect(readText(text).sweep).toEqual(sweep);
    expect(readText(writeSweepJson(sweep)).sweep).toEqual(sweep);
  });
});

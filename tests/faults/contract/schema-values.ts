import fc from 'fast-check';

/** The part of JSON Schema that the document of the service uses. */
export interface Schema {
  readonly $ref?: string;
  readonly type?: string | readonly string[];
  readonly enum?: readonly unknown[];
  readonly anyOf?: readonly Schema[];
  readonly format?: string;
  readonly pattern?: string;
  readonly minLength?: number;
  readonly maxLength?: number;
  readonly minimum?: number;
  readonly maximum?: number;
  readonly exclusiveMinimum?: number;
  readonly items?: Schema;
  readonly minItems?: number;
  readonly maxItems?: number;
  readonly properties?: Readonly<Record<string, Schema>>;
  readonly required?: readonly string[];
}

export interface Surroundings {
  readonly schemas: Readonly<Record<string, Schema>>;
  /** Values that exist in the service, by the name of the parameter or property that takes them. */
  readonly known: Readonly<Record<string, readonly string[]>>;
  /** Of a hundred values, how many are not what the schema asks for. */
  readonly hostilePercent: number;
}

/** Texts that have broken programs before (common practice, no source). */
const hostileTexts: readonly string[] = [
  '',
  ' ',
  '0',
  '-1',
  '1e309',
  'NaN',
  '9007199254740993',
  'null',
  '__proto__',
  'constructor',
  "' OR 1=1 --",
  '=1+1',
  '../../etc/passwd',
  '..%2f..%2f',
  '%00',
  '%ZZ',
  '\u0000',
  '\r\nx: y',
  '\u202e\ufeff\u{1f4e1}',
  'ß'.repeat(300),
  'a'.repeat(20_000),
  '2026-02-30T00:00:00Z',
  '0000-01-01T00:00:00Z',
  '9999-12-31T23:59:59.999999999-23:59',
];

export const hostileText: fc.Arbitrary<string> = fc.oneof(
  fc.constantFrom(...hostileTexts),
  fc.string({ unit: 'binary', maxLength: 60 }),
);

const hostileValue: fc.Arbitrary<unknown> = fc.oneof(
  hostileText,
  fc.constantFrom<unknown>(null, true, 0, -1, 1e308, -1e308, 5e-324, 2 ** 53, [], {}, [[]], [null]),
  fc.jsonValue({ maxDepth: 3 }),
);

/** Values of the schema; here and there, also deep inside, one that it does not allow. */
export function valueFor(schema: Schema, around: Surroundings, name = ''): fc.Arbitrary<unknown> {
  const valid = validValue(schema, around, name);
  if (around.hostilePercent === 0) return valid;
  return fc.oneof(
    { weight: 100 - around.hostilePercent, arbitrary: valid },
    { weight: around.hostilePercent, arbitrary: hostileValue },
  );
}

function validValue(schema: Schema, around: Surroundings, name: string): fc.Arbitrary<unknown> {
  if (schema.$ref !== undefined) {
    const target = around.schemas[schema.$ref.split('/').at(-1) ?? ''];
    if (target === undefined) throw new Error(`${schema.$ref} is not in the document.`);
    return validValue(target, around, name);
  }
  if (schema.enum !== undefined) return fc.constantFrom(...schema.enum);
  if (schema.anyOf !== undefined) {
    return fc.oneof(...schema.anyOf.map((one) => validValue(one, around, name)));
  }
  if (typeof schema.type !== 'string') {
    const types = schema.type ?? ['string', 'number', 'boolean', 'null'];
    return fc.oneof(...types.map((type) => validValue({ ...schema, type }, around, name)));
  }
  return ofType(schema.type, schema, around, name);
}

function ofType(
  type: string,
  schema: Schema,
  around: Surroundings,
  name: string,
): fc.Arbitrary<unknown> {
  if (type === 'string') return stringOf(schema, around.known[name] ?? []);
  if (type === 'boolean') return fc.boolean();
  if (type === 'null') return fc.constant(null);
  if (type === 'integer' || type === 'number') return numberOf(schema, type === 'integer');
  if (type === 'array') {
    const { items = {}, minItems = 0, maxItems = 5 } = schema;
    const item = valueFor(items, around, name);
    return fc.array(item, { minLength: minItems, maxLength: Math.min(maxItems, minItems + 5) });
  }
  if (type === 'object') return objectOf(schema, around);
  throw new Error(`Values of the type ${type} cannot be made.`);
}

function objectOf(schema: Schema, around: Surroundings): fc.Arbitrary<unknown> {
  const properties = Object.entries(schema.properties ?? {});
  const model = Object.fromEntries(
    properties.map(([key, one]) => [key, valueFor(one, around, key)]),
  );
  const complete = fc.record(model, { requiredKeys: [...(schema.required ?? [])] });
  if (around.hostilePercent === 0) return complete;
  const lacking = fc.record(model, { requiredKeys: [] });
  const more = fc
    .tuple(complete, hostileText, hostileValue)
    .map(([value, key, extra]) => ({ ...value, [key]: extra }));
  return fc.oneof(
    { weight: 8, arbitrary: complete },
    { weight: 1, arbitrary: lacking },
    { weight: 1, arbitrary: more },
  );
}

function numberOf(schema: Schema, isInteger: boolean): fc.Arbitrary<number> {
  const low = schema.minimum ?? schema.exclusiveMinimum ?? -1e6;
  const high = schema.maximum ?? Math.max(1e6, low);
  if (isInteger) {
    const usual = fc.integer({ min: low, max: Math.min(high, low + 5000) });
    return fc.oneof(usual, fc.constantFrom(low, high));
  }
  const isOpen = schema.exclusiveMinimum !== undefined;
  return fc.double({ min: low, max: high, minExcluded: isOpen, noNaN: true });
}

function stringOf(schema: Schema, known: readonly string[]): fc.Arbitrary<string> {
  const made = madeString(schema);
  if (known.length === 0) return made;
  return fc.oneof(
    { weight: 9, arbitrary: fc.constantFrom(...known) },
    { weight: 1, arbitrary: made },
  );
}

function madeString({ format, pattern, minLength = 0, maxLength = 60 }: Schema) {
  if (format === 'uuid') return fc.uuid({ version: 7 });
  if (format === 'date-time') {
    const dates = { min: new Date('2000-01-01'), max: new Date('2030-01-01'), noInvalidDate: true };
    return fc.date(dates).map((date) => date.toISOString());
  }
  // Names below .example lead nowhere (RFC 2606).
  if (format === 'uri') return fc.uuid().map((part) => `https://${part}.example/${part}`);
  if (pattern !== undefined && !pattern.includes('\\p')) {
    return fc.stringMatching(new RegExp(pattern)).filter((text) => text.length <= maxLength);
  }
  const unit = pattern === undefined ? 'grapheme' : 'grapheme-ascii';
  const text = fc.string({ unit, minLength, maxLength: Math.min(maxLength, minLength + 40) });
  return text.map((one) => one.slice(0, maxLength));
}

const numbers = (description: string, more: object = {}) => ({
  type: 'array',
  description,
  minItems: 1,
  items: { type: 'number', ...more },
});

/** The pairs and single columns of which a JSON sweep has exactly one, with the phase each allows. */
export const jsonContents = [
  { fields: ['reflection_re', 'reflection_im'], phases: ['signed', 'unsigned'] },
  { fields: ['resistance_ohm', 'reactance_ohm'], phases: ['signed', 'unsigned'] },
  { fields: ['reflection_magnitude'], phases: ['none'] },
  { fields: ['swr'], phases: ['none'] },
] as const;

/** A JSON Schema (draft 2020-12) of the JSON sweep; what it cannot say stands in the descriptions. */
export const sweepJsonSchema = {
  $schema: 'https://json-schema.org/draft/2020-12/schema',
  title: 'Sweep',
  description:
    'One measurement of an antenna: points of reflection against frequency. All arrays are equally long.',
  type: 'object',
  additionalProperties: false,
  required: ['format', 'version', 'reference_ohm', 'frequency_hz'],
  properties: {
    format: { const: 'sweep-ledger/sweep' },
    version: { const: 1 },
    note: { type: 'string', maxLength: 2000, description: 'Free text; it is not interpreted.' },
    reference_ohm: {
      type: 'number',
      exclusiveMinimum: 0,
      description: 'The real resistance against which the reflection or SWR holds.',
    },
    phase: {
      enum: ['signed', 'unsigned', 'none'],
      description:
        'What is known of the phase: `signed` (default for pairs), `unsigned` (the imaginary part or reactance is its magnitude, its sign unknown), `none` (default and only choice for a magnitude or SWR).',
    },
    frequency_hz: numbers('Hertz, strictly ascending.', { minimum: 0 }),
    reflection_re: numbers('Real part of the reflection coefficient.'),
    reflection_im: numbers('Imaginary part; with `unsigned` phase its magnitude, not below 0.'),
    resistance_ohm: numbers('Series resistance, ohm.'),
    reactance_ohm: numbers(
      'Series reactance, ohm; with `unsigned` phase its magnitude, not below 0.',
    ),
    reflection_magnitude: numbers('Magnitude of the reflection coefficient.', { minimum: 0 }),
    swr: numbers('Standing wave ratio.', { minimum: 1 }),
  },
  oneOf: jsonContents.map(({ fields, phases }) => ({
    required: [...fields],
    properties: { phase: { enum: [...phases] } },
    not: {
      anyOf: jsonContents
        .flatMap((other) => [...other.fields])
        .filter((field) => !fields.some((own) => own === field))
        .map((field) => ({ required: [field] })),
    },
  })),
} as const;

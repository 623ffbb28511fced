import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatColumns } from '../../core/formats/delimited/format-columns.ts';
import type { ColumnMapping, MappedColumn } from '../../core/formats/delimited/mapping.ts';
import { parseColumns } from '../../core/formats/delimited/parse-columns.ts';
import { factsOf, quantities } from '../../core/formats/delimited/quantities.ts';

const measured = quantities.filter((quantity) => quantity !== 'frequency');

/** The frequency and some other quantities, each with one of its units. */
const columnsWithoutAddress = fc
  .subarray([...measured], { minLength: 0, maxLength: 6 })
  .chain((chosen) =>
    fc.tuple(
      ...['frequency' as const, ...chosen].map((quantity) => {
        const { units } = factsOf(quantity);
        const unit = units.length === 0 ? fc.constant(null) : fc.constantFrom(...units);
        return unit.map((one) => ({ quantity, unit: one }));
      }),
    ),
  );

const options = fc.record({
  referenceOhm: fc.option(fc.double({ min: 1e-3, max: 1e6, noNaN: true })),
  delimiter: fc.option(fc.constantFrom('comma', 'semicolon', 'tab', 'blanks')),
  decimal: fc.option(fc.constantFrom('point', 'comma')),
});

const header = fc
  .string({ minLength: 1, maxLength: 20, unit: fc.constantFrom(...'aΩ ",=:()|1') })
  .map((text) => text.trim())
  .filter((text) => text !== '');

const byOrder = fc
  .tuple(columnsWithoutAddress, fc.nat(3), options)
  .chain(([columns, skipped, more]) => {
    const width = columns.length + skipped;
    const places = Array.from({ length: width }, (_, i) => i + 1);
    return fc
      .shuffledSubarray(places, { minLength: columns.length, maxLength: columns.length })
      .map((chosen): ColumnMapping => {
        const numbers = chosen.sort((a, b) => a - b);
        return {
          columns: columns.map((one, i) => ({ address: numbers[i], ...one })),
          width,
          ...more,
        };
      });
  });

const addressed = fc.tuple(columnsWithoutAddress, options).chain(([columns, more]) =>
  fc
    .uniqueArray(fc.oneof(fc.integer({ min: 1, max: 1000 }), header), {
      minLength: columns.length,
      maxLength: columns.length,
    })
    .map((addresses): ColumnMapping => {
      const placed = columns.map((one, i): MappedColumn => ({ address: addresses[i], ...one }));
      return { columns: placed, width: null, ...more };
    }),
);

describe('any mapping', () => {
  it('reads back from its printed form as it was', () => {
    fc.assert(
      fc.property(fc.oneof(byOrder, addressed), (mapping) => {
        expect(parseColumns(formatColumns(mapping))).toEqual({ ok: true, value: mapping });
      }),
    );
  });

  it('is printed alike after being read again, and any text is read or refused', () => {
    const pieces = fc.constantFrom(
      ...[
        'frequency',
        ':MHz',
        ',',
        'swr',
        '"',
        '=',
        'skip',
        '1',
        ' ',
        'reference',
        'resistance',
        ':',
        'decimal=comma',
      ],
    );
    const text = fc.oneof(
      fc.string(),
      fc.array(pieces).map((parts) => parts.join('')),
    );
    fc.assert(
      fc.property(text, (columns) => {
        const parsed = parseColumns(columns);
        if (!parsed.ok) {
          expect(parsed.error).toMatchObject({ parameter: 'columns' });
          return;
        }
        const printed = formatColumns(parsed.value);
        expect(parseColumns(printed)).toEqual(parsed);
      }),
    );
  });
});

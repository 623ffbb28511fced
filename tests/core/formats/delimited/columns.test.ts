import { describe, expect, it } from 'vitest';
import { columnsGrammar } from '../../../../core/formats/delimited/columns-grammar.ts';
import { formatColumns } from '../../../../core/formats/delimited/format-columns.ts';
import type { ColumnMapping } from '../../../../core/formats/delimited/mapping.ts';
import { parseColumns } from '../../../../core/formats/delimited/parse-columns.ts';
import { quantities } from '../../../../core/formats/delimited/quantities.ts';

function mappingOf(text: string): ColumnMapping {
  const parsed = parseColumns(text);
  if (!parsed.ok) throw new Error(parsed.error.detail);
  return parsed.value;
}

describe('a column mapping', () => {
  it('lists columns by order', () => {
    expect(mappingOf('frequency:MHz,skip,resistance,reactance')).toEqual({
      columns: [
        { address: 1, quantity: 'frequency', unit: 'MHz' },
        { address: 3, quantity: 'resistance', unit: 'ohm' },
        { address: 4, quantity: 'reactance', unit: 'ohm' },
      ],
      width: 4,
      referenceOhm: null,
      delimiter: null,
      decimal: null,
    });
  });

  it('addresses columns by number and by header, whose quotes are doubled', () => {
    const { columns, width } = mappingOf('2=swr,"f, ""dial"" (kHz)"=frequency:kHz');
    expect(width).toBeNull();
    expect(columns).toEqual([
      { address: 2, quantity: 'swr', unit: null },
      { address: 'f, "dial" (kHz)', quantity: 'frequency', unit: 'kHz' },
    ]);
  });

  it('takes options, in any case and with blanks around', () => {
    expect(
      mappingOf(' Frequency : mhz , SWR, Reference = 75, decimal=Comma , delimiter=semicolon'),
    ).toMatchObject({ referenceOhm: 75, decimal: 'comma', delimiter: 'semicolon', width: 2 });
  });

  it.each([
    'frequency:MHz,resistance,reactance',
    'frequency:Hz,skip,swr,skip,reference=75',
    '1=frequency:GHz,4=return_loss',
    '"a ""b"""=frequency:kHz,"c,d"=impedance_magnitude:kohm,"e"=impedance_angle:deg',
    'frequency:MHz,reflected_power:percent,delimiter=blanks,decimal=comma',
  ])('is printed as it was written: %s', (text) => {
    expect(formatColumns(mappingOf(text))).toBe(text);
  });

  it.each([
    ['frequency:MHz,,swr', 'columns_syntax'],
    ['frequency:MHz,"a', 'columns_syntax'],
    ['""=frequency:MHz', 'columns_syntax'],
    ['0=frequency:MHz', 'columns_syntax'],
    ['1001=frequency:MHz', 'columns_syntax'],
    [`frequency:MHz${',skip'.repeat(1000)}`, 'columns_syntax'],
    ['frequency:MHz,impedance', 'columns_quantity_unknown'],
    ['frequency:MHz,1=skip', 'columns_quantity_unknown'],
    ['frequency,swr', 'columns_unit_missing'],
    ['frequency:MHz,impedance_magnitude,impedance_angle', 'columns_unit_missing'],
    ['frequency:THz,swr', 'columns_unit_unknown'],
    ['frequency:MHz:x,swr', 'columns_unit_unknown'],
    ['frequency:MHz,swr:dB', 'columns_unit_unknown'],
    ['frequency:MHz,swr,ohms=50', 'columns_option_unknown'],
    ['frequency:MHz,swr,reference=-50', 'columns_option_unknown'],
    ['frequency:MHz,swr,decimal=dot', 'columns_option_unknown'],
    ['frequency:MHz,swr,delimiter=|', 'columns_option_unknown'],
    ['frequency:MHz,swr,swr', 'columns_twice'],
    ['1=frequency:MHz,1=swr', 'columns_twice'],
    ['frequency:MHz,swr,reference=50,reference=75', 'columns_twice'],
    ['frequency:MHz,swr,decimal=point,decimal=comma', 'columns_twice'],
    ['frequency:MHz,swr,delimiter=tab,delimiter=tab', 'columns_twice'],
    ['frequency:MHz,2=swr', 'columns_mixed'],
    ['swr', 'columns_without_frequency'],
    ['', 'columns_syntax'],
    [`${'x'.repeat(100)},swr`, 'columns_quantity_unknown'],
  ])('`%s` is refused as %s', (text, code) => {
    const parsed = parseColumns(text);
    expect(parsed).toMatchObject({ ok: false, error: { code, parameter: 'columns' } });
    if (!parsed.ok) expect(parsed.error.remedy).not.toBe('');
  });
});

describe('the grammar shown to members', () => {
  it('lists every quantity and its examples are valid', () => {
    expect(quantities.length).toBeGreaterThanOrEqual(21);
    for (const quantity of quantities) expect(columnsGrammar).toContain(`  ${quantity}`);
    const examples = columnsGrammar
      .split('Examples:')[1]
      .split('Quantities')[0]
      .trim()
      .split(/\n\s*/);
    expect(examples).toHaveLength(4);
    for (const example of examples) expect(parseColumns(example)).toMatchObject({ ok: true });
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sweepCsvColumns, writeSweepCsv } from '../../core/formats/delimited/write-sweep-csv.ts';
import { writeSweepJson } from '../../core/formats/json/write-sweep-json.ts';
import { readSweep } from '../../core/formats/read-sweep.ts';
import type { Sweep } from '../../core/sweep.ts';
import { complexOf, fileOf, readText } from '../support/reading.ts';

/** Decimals as people and instruments write them. */
const decimal = fc
  .tuple(
    fc.constantFrom('', '-', '+'),
    fc.bigInt({ min: 0n, max: 10n ** 18n }),
    fc.nat(18),
    fc.option(fc.integer({ min: -20, max: 20 })),
  )
  .map(([sign, digits, decimals, exponent]) => {
    const padded = digits.toString().padStart(decimals + 1, '0');
    const whole = padded.slice(0, padded.length - decimals);
    const fraction = decimals === 0 ? '' : `.${padded.slice(padded.length - decimals)}`;
    return `${sign}${whole}${fraction}${exponent === null ? '' : `e${exponent}`}`;
  });

const delimiters = [',', ';', '\t', ' ', ' , '];
const ends = ['\n', '\r\n', '\r'];

describe('numbers in any table', () => {
  it("are those of the language's own conversion, bit for bit", () => {
    const rows = fc.array(fc.tuple(decimal, decimal), { minLength: 1, maxLength: 20 });
    const style = fc.tuple(fc.constantFrom(...delimiters), fc.constantFrom(...ends), fc.boolean());
    fc.assert(
      fc.property(rows, style, (cells, [delimiter, end, isComma]) => {
        const lines = cells.map((row, i) => [String(i + 1), ...row].join(delimiter));
        const isSwapped = isComma && !delimiter.includes(',');
        const text = isSwapped ? lines.join(end).replaceAll('.', ',') : lines.join(end);
        const decimalMark = isSwapped ? 'comma' : 'point';
        const columns = `frequency:Hz,reflection_re,reflection_im,decimal=${decimalMark}`;
        const sweep = complexOf(readText(`${text}${end}`, { columns }));
        expect([...sweep.reflectionRe]).toEqual(cells.map(([re]) => Number(re)));
        expect([...sweep.reflectionIm]).toEqual(cells.map(([, im]) => Number(im)));
      }),
    );
  });

  it('have their unit scaled in decimal', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 10 ** 9 }), (hertz) => {
        const megahertz = `${Math.floor(hertz / 1e6)}.${String(hertz % 1e6).padStart(6, '0')}`;
        const { sweep } = readText(`${megahertz},2\n`, { columns: 'frequency:MHz,swr' });
        expect(sweep.frequencyHz[0]).toBe(hertz);
      }),
    );
  });
});

const finite = fc.double({ noNaN: true, noDefaultInfinity: true });
const magnitude = fc.double({ min: 0, noNaN: true, noDefaultInfinity: true });

const anySweep: fc.Arbitrary<Sweep> = fc
  .tuple(
    fc.uniqueArray(magnitude, { minLength: 1, maxLength: 30, comparator: (a, b) => a === b }),
    fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
    fc.constantFrom('signed', 'unsigned', 'none'),
  )
  .chain(([frequencies, referenceOhm, phase]) => {
    const frequencyHz = Float64Array.from(frequencies.map((f) => f + 0)).sort();
    const column = (of: fc.Arbitrary<number>) =>
      fc
        .array(of, { minLength: frequencyHz.length, maxLength: frequencyHz.length })
        .map((values) => Float64Array.from(values));
    if (phase === 'none') {
      return column(magnitude).map(
        (reflectionMagnitude): Sweep => ({ phase, frequencyHz, referenceOhm, reflectionMagnitude }),
      );
    }
    return fc.tuple(column(finite), column(phase === 'signed' ? finite : magnitude)).map(
      ([reflectionRe, reflectionIm]): Sweep => ({
        phase,
        frequencyHz,
        referenceOhm,
        reflectionRe,
        reflectionIm,
      }),
    );
  });

describe('any sweep', () => {
  it('reads back bit for bit from comma-separated text', () => {
    fc.assert(
      fc.property(anySweep, (sweep) => {
        const columns = sweepCsvColumns(sweep);
        expect(readText(writeSweepCsv(sweep), { columns }).sweep).toEqual(sweep);
      }),
    );
  });

  it('reads back bit for bit from JSON', () => {
    fc.assert(
      fc.property(anySweep, fc.string(), (sweep, note) => {
        expect(readText(writeSweepJson(sweep, { note })).sweep).toEqual(sweep);
      }),
    );
  });
});

describe('any text that looks like a table', () => {
  it('is read, or refused with a remedy, and a proposal that it carries can be read', () => {
    const piece = fc.constantFrom(
      ...[
        '14',
        '14.1',
        '1.5:1',
        '-3',
        ',',
        ';',
        '\t',
        ' ',
        '\n',
        '\r',
        '"',
        '#',
        'MHz',
        'SWR',
        'R',
        'X',
        'ohm',
        '(',
        ')',
        '---',
        '>10',
        'nan',
        '0,5',
        '|Z|',
        'Phase (deg)',
        '\u0000',
        'é',
      ],
    );
    const text = fc.array(piece, { minLength: 1, maxLength: 60 }).map((pieces) => pieces.join(''));
    const columns = fc.option(
      fc.constantFrom(
        'frequency:MHz,swr',
        '1=frequency:kHz,2=resistance,3=reactance,decimal=comma',
        '"MHz"=frequency:MHz,"SWR"=swr',
        'frequency:MHz,resistance,reactance,swr',
      ),
    );
    fc.assert(
      fc.property(text, columns, (table, told) => {
        const read = readSweep(fileOf(table), told === null ? {} : { columns: told });
        if (read.ok) return;
        expect(read.error.remedy).not.toBe('');
        if (read.error.proposal === undefined) return;
        const again = readSweep(fileOf(table), { columns: read.error.proposal.columns });
        if (!again.ok) expect(again.error.code).not.toMatch(/^columns_(?!insuff|contra)/);
      }),
      { numRuns: 400 },
    );
  });
});

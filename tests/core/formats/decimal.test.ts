import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DecimalScanner, parseDecimal } from '../../../core/formats/decimal.ts';

describe('a decimal number', () => {
  it('is the double that the language makes of it, bit for bit', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        for (const text of [String(value), value.toExponential(16)]) {
          expect(Object.is(parseDecimal(text), Number(text))).toBe(true);
        }
      }),
      { numRuns: 2000 },
    );
  });

  it('is so for any digits, point and exponent', () => {
    const digits = fc.stringMatching(/^[0-9]{0,24}$/);
    const exponent = fc.oneof(
      fc.constant(''),
      fc.integer({ min: -330, max: 310 }).map((e) => `e${e}`),
    );
    fc.assert(
      fc.property(fc.constantFrom('', '-', '+'), digits, digits, exponent, (sign, a, b, e) => {
        const text = `${sign}${a}.${b}${e}`;
        fc.pre(a + b !== '' && Number.isFinite(Number(text)));
        expect(Object.is(parseDecimal(text), Number(text))).toBe(true);
      }),
      { numRuns: 5000 },
    );
  });

  it.each([
    '0',
    '-0',
    '007',
    '.5',
    '5.',
    '+1',
    '1E6',
    '1e-7',
    '9007199254740993',
    '4.9e-324',
    '1.7976931348623157e308',
  ])('%s reads as the language reads it', (text) => {
    expect(Object.is(parseDecimal(text), Number(text))).toBe(true);
  });

  it.each([
    '',
    '.',
    '-',
    '+.',
    'e5',
    '1e',
    '1e+',
    '0x10',
    '0b1',
    '1_0',
    '1,5',
    'NaN',
    'Infinity',
    '1e999',
    ' 1',
    '1 ',
    '\u00a01',
    '１',
    '1.2.3',
    '1e5.5',
  ])('`%s` is none', (text) => {
    expect(parseDecimal(text)).toBeNaN();
  });
});

describe('a unit', () => {
  it.each([
    ['8.2', 6, 8_200_000],
    ['16.1', 6, 16_100_000],
    ['32.3', 3, 32_300],
    ['14.1750001', 6, 14_175_000.1],
    ['1.4e1', 6, 14_000_000],
    ['.0001e3', 9, 100_000_000],
  ])('shifts %s by 10^%d without the noise of a multiplication', (text, shift, hertz) => {
    expect(parseDecimal(text, shift)).toBe(hertz);
  });

  it('gives what the shifted text would give', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
        fc.constantFrom(3, 6, 9),
        (f, shift) => {
          const [mantissa, exponent] = f.toExponential().split('e');
          expect(parseDecimal(String(f), shift)).toBe(
            Number(`${mantissa}e${Number(exponent) + shift}`),
          );
        },
      ),
    );
  });
});

describe('a scanner', () => {
  it('reads a number in a text as it would alone', () => {
    const number = fc.oneof(
      fc.double({ noNaN: true, noDefaultInfinity: true }).map(String),
      fc.stringMatching(/^[+-]?[0-9]{0,20}\.?[0-9]{0,20}([eE][+-]?[0-9]{1,6})?$/),
    );
    fc.assert(
      fc.property(fc.string(), number, fc.constantFrom(0, 3, 6, 9), (before, text, shift) => {
        const scanner = new DecimalScanner(`${before}${text} 1`);
        const value = scanner.read(before.length, shift);
        expect(Object.is(value, parseDecimal(text, shift))).toBe(true);
      }),
      { numRuns: 3000 },
    );
  });

  it('reads none where an exponent lacks its digits, but what stands before', () => {
    const scanner = new DecimalScanner('5e+ 1e99999999');
    expect([scanner.read(0), scanner.end]).toEqual([5, 1]);
    expect([scanner.read(4), scanner.end]).toEqual([Number.NaN, 14]);
  });

  it('sees no digit in what is beyond ASCII', () => {
    expect(new DecimalScanner('１２').read(0)).toBeNaN();
    const scanner = new DecimalScanner('Ω 12°');
    expect([scanner.read(2), scanner.end]).toEqual([12, 4]);
  });

  it('stops behind each number and says where', () => {
    const scanner = new DecimalScanner('12 -3.5e2x');
    expect([scanner.read(0), scanner.end]).toEqual([12, 2]);
    expect([scanner.read(3), scanner.end]).toEqual([-350, 9]);
    expect(scanner.read(9)).toBeNaN();
  });
});

import { describe, expect, it } from 'vitest';
import { defaultReadLimits } from '../../../core/formats/read-types.ts';
import { decodeText } from '../../../core/formats/text.ts';

function decoded(bytes: Uint8Array, limits = defaultReadLimits) {
  const result = decodeText(bytes, limits);
  if (!result.ok) return { code: result.error.code, line: result.error.line };
  return { text: result.value.text, codes: result.value.assumptions.map(({ code }) => code) };
}

const utf8 = (text: string) => new TextEncoder().encode(text);

describe('the bytes of a file', () => {
  it('are UTF-8 by default', () => {
    expect(decoded(utf8('Ω 50'))).toEqual({ text: 'Ω 50', codes: [] });
  });

  it('lose a byte order mark, with a word', () => {
    expect(decoded(utf8('\ufeffa'))).toEqual({ text: 'a', codes: ['byte_order_mark'] });
  });

  it('are UTF-16 of either order where a mark says so', () => {
    expect(decoded(Uint8Array.of(0xff, 0xfe, 0x61, 0))).toEqual({ text: 'a', codes: ['utf_16'] });
    expect(decoded(Uint8Array.of(0xfe, 0xff, 0, 0x61))).toEqual({ text: 'a', codes: ['utf_16'] });
  });

  it('are windows-1252 where they are no UTF-8, with a word', () => {
    expect(decoded(Uint8Array.of(0x32, 0xb0))).toEqual({ text: '2°', codes: ['windows_1252'] });
  });

  it.each([
    ['a zero byte', Uint8Array.of(0x61, 0)],
    ['a zero byte among letters that are no UTF-8', Uint8Array.of(0xb0, 0)],
    ['a zero letter in UTF-16', Uint8Array.of(0xff, 0xfe, 0, 0)],
    ['half a letter of UTF-16', Uint8Array.of(0xff, 0xfe, 0x61)],
  ])('are no text with %s', (_, bytes) => {
    expect(decoded(bytes)).toEqual({ code: 'binary_file', line: undefined });
  });

  it('are refused when there are none, or too many', () => {
    expect(decoded(new Uint8Array(0))).toMatchObject({ code: 'empty_file' });
    const limits = { ...defaultReadLimits, maxBytes: 3 };
    expect(decoded(utf8('abc'), limits)).toMatchObject({ text: 'abc' });
    expect(decoded(utf8('abcd'), limits)).toMatchObject({ code: 'too_many_bytes' });
  });

  it('are refused where a line is too long, and the line is named', () => {
    const limits = { ...defaultReadLimits, maxLineLength: 3 };
    expect(decoded(utf8('abc\r\nabc\rab\nabc'), limits)).toMatchObject({ codes: [] });
    expect(decoded(utf8('abc\r\nabc\rabcd\n'), limits)).toEqual({ code: 'line_too_long', line: 3 });
  });
});

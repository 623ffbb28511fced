import { describe, expect, it } from 'vitest';
import { readSweep } from '../../../core/formats/read-sweep.ts';
import { assumedIn, fileOf, readText, refusalOf } from '../../support/reading.ts';

const touchstone = '# MHz S RI R 50\n14 0.1 0.2\n14.1 0.1 0.1\n';
const delimited = 'Frequency (MHz),SWR\n14,1.5\n14.1,1.6\n';
const json =
  '{"format":"sweep-ledger/sweep","version":1,"reference_ohm":50,"frequency_hz":[14e6],"swr":[2]}';

describe('a file', () => {
  it.each([
    ['touchstone-1', touchstone],
    [
      'touchstone-2',
      '[Version] 2.0\n# MHz S RI R 50\n[Number of Ports] 1\n[Number of Frequencies] 1\n[Network Data]\n14 0.1 0.2\n[End]\n',
    ],
    ['delimited', delimited],
    ['json', json],
  ])('is read as %s', (format, text) => {
    expect(readText(text).format).toBe(format);
  });

  it('is read whatever its name says', () => {
    expect(readText(delimited, { fileName: 'sweep.s1p' }).format).toBe('delimited');
    expect(readText(touchstone, { fileName: 'sweep.csv' }).format).toBe('touchstone-1');
  });

  it('tells what was assumed in decoding before what was assumed in reading', () => {
    expect(assumedIn(readText(`\ufeff${delimited}`))).toEqual([
      'byte_order_mark',
      'columns_inferred',
      'reference_assumed',
    ]);
    expect(assumedIn(readText(`\ufeff${touchstone}`))).toEqual(['byte_order_mark']);
  });

  it('in UTF-16 with its mark is read, as spreadsheets write it', () => {
    const text = 'Frequency (MHz)\tSWR\r\n14,0\t1,5\r\n';
    const units = Uint16Array.from(`\ufeff${text}`, (char) => char.charCodeAt(0));
    const read = readSweep(new Uint8Array(units.buffer));
    expect(read).toMatchObject({ ok: true, value: { columns: 'frequency:MHz,swr' } });
  });

  it('without an option line is read with one that is given', () => {
    const read = readText('14 0.1 0.2\n', { optionLine: '# MHz S RI R 50' });
    expect(read.format).toBe('touchstone-1');
  });

  it('of a network analyser has a port, others have not', () => {
    const twoPort = '# MHz S RI R 50\n14 0.1 0 0 0 0 0 0.2 0\n';
    expect(readText(twoPort, { port: 2 }).port).toBe(2);
    for (const text of [delimited, json]) {
      expect(refusalOf(text, { port: 2 })).toMatchObject({
        code: 'port_absent',
        parameter: 'port',
      });
      expect(readText(text, { port: 1 }).port).toBeUndefined();
    }
  });

  it.each([touchstone, json])('that says itself what it holds takes no columns', (text) => {
    const error = refusalOf(text, { columns: 'frequency:MHz,swr' });
    expect(error).toMatchObject({ code: 'columns_not_asked', parameter: 'columns' });
  });

  it('is refused beyond the limits, before it is read', () => {
    const limits = { maxBytes: 40, maxLineLength: 20, maxPoints: 10 };
    expect(refusalOf(`${delimited}14.2,1.7\n`, { limits }).code).toBe('too_many_bytes');
    expect(refusalOf('14,1.500000000000000000000\n', { limits })).toMatchObject({
      code: 'line_too_long',
      line: 1,
    });
  });

  it.each([
    ['a ZIP archive', [0x50, 0x4b, 3, 4, 20, 0]],
    ['a PDF document', [...fileOf('%PDF-1.7\n14,1.5\n')]],
    ['a PNG picture', [0x89, 0x50, 0x4e, 0x47, 13, 10]],
    ['a JPEG picture', [0xff, 0xd8, 0xff, 0xe0]],
    ['a rich text document', [...fileOf('{\\rtf1 14,1.5}')]],
  ])('that is %s is refused as such', (kind, bytes) => {
    const read = readSweep(Uint8Array.from(bytes));
    expect(read).toMatchObject({ ok: false, error: { code: 'unknown_kind' } });
    if (!read.ok) expect(read.error.detail).toContain(kind);
  });

  it('of unknown bytes or none is refused', () => {
    expect(readSweep(Uint8Array.of(1, 0, 2))).toMatchObject({ error: { code: 'binary_file' } });
    expect(readSweep(new Uint8Array(0))).toMatchObject({ error: { code: 'empty_file' } });
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readSweep } from '../../core/formats/read-sweep.ts';
import { fileOf } from '../support/reading.ts';

const limits = { maxBytes: 1_000_000, maxLineLength: 1_000_000, maxPoints: 1000 };

describe('any bytes', () => {
  it('are read or refused, never thrown at', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 300 }), (bytes) => {
        const read = readSweep(bytes);
        if (!read.ok) expect(read.error.remedy).not.toBe('');
      }),
      { numRuns: 500 },
    );
  });

  it('behind the start of a sweep of each kind are too', () => {
    const start = fc.constantFrom(
      '# MHz S RI R 50\n14 ',
      '[Version] 2.0\n# MHz S RI R 50\n',
      'MHz,SWR\n14,1.5\n',
      '{"format":"sweep-ledger/sweep","version":1,',
      '\ufeffMHz;SWR\n14,1;1,5\n',
    );
    fc.assert(
      fc.property(start, fc.uint8Array({ maxLength: 200 }), (text, bytes) => {
        const read = readSweep(Uint8Array.from([...fileOf(text), ...bytes]));
        if (!read.ok) expect(read.error.code).not.toBe('');
      }),
      { numRuns: 500 },
    );
  });
});

describe('hostile text of a megabyte', () => {
  // Each would take minutes if any step were quadratic; the runner would stop the test.
  it.each([
    ['one long line of digits', '1'.repeat(990_000)],
    ['digits and commas', '1,'.repeat(490_000)],
    ['commas', ','.repeat(990_000)],
    ['quotes', '"'.repeat(990_000)],
    ['quoted cells', `14,${'"1",'.repeat(240_000)}`],
    ['blank lines', '\n'.repeat(990_000)],
    ['comment lines', '#\n'.repeat(490_000)],
    ['names without numbers', 'a,b 1\n'.repeat(160_000)],
    ['names, then one row', `${'a,b\n'.repeat(240_000)}14,1.5\n`],
    ['tabs', `14${'\t'.repeat(980_000)}1`],
    ['braces', '{'.repeat(990_000)],
    ['brackets', '['.repeat(990_000)],
    ['keys', `{${'"swr":1,'.repeat(120_000)}"a":1}`],
    ['header of brackets', `${'('.repeat(480_000)}${')'.repeat(480_000)},SWR\n14,1.5\n14.1,1.5\n`],
    ['option words', `# ${'MHz '.repeat(240_000)}\n14 1 1`],
    ['rows beyond the limit', '14,1.5\n'.repeat(140_000)],
  ])('is answered in its turn: %s', (_, text) => {
    const columns = { columns: '1=frequency:MHz,2=swr' };
    for (const options of [{}, columns, { columns: '"f"=frequency:MHz,"s"=swr' }]) {
      const read = readSweep(fileOf(text), { limits, ...options });
      expect(read.ok ? 'read' : read.error.remedy).not.toBe('');
    }
  });
});

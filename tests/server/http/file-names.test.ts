import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { safeFileName } from '../../../server/http/file-names.ts';

describe('the name of a download', () => {
  it('keeps letters, digits and hyphens', () => {
    expect(safeFileName('sweep-2026-05-17-ab12', 's1p')).toBe('sweep-2026-05-17-ab12.s1p');
  });

  it('is safe in a header and in a folder, whatever it was made of', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 300 }), (stem) => {
        const name = safeFileName(stem, 'csv');
        expect(name).toMatch(/^[A-Za-z0-9][A-Za-z0-9-]*\.csv$/);
        expect(name.length).toBeLessThanOrEqual(106);
      }),
    );
  });

  it.each(['con', 'NUL', 'com1', 'LPT9'])('is never the device name %s', (stem) => {
    expect(safeFileName(stem, 'csv')).toBe(`sweep-${stem}.csv`);
  });
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decodeCursor, encodeCursor } from '../../../server/http/cursor.ts';

const invalid = expect.objectContaining({ slug: 'invalid-cursor' });

describe('a cursor', () => {
  it('gives back the position it was made of', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), fc.uuid(), fc.string(), (sortKey, id, list) => {
        expect(decodeCursor(encodeCursor([sortKey, id], list), list)).toEqual([sortKey, id]);
      }),
    );
  });

  it('is refused by a list with another filter', () => {
    const cursor = encodeCursor(['k', 'i'], '/v1/antennas?site=hilltop');
    expect(() => decodeCursor(cursor, '/v1/antennas?')).toThrow(invalid);
  });

  it('is refused when it is not one of ours, whatever it is', () => {
    fc.assert(
      fc.property(fc.string(), (text) => {
        expect(() => decodeCursor(text, '/v1/sites?')).toThrow(invalid);
      }),
    );
  });

  it('is refused with a position of the wrong kind', () => {
    const whole = encodeCursor(['k', 'i'], 'list');
    const [version, mark] = JSON.parse(Buffer.from(whole, 'base64url').toString());
    for (const parts of [
      [version, mark, 1, 'i'],
      [version, mark, 'k'],
      [2, mark, 'k', 'i'],
    ]) {
      const cursor = Buffer.from(JSON.stringify(parts)).toString('base64url');
      expect(() => decodeCursor(cursor, 'list')).toThrow(invalid);
    }
  });
});

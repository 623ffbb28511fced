import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { makeIdSource } from '../../server/ids.ts';

const zeros = (count: number) => new Uint8Array(count);
const ones = (count: number) => new Uint8Array(count).fill(0xff);

describe('an id', () => {
  it('is the UUID version 7 of RFC 9562, appendix A.6, for its time', () => {
    // The example has unix_ts_ms 017F22E279B0, 2022-02-22T19:22:22.000Z (appendix A.6).
    const id = makeIdSource(() => Date.parse('2022-02-22T19:22:22Z'), zeros)();
    expect(id).toBe('017f22e2-79b0-7000-8000-000000000000');
  });

  it('has version 7 and the variant bits 10, whatever the random bytes', () => {
    const pattern = /^[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/;
    fc.assert(
      fc.property(fc.uint8Array({ minLength: 10, maxLength: 10 }), (bytes) => {
        expect(
          makeIdSource(
            () => 1,
            () => bytes,
          )(),
        ).toMatch(pattern);
      }),
    );
  });

  it('sorts after every id made before it, even when the clock stands still or steps back', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 0, max: 3 }), { minLength: 2, maxLength: 50 }),
        (times) => {
          let i = 0;
          const newId = makeIdSource(() => times[i++ % times.length], ones);
          const ids = times.map(() => newId());
          expect(ids).toEqual([...ids].sort());
          expect(new Set(ids).size).toBe(ids.length);
        },
      ),
    );
  });

  it('borrows from the next millisecond when the counter is used up', () => {
    const newId = makeIdSource(() => 5, ones);
    const ids = Array.from({ length: 10_000 }, newId);
    expect(new Set(ids).size).toBe(10_000);
    expect(ids).toEqual([...ids].sort());
  });
});

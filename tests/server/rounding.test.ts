import { describe, expect, it } from 'vitest';
import { rounded } from '../../server/wire/rounding.ts';

describe('a derived answer', () => {
  it('shows no noise of the arithmetic, at any depth', () => {
    const answer = { swr: 1.1999999999999997, list: [{ hz: 14094508.220817566 }], none: null };
    expect(rounded(answer)).toEqual({ swr: 1.2, list: [{ hz: 14094508.2208 }], none: null });
  });

  it('keeps whole numbers and texts as they are', () => {
    const answer = { hz: 123_456_789_012_345, code: '1.1999999999999997', flag: true };
    expect(rounded(answer)).toEqual(answer);
  });
});

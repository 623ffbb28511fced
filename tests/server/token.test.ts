import { randomBytes } from 'node:crypto';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  isWellFormedToken,
  makeToken,
  secretSha256,
  tokenPattern,
} from '../../server/auth/token.ts';

describe('a token', () => {
  it('has the published shape and proves itself', () => {
    const token = makeToken(randomBytes);
    expect(token).toMatch(tokenPattern);
    expect(isWellFormedToken(token)).toBe(true);
  });

  it('carries at least 160 random bits', () => {
    const [, secret] = /^sl_(.*).{6}$/.exec(makeToken(randomBytes)) ?? [];
    expect(secret.length * Math.log2(62)).toBeGreaterThanOrEqual(160);
  });

  it('is refused with any one character changed', () => {
    const token = makeToken(randomBytes);
    fc.assert(
      fc.property(
        fc.integer({ min: 3, max: token.length - 1 }),
        fc.constantFrom(...'0aZ9'),
        (at, c) => {
          fc.pre(token[at] !== c);
          expect(isWellFormedToken(token.slice(0, at) + c + token.slice(at + 1))).toBe(false);
        },
      ),
    );
  });

  it('does not favour digits: bytes beyond the last multiple of 62 are passed over', () => {
    const bytes = [248, 255, 61, 62];
    let calls = 0;
    const token = makeToken((count) =>
      Uint8Array.from({ length: count }, () => bytes[calls++ % 4]),
    );
    expect(token.slice(3, 9)).toBe('z0z0z0');
  });

  it('is kept as its SHA-256', () => {
    // NIST FIPS 180-4 example: SHA-256 of "abc".
    expect(Buffer.from(secretSha256('abc')).toString('hex')).toBe(
      'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
    );
  });
});

import { describe, expect, it } from 'vitest';
import { checkContentDigest, digestField, sha256 } from '../../../server/http/digests.ts';

// RFC 9530, section 2: {"hello": "world"} with a line feed has this SHA-256.
const body = new TextEncoder().encode('{"hello": "world"}\n');
const field = 'sha-256=:RK/0qy18MlBSVnWgjwz6lZEWjP/lF5HF9bvEF8FabDg=:';

describe('Content-Digest', () => {
  it('is written as in the example of RFC 9530', () => {
    expect(digestField(sha256(body))).toBe(field);
  });

  it('may be left out', () => {
    expect(() => checkContentDigest(undefined, body)).not.toThrow();
  });

  it.each([field, `sha-512=:AAAA:, ${field}`, `${field}, md5=:AAAA:`])('%s is right', (header) => {
    expect(() => checkContentDigest(header, body)).not.toThrow();
  });

  it('does not fit a body in which one bit has changed', () => {
    const damaged = Uint8Array.from(body);
    damaged[3] ^= 1;
    expect(() => checkContentDigest(field, damaged)).toThrow(
      expect.objectContaining({ slug: 'digest-mismatch' }),
    );
  });

  it.each(['md5=:AAAA:', 'sha-256=abc', '', 'sha-256=:AAAA:', 'x-sha-256=:RK/0:'])(
    '%s cannot be checked',
    (header) => {
      expect(() => checkContentDigest(header, body)).toThrow(
        expect.objectContaining({ slug: 'digest-unsupported' }),
      );
    },
  );
});

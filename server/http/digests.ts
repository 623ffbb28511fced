import { createHash } from 'node:crypto';
import { Problem } from '../problems.ts';

/** The SHA-256 of some bytes. */
export function sha256(bytes: Uint8Array): Buffer {
  return createHash('sha256').update(bytes).digest();
}

/** A digest as a field value of RFC 9530: `sha-256=:<base64>:`. */
export function digestField(digest: Uint8Array): string {
  return `sha-256=:${Buffer.from(digest).toString('base64')}:`;
}

/**
 * Checks a `Content-Digest` (RFC 9530) against the body it came with. Other algorithms beside
 * SHA-256 are passed over. Throws `digest-unsupported` and `digest-mismatch`.
 */
export function checkContentDigest(
  header: string | readonly string[] | undefined,
  body: Uint8Array,
): void {
  if (header === undefined) return;
  const match = /(?:^|,)\s*sha-256=:([A-Za-z0-9+/]{43}=):\s*(?:,|$)/.exec(String(header));
  if (match === null) {
    throw new Problem('digest-unsupported', {
      errors: [{ detail: 'There is no SHA-256 digest in it.', header: 'content-digest' }],
      headers: { 'want-content-digest': 'sha-256=10' },
    });
  }
  const actual = sha256(body);
  if (!actual.equals(Buffer.from(match[1], 'base64'))) {
    throw new Problem('digest-mismatch', {
      detail: `The ${body.length} bytes that arrived have ${digestField(actual)}.`,
    });
  }
}

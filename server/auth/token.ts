import { createHash } from 'node:crypto';
import { crc32 } from 'node:zlib';
import type { RandomBytes } from '../ids.ts';

/**
 * A token reads `sl_<secret><check>`: 30 base-62 digits of a secret (more than 178 bits) and 6 of
 * the CRC-32 of what stands before them. The prefix makes a leaked token easy to find, the check
 * lets a mistyped one be refused without asking the store.
 */
export const tokenPattern = /^sl_[0-9A-Za-z]{36}$/;

const digits = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz';
const secretDigits = 30;
const checkDigits = 6;

/** Makes a new token. It is shown once; keep only `secretSha256` of it. */
export function makeToken(randomBytes: RandomBytes): string {
  let secret = '';
  while (secret.length < secretDigits) {
    // 248 is the largest multiple of 62 in a byte: dropping what lies above keeps digits equal.
    for (const byte of randomBytes(secretDigits)) {
      if (byte < 248 && secret.length < secretDigits) secret += digits[byte % 62];
    }
  }
  return `sl_${secret}${checkOf(`sl_${secret}`)}`;
}

/** Whether the text has the shape of a token and its check digits agree. */
export function isWellFormedToken(text: string): boolean {
  return tokenPattern.test(text) && text.endsWith(checkOf(text.slice(0, -checkDigits)));
}

/** The SHA-256 under which a token is kept and found. */
export function secretSha256(token: string): Uint8Array {
  return createHash('sha256').update(token, 'ascii').digest();
}

function checkOf(text: string): string {
  let rest = crc32(text);
  let check = '';
  for (let i = 0; i < checkDigits; i++) {
    check = digits[rest % 62] + check;
    rest = Math.floor(rest / 62);
  }
  return check;
}

/** Milliseconds since 1970-01-01T00:00:00Z. */
export type Clock = () => number;

/** Fills a new array with that many random bytes. */
export type RandomBytes = (count: number) => Uint8Array;

/**
 * Makes a source of UUID version 7 (RFC 9562, section 5.7): 48 bits of milliseconds, then a 12-bit
 * counter that grows within a millisecond (section 6.2, method 1) so that ids made later sort later
 * even when the clock stands still or steps back, then 62 random bits.
 */
export function makeIdSource(now: Clock, randomBytes: RandomBytes): () => string {
  let lastMs = -1;
  let counter = 0;
  return () => {
    const random = randomBytes(10);
    const ms = now();
    if (ms > lastMs) {
      lastMs = ms;
      // The counter's top bit starts clear: at least 2048 ids fit into one millisecond.
      counter = ((random[8] << 8) | random[9]) & 0x7ff;
    } else if (counter < 0xfff) {
      counter += 1;
    } else {
      lastMs += 1;
      counter = 0;
    }
    return formatUuid7(lastMs, counter, random);
  };
}

function formatUuid7(ms: number, counter: number, random: Uint8Array): string {
  const time = ms.toString(16).padStart(12, '0');
  const count = counter.toString(16).padStart(3, '0');
  const variant = ((random[0] & 0x3f) | 0x80).toString(16);
  let tail = '';
  for (let i = 1; i < 8; i++) tail += random[i].toString(16).padStart(2, '0');
  return `${time.slice(0, 8)}-${time.slice(8)}-7${count}-${variant}${tail.slice(0, 2)}-${tail.slice(2)}`;
}

/**
 * Seeded random numbers: xoshiro128** (D. Blackman, S. Vigna, "Scrambled linear pseudorandom number
 * generators", ACM Trans. Math. Software 47(4), 2021), its state filled by a multiply-xorshift
 * finaliser over a Weyl sequence (G. L. Steele et al., "Fast splittable pseudorandom number
 * generators", OOPSLA 2014). The same seed gives the same numbers on every machine.
 */
export class Random {
  readonly #state: Uint32Array;
  #spareGaussian: number | null = null;

  constructor(seed: number) {
    this.#state = Uint32Array.from({ length: 4 }, (_, i) =>
      finalise((seed | 0) + Math.imul(0x9e3779b9, i + 1)),
    );
    if (this.#state.every((word) => word === 0)) this.#state[0] = 1;
  }

  /** The stream of one numbered case of this seed, so that a case can be made again alone. */
  static ofCase(seed: number, index: number): Random {
    return new Random(finalise(seed | 0) ^ finalise(Math.imul(index + 1, 0x9e3779b9)));
  }

  /** Uniform 32-bit word. */
  word(): number {
    const s = this.#state;
    const result = Math.imul(rotateLeft(Math.imul(s[1], 5), 7), 9) >>> 0;
    const shifted = s[1] << 9;
    s[2] ^= s[0];
    s[3] ^= s[1];
    s[1] ^= s[2];
    s[0] ^= s[3];
    s[2] ^= shifted;
    s[3] = rotateLeft(s[3], 11);
    return result;
  }

  /** Uniform in [low, high), 53 random bits. */
  uniform(low = 0, high = 1): number {
    const unit = ((this.word() >>> 5) * 67_108_864 + (this.word() >>> 6)) / 9_007_199_254_740_992;
    return low + (high - low) * unit;
  }

  /** Uniform in the logarithm between two positive bounds. */
  logUniform(low: number, high: number): number {
    return Math.exp(this.uniform(Math.log(low), Math.log(high)));
  }

  /** Uniform whole number, both ends possible. */
  integer(low: number, high: number): number {
    return low + Math.floor(this.uniform() * (high - low + 1));
  }

  /** One of the choices, each as likely. */
  pick<T>(choices: readonly T[]): T {
    return choices[this.integer(0, choices.length - 1)] as T;
  }

  /** True with the given probability. */
  chance(probability: number): boolean {
    return this.uniform() < probability;
  }

  /** Standard normal, by the polar method (G. Marsaglia, T. A. Bray, SIAM Review 6(3), 1964). */
  gaussian(): number {
    const spare = this.#spareGaussian;
    if (spare !== null) {
      this.#spareGaussian = null;
      return spare;
    }
    for (;;) {
      const x = this.uniform(-1, 1);
      const y = this.uniform(-1, 1);
      const r2 = x * x + y * y;
      if (r2 >= 1 || r2 === 0) continue;
      const factor = Math.sqrt((-2 * Math.log(r2)) / r2);
      this.#spareGaussian = y * factor;
      return x * factor;
    }
  }
}

function rotateLeft(word: number, bits: number): number {
  return ((word << bits) | (word >>> (32 - bits))) >>> 0;
}

function finalise(word: number): number {
  let mixed = word >>> 0;
  mixed = Math.imul(mixed ^ (mixed >>> 16), 0x85ebca6b);
  mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35);
  return (mixed ^ (mixed >>> 16)) >>> 0;
}

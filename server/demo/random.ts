/** A stream of numbers that a text seeds; the same on every machine. */
export interface SeededStream {
  /** Uniform in [0, 1). */
  uniform(): number;
  /** Standard normal, as the sum of twelve uniforms less six: no rare transcendental functions. */
  gaussian(): number;
}

/** A 32-bit Weyl sequence through a multiply-xorshift mixer, started by a hash of `seed`. */
export function seededStream(seed: string): SeededStream {
  let state = hash(seed);
  const uniform = () => {
    state = (state + 0x9e3779b9) >>> 0;
    return mix(state) / 0x1_0000_0000;
  };
  const gaussian = () => {
    let sum = -6;
    for (let i = 0; i < 12; i++) sum += uniform();
    return sum;
  };
  return { uniform, gaussian };
}

function hash(text: string): number {
  let word = 0x811c9dc5;
  for (const character of text) word = mix((word ^ (character.codePointAt(0) ?? 0)) >>> 0);
  return word;
}

function mix(word: number): number {
  let mixed = Math.imul(word ^ (word >>> 16), 0x21f0aaad);
  mixed = Math.imul(mixed ^ (mixed >>> 15), 0x735a2d97);
  return (mixed ^ (mixed >>> 15)) >>> 0;
}

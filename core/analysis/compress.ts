import { parabolaAt, parabolaThrough } from './parabola.ts';
import type { Samples } from './samples.ts';

/** Fewer samples, with weights, from which fits come out as from all. */
export interface Compressed extends Samples {
  readonly weight: Float64Array;
  /** Sum of squares that was left behind: the scatter inside the blocks. */
  readonly squaresInside: number;
}

/** A sweep of so many samples is not compressed. */
const mostKeptWhole = 200;
/** A longer one is cut into so many blocks at first. */
const firstBlocks = 48;
/** From so many samples on, what no instrument resolves counts as noise, so that exact ones shrink too. */
export const long = 2000;
export const leastNoise = 1e-7;
/** A block of at most so many samples is not halved. */
const smallestBlock = 8;
/** A block's scatter may exceed the noise by this many standard deviations of such a scatter. */
const scatterLimit = 3;

/**
 * Replaces blocks of samples by three each: the values of the block's least-squares parabola at the
 * nodes of the Gauss quadrature for evenly weighted points (zeros of Gram's polynomial of third
 * degree). The three carry independent noise, and sums over them equal those over the block for
 * curves up to the fifth degree. A block in which the curve does more than a parabola, beyond the
 * noise, is halved; small ones stay whole. `noise`: standard deviation of one number.
 */
export function compress(samples: Samples, noise: number): Compressed {
  const count = samples.frequencyHz.length;
  const out: Growing = { frequencyHz: [], re: [], im: [], weight: [], squaresInside: 0 };
  const tolerated = count < long ? noise : Math.max(noise, leastNoise);
  if (count <= mostKeptWhole || tolerated === 0) {
    keepWhole(samples, 0, count, out);
  } else {
    for (let b = 0; b < firstBlocks; b++) {
      const from = Math.round((b * count) / firstBlocks);
      const to = Math.round(((b + 1) * count) / firstBlocks);
      block(samples, from, to, tolerated, out);
    }
  }
  return {
    frequencyHz: Float64Array.from(out.frequencyHz),
    re: Float64Array.from(out.re),
    im: Float64Array.from(out.im),
    weight: Float64Array.from(out.weight),
    squaresInside: out.squaresInside,
  };
}

interface Growing {
  readonly frequencyHz: number[];
  readonly re: number[];
  readonly im: number[];
  readonly weight: number[];
  squaresInside: number;
}

function keepWhole({ frequencyHz, re, im }: Samples, from: number, to: number, out: Growing): void {
  for (let i = from; i < to; i++) {
    out.frequencyHz.push(frequencyHz[i]);
    out.re.push(re[i]);
    out.im.push(im[i]);
    out.weight.push(1);
  }
}

function block(samples: Samples, from: number, to: number, noise: number, out: Growing): void {
  const count = to - from;
  if (count < smallestBlock) {
    keepWhole(samples, from, to, out);
    return;
  }
  const re = parabolaThrough(samples.re, from, to);
  const im = parabolaThrough(samples.im, from, to);
  const freedom = 2 * (count - 3);
  const allowed = noise ** 2 * (freedom + scatterLimit * Math.sqrt(2 * freedom));
  const inside = re.squaresLeft + im.squaresLeft;
  if (inside > allowed) {
    const middle = (from + to) >> 1;
    block(samples, from, middle, noise, out);
    block(samples, middle, to, noise, out);
    return;
  }
  const frequency = parabolaThrough(samples.frequencyHz, from, to);
  const node = Math.sqrt((3 * count * count - 7) / 20);
  const outer = (count * (count * count - 1)) / (24 * node * node);
  for (const place of [-1, 0, 1]) {
    out.frequencyHz.push(parabolaAt(frequency, place * node));
    out.re.push(parabolaAt(re, place * node));
    out.im.push(parabolaAt(im, place * node));
    out.weight.push(place === 0 ? count - 2 * outer : outer);
  }
  out.squaresInside += inside;
}

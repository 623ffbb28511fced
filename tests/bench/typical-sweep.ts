import { Random } from '../support/random.ts';

const noise = 2e-4;

/**
 * A sweep as a hand-held analyzer would write it: a series resonator with six-digit reflections and
 * a receiver's noise. (A ripple instead of noise would be a part of the antenna, to be modelled.)
 * The same for the same seed.
 */
export interface TypicalSweep {
  readonly frequencyHz: number[];
  readonly reflectionRe: number[];
  readonly reflectionIm: number[];
}

export function typicalSweep(points: number, seed = 1): TypicalSweep {
  const frequencyHz: number[] = [];
  const reflectionRe: number[] = [];
  const reflectionIm: number[] = [];
  const random = new Random(seed);
  for (let i = 0; i < points; i++) {
    const f = Math.round(13_500_000 + (1_500_000 * i) / Math.max(1, points - 1));
    const u = f / (14_150_000 + 1000 * (seed % 97));
    const r = 38 + 6 * u;
    const x = 38 * 12 * (u - 1 / u);
    const d = (r + 50) ** 2 + x * x;
    frequencyHz.push(f);
    reflectionRe.push(sixDigits((r * r - 2500 + x * x) / d + noise * random.gaussian()));
    reflectionIm.push(sixDigits((100 * x) / d + noise * random.gaussian()));
  }
  return { frequencyHz, reflectionRe, reflectionIm };
}

function sixDigits(value: number): number {
  return Number(value.toFixed(6));
}

export function asTouchstone({ frequencyHz, reflectionRe, reflectionIm }: TypicalSweep): string {
  const rows = frequencyHz.map(
    (f, i) => `${f} ${reflectionRe[i].toFixed(6)} ${reflectionIm[i].toFixed(6)}`,
  );
  return `! typical sweep\r\n# Hz S RI R 50\r\n${rows.join('\r\n')}\r\n`;
}

export function asDelimited({ frequencyHz, reflectionRe, reflectionIm }: TypicalSweep): string {
  const rows = frequencyHz.map(
    (f, i) => `${f},${reflectionRe[i].toFixed(6)},${reflectionIm[i].toFixed(6)}`,
  );
  return `frequency,re,im\r\n${rows.join('\r\n')}\r\n`;
}

import type { ComplexSweep } from '../../core/sweep.ts';
import { type Complex, reflectionOf } from '../../server/demo/models/lumped.ts';
import { Random } from '../support/random.ts';
import type { Antenna, AntennaFamily } from './models/antenna-model.ts';
import { type TrueAnswers, trueAnswers, within } from './true-answers.ts';

export const swrLimits: readonly number[] = [1.5, 2, 3];

/** How the reflections were written down: not at all, or as decimals of one of two pairs. */
export type Rounding =
  | { readonly kind: 'none' }
  | { readonly kind: 're_im' | 'magnitude_angle'; readonly digits: number };

/** One random antenna, one sweep of it, and what is true of it. */
export interface BenchCase {
  readonly seed: number;
  readonly index: number;
  readonly antenna: Antenna;
  readonly referenceOhm: number;
  readonly sweep: ComplexSweep;
  readonly stepHz: number;
  /** Root-mean-square magnitude of the complex noise that was added. */
  readonly noise: number;
  readonly rounding: Rounding;
  /** Standard deviation of re and of im from noise and rounding together. */
  readonly sigma: number;
  /** The reflection before noise and rounding, at the sweep's points. */
  readonly clean: readonly Complex[];
  /** On the sweep's own range. */
  readonly truth: TrueAnswers;
  /** From a tenth of the sweep below it to a tenth above it. */
  readonly truthAround: TrueAnswers;
  /** Points inside the true SWR-2 span, or inside one loaded bandwidth where there is no such span. */
  readonly pointsInSpan: number;
  /** Whether the antenna has an SWR-2 span at all. */
  readonly hasSpan: boolean;
}

/** Whether a case is to be exact (no noise, full doubles) or as files carry it. */
export type Imperfection = 'exact' | 'as_in_files';

const LEAST_POINTS_IN_SPAN = 5;

/**
 * Case `index` of a seed: an antenna of the family, a reference, a sweep of 51 to 1601 points that
 * holds at least five points of the SWR-2 span. Where the SWR stays above 2 everywhere, the loaded
 * bandwidth (nominal frequency over Q) stands in for the span. The sweep is 0.8 to 40 times as wide
 * as the span and lies so that the minimum is inside it mostly, not always. Noise: none in an eighth
 * of the cases, else 1e-4 to 0.02 rms, log-uniform; 3 to 6 decimals of re/im, or of the magnitude
 * with two fewer of the angle in degrees (plus one).
 */
export function drawCase(
  family: AntennaFamily,
  seed: number,
  index: number,
  imperfection: Imperfection,
): BenchCase {
  const random = Random.ofCase(seed, index);
  for (let attempt = 0; attempt < 200; attempt++) {
    const made = attemptCase(family, seed, index, imperfection, random);
    if (made !== null) return made;
  }
  throw new Error(
    `No usable case of ${family.name} in 200 attempts (seed ${seed}, case ${index}).`,
  );
}

function attemptCase(
  family: AntennaFamily,
  seed: number,
  index: number,
  imperfection: Imperfection,
  random: Random,
): BenchCase | null {
  const antenna = family.draw(random);
  const referenceOhm = random.pick([50, 50, 50, 75]);
  const curve = (frequencyHz: number) => family.impedance(frequencyHz, antenna.parameters);
  const span = spanOf(antenna, referenceOhm);
  const grid = sweepGrid(antenna, span, random);
  if (grid === null) return null;
  const lowHz = grid[0];
  const highHz = grid[grid.length - 1];
  const pointsInSpan = grid.filter((f) => f >= span.lowHz && f <= span.highHz).length;
  if (pointsInSpan < LEAST_POINTS_IN_SPAN) return null;

  const clean = Array.from(grid, (f) => reflectionOf(curve(f), referenceOhm));
  const noise =
    imperfection === 'exact' || random.chance(1 / 8) ? 0 : random.logUniform(1e-4, 0.02);
  const rounding: Rounding =
    imperfection === 'exact'
      ? { kind: 'none' }
      : { kind: random.pick(['re_im', 'magnitude_angle'] as const), digits: random.integer(3, 6) };
  const { reflectionRe, reflectionIm, roundingSigma } = spoil(clean, noise, rounding, random);
  const margin = (highHz - lowHz) / 10;
  const truthAround = trueAnswers(curve, referenceOhm, lowHz - margin, highHz + margin, swrLimits);
  return {
    seed,
    index,
    antenna,
    referenceOhm,
    sweep: { phase: 'signed', frequencyHz: grid, referenceOhm, reflectionRe, reflectionIm },
    stepHz: (highHz - lowHz) / (grid.length - 1),
    noise,
    rounding,
    sigma: Math.hypot(noise / Math.SQRT2, roundingSigma),
    clean,
    truth: within(truthAround, lowHz, highHz),
    truthAround,
    pointsInSpan,
    hasSpan: span.exists,
  };
}

interface Span {
  readonly lowHz: number;
  readonly highHz: number;
  readonly exists: boolean;
}

/** The SWR-2 span around the lowest SWR of the antenna, or its stand-in. */
function spanOf(antenna: Antenna, referenceOhm: number): Span {
  const [lowHz, highHz] = antenna.validHz;
  const curve = (f: number) => antenna.family.impedance(f, antenna.parameters);
  const { minima, edges } = trueAnswers(curve, referenceOhm, lowHz, highHz, [2], 2000);
  const best = minima.reduce((least, minimum) => (minimum.swr < least.swr ? minimum : least), {
    frequencyHz: antenna.nominalHz,
    swr: Number.POSITIVE_INFINITY,
  });
  const below = edges.filter((e) => e.side === 'low' && e.frequencyHz < best.frequencyHz).at(-1);
  const above = edges.find((e) => e.side === 'high' && e.frequencyHz > best.frequencyHz);
  if (best.swr < 2 && below !== undefined && above !== undefined) {
    return { lowHz: below.frequencyHz, highHz: above.frequencyHz, exists: true };
  }
  const half = antenna.bandwidthHz / 2;
  return { lowHz: best.frequencyHz - half, highHz: best.frequencyHz + half, exists: false };
}

/** Evenly spaced whole hertz; null where five points cannot lie in the span. */
function sweepGrid(antenna: Antenna, span: Span, random: Random): Float64Array | null {
  const points = Math.round(random.logUniform(51, 1601));
  const spanWidth = span.highHz - span.lowHz;
  const [validLow, validHigh] = antenna.validHz;
  const widest = Math.min(
    (spanWidth * (points - 1)) / (LEAST_POINTS_IN_SPAN + 0.5),
    validHigh - validLow,
  );
  const width = Math.min(spanWidth * random.logUniform(0.8, 40), widest);
  const middle = (span.lowHz + span.highHz) / 2 + width * random.uniform(-0.4, 0.4);
  const step = Math.max(1, Math.round(width / (points - 1)));
  const start = Math.round(
    Math.min(Math.max(middle - width / 2, validLow), validHigh - step * (points - 1)),
  );
  if (start < validLow - 1) return null;
  return Float64Array.from({ length: points }, (_, i) => start + i * step);
}

function spoil(
  clean: readonly Complex[],
  noise: number,
  rounding: Rounding,
  random: Random,
): { reflectionRe: Float64Array; reflectionIm: Float64Array; roundingSigma: number } {
  const reflectionRe = new Float64Array(clean.length);
  const reflectionIm = new Float64Array(clean.length);
  let squares = 0;
  clean.forEach(({ re, im }, i) => {
    const noisyRe = re + (noise / Math.SQRT2) * random.gaussian();
    const noisyIm = im + (noise / Math.SQRT2) * random.gaussian();
    const written = write(noisyRe, noisyIm, rounding);
    reflectionRe[i] = written.re;
    reflectionIm[i] = written.im;
    squares += (written.re - noisyRe) ** 2 + (written.im - noisyIm) ** 2;
  });
  return { reflectionRe, reflectionIm, roundingSigma: Math.sqrt(squares / (2 * clean.length)) };
}

/** The numbers as a file carries them, read back. */
function write(re: number, im: number, rounding: Rounding): Complex {
  if (rounding.kind === 'none') return { re, im };
  const unit = 10 ** rounding.digits;
  if (rounding.kind === 're_im') {
    return { re: Math.round(re * unit) / unit, im: Math.round(im * unit) / unit };
  }
  const magnitude = Math.round(Math.hypot(re, im) * unit) / unit;
  const angleUnit = unit / 100;
  const degrees = Math.round((Math.atan2(im, re) * 180 * angleUnit) / Math.PI) / angleUnit;
  const angle = (degrees * Math.PI) / 180;
  return { re: magnitude * Math.cos(angle), im: magnitude * Math.sin(angle) };
}

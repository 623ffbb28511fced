const LIGHT_M_PER_S = 299_792_458;
const DB_PER_NEPER = 20 / Math.LN10;

/** R + jX, ohm. */
export interface Impedance {
  readonly re: number;
  readonly im: number;
}

/** G + jB, siemens, or any other complex number that is not an impedance. */
export type Complex = Impedance;

/** Two impedances one after the other. */
export function inSeries(a: Impedance, b: Impedance): Impedance {
  return { re: a.re + b.re, im: a.im + b.im };
}

/** Two impedances side by side. */
export function inParallel(a: Impedance, b: Impedance): Impedance {
  return divide(multiply(a, b), inSeries(a, b));
}

/** A series circuit of R, L and C named by its resonance: R + jRQ(u - 1/u) with u = f/f0. */
export interface SeriesResonator {
  readonly resistanceOhm: number;
  readonly resonanceHz: number;
  readonly q: number;
}

export function seriesResonator(frequencyHz: number, circuit: SeriesResonator): Impedance {
  const u = frequencyHz / circuit.resonanceHz;
  const { resistanceOhm, q } = circuit;
  return { re: resistanceOhm, im: resistanceOhm * q * (u - 1 / u) };
}

/** A parallel circuit (a trap): the dual, 1/(G + jGQ(u - 1/u)) with G = 1/R. */
export function parallelResonator(frequencyHz: number, circuit: SeriesResonator): Impedance {
  const u = frequencyHz / circuit.resonanceHz;
  return divide({ re: circuit.resistanceOhm, im: 0 }, { re: 1, im: circuit.q * (u - 1 / u) });
}

/** A coil with its loss: w L (1/Q + j). */
export function coil(frequencyHz: number, inductanceH: number, q: number): Impedance {
  const reactance = 2 * Math.PI * frequencyHz * inductanceH;
  return { re: reactance / q, im: reactance };
}

/** A capacitor without loss. */
export function capacitor(frequencyHz: number, capacitanceF: number): Impedance {
  return { re: 0, im: -1 / (2 * Math.PI * frequencyHz * capacitanceF) };
}

/** A line whose matched loss grows with the square root of frequency (conductor loss only). */
export interface FeedLine {
  readonly characteristicOhm: number;
  readonly lengthM: number;
  readonly velocityFactor: number;
  /** Matched loss of the whole length at 1 MHz, dB. */
  readonly lossDbAt1Mhz: number;
}

/**
 * Impedance at the input of a lossy line that ends in `load`:
 * Z0 (ZL + Z0 tanh gl)/(Z0 + ZL tanh gl), with Z0 = R0 (1 - j alpha/beta) for conductor loss
 * (transmission-line theory, e.g. D. M. Pozar, Microwave Engineering, sec. 2.7).
 */
export function throughLine(load: Impedance, frequencyHz: number, line: FeedLine): Impedance {
  const alpha = (line.lossDbAt1Mhz * Math.sqrt(frequencyHz / 1e6)) / DB_PER_NEPER;
  const beta = (2 * Math.PI * frequencyHz * line.lengthM) / (line.velocityFactor * LIGHT_M_PER_S);
  if (beta === 0) return load;
  const z0 = { re: line.characteristicOhm, im: (-line.characteristicOhm * alpha) / beta };
  const t = tanh(alpha, beta);
  const top = inSeries(load, multiply(z0, t));
  const bottom = inSeries(z0, multiply(load, t));
  return multiply(z0, divide(top, bottom));
}

/** (Z - Z0)/(Z + Z0) for a real reference. */
export function reflectionOf(z: Impedance, referenceOhm: number): Complex {
  return divide({ re: z.re - referenceOhm, im: z.im }, { re: z.re + referenceOhm, im: z.im });
}

export function multiply(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

export function divide(a: Complex, b: Complex): Complex {
  const scale = 1 / (b.re * b.re + b.im * b.im);
  return { re: scale * (a.re * b.re + a.im * b.im), im: scale * (a.im * b.re - a.re * b.im) };
}

/** tanh(alpha + j beta) = (sinh 2a + j sin 2b)/(cosh 2a + cos 2b), kept finite at cos 2b = -1. */
function tanh(alpha: number, beta: number): Complex {
  const denominator = 2 * Math.sinh(alpha) ** 2 + 2 * Math.cos(beta) ** 2;
  return { re: Math.sinh(2 * alpha) / denominator, im: Math.sin(2 * beta) / denominator };
}

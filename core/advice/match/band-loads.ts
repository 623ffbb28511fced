import type { Complex } from '../../line/complex.ts';
import type { ComplexSweep } from '../../sweep.ts';
import type { BandLoads } from './band-swr.ts';

/** Stands for the impedance of an ideal open, which is none. */
const OPEN_OHM = 1e12;

/** The impedances of the points of a sweep inside [lowHz, highHz]. */
export function bandLoads(sweep: ComplexSweep, lowHz: number, highHz: number): BandLoads {
  const { frequencyHz, reflectionRe, reflectionIm, referenceOhm } = sweep;
  const kept: number[] = [];
  for (let i = 0; i < frequencyHz.length; i++) {
    if (frequencyHz[i] >= lowHz && frequencyHz[i] <= highHz) kept.push(i);
  }
  const resistanceOhm = new Float64Array(kept.length);
  const reactanceOhm = new Float64Array(kept.length);
  for (const [n, i] of kept.entries()) {
    const re = reflectionRe[i];
    const im = reflectionIm[i];
    const square = (1 - re) ** 2 + im * im;
    if (square === 0) {
      resistanceOhm[n] = OPEN_OHM;
      continue;
    }
    resistanceOhm[n] = (referenceOhm * (1 - re * re - im * im)) / square;
    reactanceOhm[n] = (2 * referenceOhm * im) / square;
  }
  return {
    frequencyHz: Float64Array.from(kept, (i) => frequencyHz[i]),
    resistanceOhm,
    reactanceOhm,
  };
}

/** The impedance at one frequency, linear between its neighbours; null outside. */
export function loadAt(loads: BandLoads, hz: number): Complex | null {
  const { frequencyHz: f, resistanceOhm: r, reactanceOhm: x } = loads;
  const upper = f.findIndex((each) => each >= hz);
  if (upper < 0 || (upper === 0 && f[0] !== hz)) return null;
  if (upper === 0) return { re: r[0], im: x[0] };
  const share = (hz - f[upper - 1]) / (f[upper] - f[upper - 1]);
  return {
    re: r[upper - 1] + share * (r[upper] - r[upper - 1]),
    im: x[upper - 1] + share * (x[upper] - x[upper - 1]),
  };
}

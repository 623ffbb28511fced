import { add, type Complex, divide, magnitude, subtract } from '../../line/complex.ts';
import { halfWave } from './half-wave.ts';

/** A quarter wave of `sectionOhm` after `distance` wavelengths of the main line, load first. */
export interface QuarterWave {
  readonly distance: number;
  readonly sectionOhm: number;
}

/**
 * The two quarter-wave sections that match a load to a line: at the voltage maximum, where the
 * impedance is Z0 s, and at the minimum, Z0/s; Z1 = sqrt(Z0 R)
 * (D. M. Pozar, Microwave Engineering, sec. 2.5 and 5.4). Nothing for a matched load or one
 * without resistance.
 */
export function quarterWaves(load: Complex, lineOhm: number): readonly QuarterWave[] {
  const line = { re: lineOhm, im: 0 };
  const reflection = divide(subtract(load, line), add(load, line));
  const rho = magnitude(reflection);
  if (rho === 0 || !(load.re > 0)) return [];
  const root = Math.sqrt((1 + rho) / (1 - rho));
  const toMaximum = halfWave(Math.atan2(reflection.im, reflection.re) / 2);
  return [
    { distance: toMaximum, sectionOhm: lineOhm * root },
    { distance: (toMaximum + 0.25) % 0.5, sectionOhm: lineOhm / root },
  ];
}

/** A section of another line after a length of the main line, both in wavelengths on their lines. */
export interface SeriesSection {
  readonly distance: number;
  readonly length: number;
  readonly sectionOhm: number;
}

/**
 * The two ways to match a load by a section of line of a given other impedance put into the main
 * line: tan(l2) = +-sqrt{[(r-1)^2 + x^2]/[r(n - 1/n)^2 - (r-1)^2 - x^2]},
 * tan(l1) = [(n - r/n) tan(l2) + x]/[r + x n tan(l2) - 1], n = Z1/Z0, z = r + jx
 * (F. Regier, series-section matching, 1978; value from memory, every solution checked by Zin = Z0).
 * Nothing where the other line is too near the main one for the load.
 */
export function seriesSections(
  load: Complex,
  lineOhm: number,
  sectionOhm: number,
): readonly SeriesSection[] {
  const n = sectionOhm / lineOhm;
  const r = load.re / lineOhm;
  const x = load.im / lineOhm;
  const off = (r - 1) ** 2 + x * x;
  const room = r * (n - 1 / n) ** 2 - off;
  if (off === 0 || !(room > 0)) return [];
  const tangent = Math.sqrt(off / room);
  return [tangent, -tangent].map((t) => ({
    distance: halfWave(Math.atan2((n - r / n) * t + x, r + x * n * t - 1)),
    length: halfWave(Math.atan(t)),
    sectionOhm,
  }));
}

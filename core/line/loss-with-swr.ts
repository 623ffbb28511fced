import type { Complex } from './complex.ts';
import { add, divide, exponential, multiply, subtract } from './complex.ts';
import type { FeedLine, LineSection } from './feed-line.ts';
import { sectionLossDb } from './line.ts';
import { DB_PER_NEPER, propagation } from './propagation.ts';

/**
 * Total loss of a line with a mismatched load, dB, by the handbook form for a real characteristic
 * impedance: 10 log10 {(a^2 - rho^2)/[a (1 - rho^2)]}, a = 10^(matched loss/10), rho = |reflection|
 * of the load on the line (amateur handbooks; the power form of D. M. Pozar, Microwave Engineering,
 * sec. 2.7). Null where rho >= 1.
 */
export function handbookTotalLossDb(matchedDb: number, rho: number): number | null {
  if (!(rho < 1)) return null;
  const a = 10 ** (matchedDb / 10);
  return 10 * Math.log10((a * a - rho * rho) / (a * (1 - rho * rho)));
}

/** SWR at the load from SWR at the input of a matched-impedance line; null where none is possible. */
export function swrAtLoad(swrAtInput: number, matchedDb: number): number | null {
  const rho = ((swrAtInput - 1) / (swrAtInput + 1)) * 10 ** (matchedDb / 10);
  return rho < 1 ? (1 + rho) / (1 - rho) : null;
}

/** What a wave meets on its way through a line to a load of known reflection. */
export interface LossThroughLine {
  /** Power in over power out, dB; null where the load would give power back. */
  readonly totalLossDb: number | null;
  /** At the analyzer's end, re the same real reference. */
  readonly reflection: Complex;
}

/**
 * Loss of every section with its complex characteristic impedance, load first: the net powers are
 * Re{(1 - |g|^2 + 2j Im g)/Zc*} e^(2 alpha x) with g the reflection on the section (the general
 * formula |cosh gl + (ZL/Z0) sinh gl|^2 Re Zin/Re ZL in wave form, so that opens are finite).
 */
export function lossThroughLine(
  line: FeedLine,
  frequencyHz: number,
  load: Complex,
  referenceOhm: number,
): LossThroughLine {
  let reflection = load;
  let totalLossDb: number | null = 0;
  for (const section of line.sections.toReversed()) {
    const step = throughSection(section, frequencyHz, reflection, referenceOhm);
    reflection = step.reflection;
    totalLossDb =
      totalLossDb === null || step.totalLossDb === null ? null : totalLossDb + step.totalLossDb;
  }
  return { totalLossDb, reflection };
}

function throughSection(
  section: LineSection,
  frequencyHz: number,
  load: Complex,
  referenceOhm: number,
): LossThroughLine {
  const { beta, characteristic } = propagation(section.cable, frequencyHz);
  const nepers = sectionLossDb(section, frequencyHz) / DB_PER_NEPER;
  const reference = { re: referenceOhm, im: 0 };
  const one = { re: 1, im: 0 };
  const k = divide(subtract(reference, characteristic), add(reference, characteristic));
  const onLine = divide(add(load, k), add(one, multiply(k, load)));
  const angle = -2 * beta * section.lengthM;
  const atInput = multiply(onLine, exponential({ re: -2 * nepers, im: angle }));
  const out = netPower(onLine, characteristic);
  const into = netPower(atInput, characteristic) * Math.exp(2 * nepers);
  return {
    totalLossDb: out > 0 && into > 0 ? 10 * Math.log10(into / out) : null,
    reflection: divide(subtract(atInput, k), subtract(one, multiply(k, atInput))),
  };
}

/** Proportional to Re(V I*) where the wave on a line of complex impedance has the reflection g. */
function netPower(g: Complex, characteristic: Complex): number {
  const real = 1 - (g.re * g.re + g.im * g.im);
  return real * characteristic.re - 2 * g.im * characteristic.im;
}

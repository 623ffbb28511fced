import { halfWidthAt, type PiecewiseModel } from './piecewise-model.ts';
import type { Functional, RationalValue } from './rational-value.ts';
import type { Resonance } from './summary.ts';

/** Step of the numerical derivatives, as a part of what is moved. */
const relativeStep = 1e-6;

/**
 * Q of an impedance from its slope (A. D. Yaghjian, S. R. Best, IEEE Trans. Antennas and
 * Propagation 53(4), 2005): Q = (ω/2R) sqrt(R'² + (X' + |X|/ω)²), primes by ω. Half-width to first
 * order in value and slope of the reflection. Null where the resistance is not positive.
 */
export function impedanceQ(
  model: PiecewiseModel,
  frequencyHz: number,
  value: RationalValue,
  referenceOhm: number,
): Pick<Resonance, 'q' | 'qU95'> {
  const point = [value.re, value.im, value.slopeRe, value.slopeIm] as const;
  const q = qOf(frequencyHz, referenceOhm, ...point);
  if (q === null) return { q: null, qU95: null };
  const derivative = (which: number, scale: number) => {
    const step = relativeStep * scale || relativeStep;
    const up = point.map((x, i) => (i === which ? x + step : x)) as [
      number,
      number,
      number,
      number,
    ];
    const down = point.map((x, i) => (i === which ? x - step : x)) as [
      number,
      number,
      number,
      number,
    ];
    const high = qOf(frequencyHz, referenceOhm, ...up) ?? q;
    const low = qOf(frequencyHz, referenceOhm, ...down) ?? q;
    return (high - low) / (2 * step);
  };
  const slopeScale = Math.hypot(value.slopeRe, value.slopeIm);
  const functional: Functional = {
    valueRe: derivative(0, 1),
    valueIm: -derivative(1, 1),
    slopeRe: derivative(2, slopeScale),
    slopeIm: -derivative(3, slopeScale),
  };
  return { q, qU95: halfWidthAt(model, frequencyHz, functional) };
}

function qOf(
  frequencyHz: number,
  referenceOhm: number,
  re: number,
  im: number,
  slopeRe: number,
  slopeIm: number,
): number | null {
  const d = (1 - re) ** 2 + im * im;
  const resistance = (referenceOhm * (1 - re * re - im * im)) / d;
  if (!(resistance > 0)) return null;
  const reactance = (2 * referenceOhm * im) / d;
  // Z' = 2 Z0 Γ' / (1 - Γ)².
  const sr = (1 - re) ** 2 - im * im;
  const si = -2 * (1 - re) * im;
  const resistanceSlope = (2 * referenceOhm * (slopeRe * sr + slopeIm * si)) / (d * d);
  const reactanceSlope = (2 * referenceOhm * (slopeIm * sr - slopeRe * si)) / (d * d);
  const stored = reactanceSlope + Math.abs(reactance) / frequencyHz;
  return (frequencyHz / (2 * resistance)) * Math.hypot(resistanceSlope, stored);
}

import type { Quantity } from './quantities.ts';
import type { Recipe } from './recipes.ts';

/**
 * Computes one point: writes the reflection's parts to out[0] and out[1] (its magnitude to out[0]
 * where no phase is known). Units: ohm, siemens, radian, dB, fractions of one. Where two
 * magnitudes contradict each other out[1] is NaN and out[0] is the real reflection of the SWR or
 * impedance that was measured.
 */
type ToReflection = (
  first: number,
  second: number,
  referenceOhm: number,
  out: Float64Array,
) => void;

/** How a recipe computes a point. */
export function converterOf({ kind, phase, from }: Recipe): ToReflection {
  const convert =
    kind === 'match' || kind === 'reflection_polar' || kind.endsWith('_and_match')
      ? matchConverter(kind, from)
      : plain[kind];
  if (phase !== 'unsigned') return convert;
  return (first, second, referenceOhm, out) => {
    convert(first, second, referenceOhm, out);
    out[1] = Math.abs(out[1]);
  };
}

const plain: Readonly<Record<string, ToReflection>> = {
  reflection_parts: (re, im, _reference, out) => {
    out[0] = re;
    out[1] = im;
  },
  series: fromImpedance,
  impedance_polar: (size, angle, reference, out) =>
    fromImpedance(size * Math.cos(angle), size * Math.sin(angle), reference, out),
  admittance: fromAdmittance,
  parallel: (resistance, reactance, reference, out) => {
    if (resistance !== 0 && reactance !== 0) {
      fromAdmittance(1 / resistance, -1 / reactance, reference, out);
      return;
    }
    out[0] = -1;
    out[1] = 0;
  },
  resistance_and_impedance: (resistance, size, reference, out) => {
    const square = (size - resistance) * (size + resistance);
    fromImpedance(resistance, Math.sqrt(Math.max(0, square)), reference, out);
    if (square < 0) out[1] = Number.NaN;
  },
};

function matchConverter(kind: Recipe['kind'], from: readonly Quantity[]): ToReflection {
  if (kind === 'match') {
    const toMagnitude = magnitudeFrom(from[0]);
    return (value, _none, _reference, out) => {
      out[0] = toMagnitude(value);
      out[1] = 0;
    };
  }
  if (kind === 'reflection_polar') {
    const toMagnitude = magnitudeFrom(from[0]);
    return (value, angle, _reference, out) => {
      const rho = toMagnitude(value);
      out[0] = rho * Math.cos(angle);
      out[1] = rho * Math.sin(angle);
    };
  }
  const toMagnitude = magnitudeFrom(from[1]);
  const solve = kind === 'impedance_and_match' ? fromSizeAndMatch : fromResistanceAndMatch;
  return (value, match, reference, out) => solve(value, toMagnitude(match), reference, out);
}

/** |Γ| from a way to say it. SWR s: (s-1)/(s+1); return loss L in dB: 10^(-L/20). */
export function magnitudeFrom(quantity: Quantity): (value: number) => number {
  if (quantity === 'swr') return (swr) => (swr - 1) / (swr + 1);
  if (quantity === 'return_loss') return (loss) => 10 ** (-loss / 20);
  if (quantity === 'reflection_db') return (level) => 10 ** (level / 20);
  if (quantity === 'reflected_power') return Math.sqrt;
  return (magnitude) => magnitude;
}

/** Γ = (Z - Z0)/(Z + Z0). */
function fromImpedance(
  resistance: number,
  reactance: number,
  referenceOhm: number,
  out: Float64Array,
): void {
  const sum = resistance + referenceOhm;
  const square = sum * sum + reactance * reactance;
  out[0] = ((resistance - referenceOhm) * sum + reactance * reactance) / square;
  out[1] = (2 * referenceOhm * reactance) / square;
}

/** Γ = (1 - Y Z0)/(1 + Y Z0). */
function fromAdmittance(
  conductance: number,
  susceptance: number,
  referenceOhm: number,
  out: Float64Array,
): void {
  const g = conductance * referenceOhm;
  const b = susceptance * referenceOhm;
  const square = (1 + g) * (1 + g) + b * b;
  out[0] = ((1 - g) * (1 + g) - b * b) / square;
  out[1] = (-2 * b) / square;
}

/**
 * From |Z| and ρ = |Γ|: R = (|Z|² + Z0²)(1 - ρ²)/(2 Z0 (1 + ρ²)), which with ρ = (s-1)/(s+1) is
 * (|Z|² + Z0²) s/(Z0 (s² + 1)); then X² = |Z|² - R².
 */
function fromSizeAndMatch(
  size: number,
  rho: number,
  referenceOhm: number,
  out: Float64Array,
): void {
  const sum = size * size + referenceOhm * referenceOhm;
  const resistance = (sum * (1 - rho * rho)) / (2 * referenceOhm * (1 + rho * rho));
  const square = (size - resistance) * (size + resistance);
  if (square >= 0) {
    fromImpedance(resistance, Math.sqrt(square), referenceOhm, out);
    return;
  }
  out[0] = size < referenceOhm ? -rho : rho;
  out[1] = Number.NaN;
}

/**
 * From R and ρ = |Γ|: X² (1 - ρ²) = ρ² (R + Z0)² - (R - Z0)², solved for the parts of Γ: from
 * R/Z0 = (1 - ρ²)/(1 - 2a + ρ²) follows a = Re Γ = (1 + ρ² - Z0 (1 - ρ²)/R)/2, Im² = ρ² - a².
 */
function fromResistanceAndMatch(
  resistance: number,
  rho: number,
  referenceOhm: number,
  out: Float64Array,
): void {
  const square = rho * rho;
  const re = (1 + square - (referenceOhm * (1 - square)) / resistance) / 2;
  const imSquare = (rho - re) * (rho + re);
  if (imSquare >= 0) {
    out[0] = re;
    out[1] = Math.sqrt(imSquare);
    return;
  }
  out[0] = resistance < referenceOhm ? -rho : rho;
  out[1] = Number.NaN;
}

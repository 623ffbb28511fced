import type { MatchElement } from './element.ts';

/** IEC 60063 series E24: 24 preferred values to a decade. */
const E24 = [
  1, 1.1, 1.2, 1.3, 1.5, 1.6, 1.8, 2, 2.2, 2.4, 2.7, 3, 3.3, 3.6, 3.9, 4.3, 4.7, 5.1, 5.6, 6.2, 6.8,
  7.5, 8.2, 9.1, 10,
] as const;

/** Lines that can be had or made by two in parallel, ohm (common practice, no source). */
export const standardLineOhm = [25, 37.5, 50, 75, 100, 150, 300, 400, 450, 600] as const;

/** Impedance ratios of common broadband transformers (common practice, no source). */
export const standardRatios = [1.5, 2, 2.25, 4, 6.25, 9, 12.25, 16, 49, 64] as const;

/** The E24 value nearest by ratio to a positive value. */
export function nearestE24(value: number): number {
  const exponent = Math.floor(Math.log10(value));
  const mantissa = value / 10 ** exponent;
  const nearest = nearestByRatio(mantissa, E24);
  return Number(`${nearest}e${exponent}`);
}

/** The line impedance that can be had nearest to the one asked. */
export function nearestLineOhm(ohm: number): number {
  return nearestByRatio(ohm, standardLineOhm);
}

/** A part as it can be had: E24 for coils and capacitors, a standard line for a line; else as it is. */
export function nearestElement(element: MatchElement): MatchElement {
  switch (element.kind) {
    case 'series_inductor':
    case 'shunt_inductor':
      return { ...element, inductanceH: nearestE24(element.inductanceH) };
    case 'series_capacitor':
    case 'shunt_capacitor':
      return { ...element, capacitanceF: nearestE24(element.capacitanceF) };
    case 'line':
      return { ...element, characteristicOhm: nearestLineOhm(element.characteristicOhm) };
    default:
      return element;
  }
}

function nearestByRatio(value: number, choices: readonly number[]): number {
  return choices.reduce((best, choice) =>
    Math.abs(Math.log(choice / value)) < Math.abs(Math.log(best / value)) ? choice : best,
  );
}

import { scaleLinear } from 'd3-scale';
import type { NumberText } from './number-text.ts';

/** Kilohertz up to 3000 kHz, megahertz above (ITU Radio Regulations, No. 2.1). */
export interface FrequencyUnit {
  readonly name: 'kHz' | 'MHz';
  readonly hertz: number;
}

/** The unit for frequencies up to this. */
export function frequencyUnit(highestHz: number): FrequencyUnit {
  return highestHz <= 3e6 ? { name: 'kHz', hertz: 1e3 } : { name: 'MHz', hertz: 1e6 };
}

/**
 * A frequency with its unit: to the kilohertz in megahertz, to a tenth in kilohertz, and coarser
 * where that would be more than two digits of its 95 % half-width (GUM, JCGM 100:2008, 7.2.6).
 */
export function frequencyText(
  hz: number,
  u95Hz: number | null,
  { name, hertz }: FrequencyUnit,
  numbers: NumberText,
): string {
  const finest = name === 'MHz' ? 3 : 1;
  const known = u95Hz === null || !(u95Hz > 0) ? finest : 1 - Math.floor(Math.log10(u95Hz / hertz));
  const decimals = Math.max(0, Math.min(finest, known));
  return `${numbers.fixed(hz / hertz, decimals)} ${name}`;
}

export interface Tick {
  readonly at: number;
  readonly text: string;
}

/** Round values of a linear axis, about one each `everyPx`, in the unit of its text. */
export function linearTicks(
  low: number,
  high: number,
  lengthPx: number,
  everyPx: number,
  unit: number,
  numbers: NumberText,
): readonly Tick[] {
  const count = Math.max(2, Math.floor(lengthPx / everyPx));
  const values = scaleLinear()
    .domain([low / unit, high / unit])
    .ticks(count);
  const step = values.length > 1 ? values[1] - values[0] : 1;
  const decimals = Math.min(6, Math.max(0, -Math.floor(Math.log10(step) + 1e-9)));
  return values.map((value) => ({ at: value * unit, text: numbers.fixed(value, decimals) }));
}

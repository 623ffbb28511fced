import { summarise } from '../../core/analysis/summarise.ts';
import type { Summary } from '../../core/analysis/summary.ts';
import { readSweep } from '../../core/formats/read-sweep.ts';
import { type Impedance, reflectionOf } from '../../server/demo/models/lumped.ts';

/** An impedance over a grid as a Touchstone file against `referenceOhm`, in full precision. */
export function touchstoneFile(
  impedanceAt: (frequencyHz: number) => Impedance,
  frequenciesHz: readonly number[],
  referenceOhm: number,
): Uint8Array {
  const rows = frequenciesHz.map((hz) => {
    const { re, im } = reflectionOf(impedanceAt(hz), referenceOhm);
    return `${hz} ${re} ${im}`;
  });
  return new TextEncoder().encode([`# HZ S RI R ${referenceOhm}`, ...rows, ''].join('\n'));
}

/** Evenly spaced frequencies, both ends included, hertz. */
export function evenly(lowHz: number, highHz: number, points: number): readonly number[] {
  return Array.from({ length: points }, (_, i) => lowHz + ((highHz - lowHz) * i) / (points - 1));
}

/** What the whole core makes of a file: read, then summarised against the file's reference. */
export function summaryOfFile(bytes: Uint8Array, maxSwr = 2): Summary {
  const read = readSweep(bytes, { fileName: 'reference.s1p' });
  if (!read.ok) throw new Error(read.error.detail);
  const { sweep, assumptions } = read.value;
  return summarise(sweep, { swrLimits: [maxSwr], assumptions });
}

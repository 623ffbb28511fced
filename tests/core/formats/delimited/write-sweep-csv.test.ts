import { describe, expect, it } from 'vitest';
import {
  sweepCsvColumns,
  writeSweepCsv,
} from '../../../../core/formats/delimited/write-sweep-csv.ts';
import type { Sweep } from '../../../../core/sweep.ts';
import { assumedIn, readText } from '../../../support/reading.ts';

const frequencyHz = Float64Array.of(7_000_000, 7_100_000.5, 7_200_000);
const signed: Sweep = {
  phase: 'signed',
  frequencyHz,
  referenceOhm: 50,
  reflectionRe: Float64Array.of(0.1, -0.30000000000000004, 1),
  reflectionIm: Float64Array.of(-0, 0.25, 0),
};

function readBack(sweep: Sweep): Sweep {
  return readText(writeSweepCsv(sweep), { columns: sweepCsvColumns(sweep) }).sweep;
}

describe('a sweep written as comma-separated text', () => {
  it('has a header, CR LF, and empty cells where there is no value', () => {
    const lines = writeSweepCsv(signed).split('\r\n');
    expect(lines[0]).toBe(
      'frequency_hz,reflection_re,reflection_im,resistance_ohm,reactance_ohm,swr',
    );
    // Z = 50 (1 + 0.1)/(1 - 0.1), SWR = 1.1/0.9 (textbook identities).
    const [, , , resistance, , swr] = lines[1].split(',').map(Number);
    expect(resistance).toBeCloseTo(550 / 9, 12);
    expect(swr).toBeCloseTo(11 / 9, 12);
    expect(lines[3]).toBe('7200000,1,0,,,');
    expect(lines[4]).toBe('');
  });

  it.each<[string, Sweep]>([
    ['signed', signed],
    ['unsigned', { ...signed, phase: 'unsigned', reflectionIm: Float64Array.of(0, 0.25, 1e-17) }],
    [
      'none',
      {
        phase: 'none',
        frequencyHz,
        referenceOhm: 75.5,
        reflectionMagnitude: Float64Array.of(0, 0.30000000000000004, 1.25),
      },
    ],
  ])('reads back bit for bit with its mapping, phase %s', (_, sweep) => {
    expect(readBack(sweep)).toEqual(sweep);
  });

  it('reads back without a mapping too, its own columns confirming each other', () => {
    const read = readText(writeSweepCsv(resonator(50)));
    expect(read.sweep).toEqual(resonator(50));
    expect(read.columns).toContain('reference=50');
    expect(assumedIn(read)).toEqual(['columns_inferred']);
    expect(readText(writeSweepCsv(resonator(75))).sweep.referenceOhm).toBe(75);
  });
});

function resonator(referenceOhm: number): Sweep {
  const steps = Array.from({ length: 9 }, (_, i) => i - 4);
  return {
    phase: 'signed',
    referenceOhm,
    frequencyHz: Float64Array.from(steps, (step) => 7_100_000 + 10_000 * step),
    reflectionRe: Float64Array.from(steps, (step) => 0.1 + step * step * 0.01),
    reflectionIm: Float64Array.from(steps, (step) => 0.1 * step),
  };
}

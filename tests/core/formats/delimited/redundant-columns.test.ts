import { describe, expect, it } from 'vitest';
import { assumedIn, complexOf, readText, refusalOf, scalarOf } from '../../../support/reading.ts';

/** An SWR from an impedance: F = (R² + X² + Z0²)/(2 R Z0), s = F + sqrt(F² - 1) (textbook identity). */
function swrOf(resistance: number, reactance: number, referenceOhm: number): number {
  const f =
    (resistance ** 2 + reactance ** 2 + referenceOhm ** 2) / (2 * resistance * referenceOhm);
  return f + Math.sqrt(f * f - 1);
}

interface Row {
  readonly mhz: number;
  readonly r: number;
  readonly x: number;
}

/** A series resonator at 14.2 MHz. */
const rows: readonly Row[] = Array.from({ length: 41 }, (_, i) => {
  const mhz = 14 + i / 100;
  return { mhz, r: 40 + i / 10, x: 300 * (mhz / 14.2 - 14.2 / mhz) };
});

function table(cells: (row: Row, index: number) => readonly (string | number)[]): string {
  return rows.map((row, i) => [row.mhz.toFixed(2), ...cells(row, i)].join(',')).join('\n');
}

const seriesAnd = (more: string) => ({ columns: `frequency:MHz,resistance,reactance,${more}` });

describe('a redundant column', () => {
  it.each([
    ['swr', (r: number, x: number) => swrOf(r, x, 50).toFixed(2)],
    ['impedance_magnitude', (r: number, x: number) => Math.hypot(r, x).toFixed(1)],
    [
      'impedance_angle:deg',
      (r: number, x: number) => ((Math.atan2(x, r) * 180) / Math.PI).toFixed(1),
    ],
    [
      'impedance_angle_magnitude:deg',
      (r: number, x: number) => Math.abs((Math.atan2(x, r) * 180) / Math.PI).toFixed(1),
    ],
    ['reactance_magnitude', (_: number, x: number) => Math.abs(x).toFixed(0)],
    ['conductance:mS', (r: number, x: number) => ((1000 * r) / (r * r + x * x)).toFixed(3)],
    ['susceptance:mS', (r: number, x: number) => ((-1000 * x) / (r * r + x * x)).toFixed(3)],
    ['parallel_resistance', (r: number, x: number) => ((r * r + x * x) / r).toFixed(1)],
    ['parallel_reactance:kohm', (r: number, x: number) => ((r * r + x * x) / x / 1000).toFixed(4)],
    ['return_loss', (r: number, x: number) => lossOf(r, x).toFixed(2)],
    ['reflection_db', (r: number, x: number) => (-lossOf(r, x)).toFixed(2)],
    ['reflection_magnitude', (r: number, x: number) => (10 ** (-lossOf(r, x) / 20)).toFixed(3)],
    [
      'reflected_power:percent',
      (r: number, x: number) => (100 * 10 ** (-lossOf(r, x) / 10)).toFixed(1),
    ],
    ['reflection_angle:deg', (r: number, x: number) => reflectionAngle(r, x).toFixed(1)],
    [
      'reflection_angle_magnitude:deg',
      (r: number, x: number) => Math.abs(reflectionAngle(r, x)).toFixed(1),
    ],
  ])('%s agrees with the impedance within its rounding', (name, cellOf) => {
    const text = table(({ r, x }) => [r.toFixed(1), x.toFixed(1), cellOf(r, x)]);
    const read = readText(text, seriesAnd(name));
    expect(read.sweep.frequencyHz).toHaveLength(41);
    expect(assumedIn(read)).toEqual([]);
    const wrong = table(({ r, x }) => [
      r.toFixed(1),
      x.toFixed(1),
      Number(cellOf(r, x)) * 1.5 + 1.1,
    ]);
    expect(refusalOf(wrong, seriesAnd(name)).code).toMatch(/^columns_contradict$|_sign$|^angle_/);
  });

  it('that contradicts the others is refused, with the reference that would fit', () => {
    const text = table(({ r, x }) => [r.toFixed(2), x.toFixed(2), swrOf(r, x, 75).toFixed(2)]);
    const error = refusalOf(text, seriesAnd('swr'));
    expect(error).toMatchObject({ code: 'columns_contradict', line: 1 });
    expect(error.remedy).toContain('reference=75');
    const read = readText(text, seriesAnd('swr,reference=75'));
    expect(read.sweep.referenceOhm).toBe(75);
  });

  it('that fits at no reference is refused', () => {
    const text = table(({ r, x }, i) => [r.toFixed(2), x.toFixed(2), 2 + (i % 7)]);
    const error = refusalOf(text, seriesAnd('swr'));
    expect(error.code).toBe('columns_contradict');
    expect(error.remedy).not.toContain('would agree');
  });

  it('that differs in a single row is passed over there, and that is told', () => {
    const text = table(({ r, x }, i) => [r, x, i === 20 ? 7 : swrOf(r, x, 50).toFixed(2)]);
    const read = readText(text, seriesAnd('swr'));
    expect(read.assumptions).toEqual([
      expect.objectContaining({ code: 'columns_differ_in_places', line: 21 }),
    ]);
  });

  it('that stops at its greatest reading is not held against the others there', () => {
    const text = table(({ r, x }) => [r, x, Math.min(1.5, swrOf(r, x, 50)).toFixed(2)]);
    expect(assumedIn(readText(text, seriesAnd('swr')))).toEqual([]);
  });

  it('may have no number in a row: the row is kept', () => {
    const text = table(({ r, x }, i) => [r, x, i % 2 === 0 ? '>10' : swrOf(r, x, 50).toFixed(2)]);
    const read = readText(text, seriesAnd('swr'));
    expect(read.sweep.frequencyHz).toHaveLength(41);
  });

  it('may lose its trailing zeros or be written with exponents', () => {
    const text = table(({ r, x }) => [
      r.toExponential(6),
      x.toExponential(6),
      String(Number(swrOf(r, x, 50).toFixed(2))),
    ]);
    expect(assumedIn(readText(text, seriesAnd('swr')))).toEqual([]);
  });

  it('fixes the reference of a reflection, so that none is assumed', () => {
    const text = table(({ r, x }) => {
      const d = (r + 50) ** 2 + x * x;
      return [(r * r - 2500 + x * x) / d, (100 * x) / d, r.toFixed(2)];
    });
    const columns = 'frequency:MHz,reflection_re,reflection_im,resistance';
    expect(assumedIn(readText(text, { columns }))).toEqual([]);
    expect(assumedIn(readText(text, { columns: columns.replace('resistance', 'skip') }))).toEqual([
      'reference_assumed',
    ]);
  });

  it('confirms a mismatch that is written twice', () => {
    const text = table(({ r, x }) => [swrOf(r, x, 50).toFixed(3), lossOf(r, x).toFixed(3)]);
    const read = readText(text, { columns: 'frequency:MHz,swr,return_loss,reference=50' });
    // The return loss is the finer of the two and is taken.
    const [first] = scalarOf(read).reflectionMagnitude;
    expect(first).toBeCloseTo(10 ** (-Number(lossOf(rows[0].r, rows[0].x).toFixed(3)) / 20), 14);
  });

  it('with an open end beside it says nothing there', () => {
    const text = '14,1,0,inf\n14.1,1,0,---\n14.2,0.5,0,3\n';
    const columns = 'frequency:MHz,reflection_re,reflection_im,swr,reference=50';
    expect(complexOf(readText(text, { columns })).reflectionRe[0]).toBe(1);
    const open = '14,1,0,99\n14.1,0.5,0,3\n';
    expect(refusalOf(open, { columns }).code).toBe('columns_contradict');
  });
});

function lossOf(r: number, x: number): number {
  const s = swrOf(r, x, 50);
  return 20 * Math.log10((s + 1) / (s - 1));
}

function reflectionAngle(r: number, x: number): number {
  return (Math.atan2(100 * x, r * r + x * x - 2500) * 180) / Math.PI;
}

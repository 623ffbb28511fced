import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, type Complex, divide, multiply, subtract } from '../../../../core/line/complex.ts';
import { taken } from './reading.ts';

// A two-port closed at its other port by that port's reference, worked out by circuit theory alone:
// the immittance seen is p11 - p12 p21/(p22 + termination) and likewise from the other side.

const part = fc.double({ min: -3, max: 3, noNaN: true });
const complex = fc.record({ re: part, im: part }).map(({ re, im }): Complex => ({ re, im }));
const ohms = fc.double({ min: 5, max: 300, noNaN: true });

type Parameter = 'Z' | 'Y' | 'H' | 'G';

/** Whether a port's own parameter is an impedance; else it is an admittance. */
const isImpedance: Readonly<Record<Parameter, readonly [boolean, boolean]>> = {
  Z: [true, true],
  Y: [false, false],
  H: [true, false],
  G: [false, true],
};

function seen(
  parameter: Parameter,
  port: 1 | 2,
  [p11, p12, p21, p22]: readonly Complex[],
  reference: readonly [number, number],
): Complex {
  const other = port === 1 ? 1 : 0;
  const termination = isImpedance[parameter][other] ? reference[other] : 1 / reference[other];
  const [own, opposite] = port === 1 ? [p11, p22] : [p22, p11];
  const far = add(opposite, { re: termination, im: 0 });
  return subtract(own, divide(multiply(p12, p21), far));
}

function reflection(immittance: Complex, hasOhms: boolean, reference: number): Complex {
  const one: Complex = { re: reference, im: 0 };
  if (hasOhms) return divide(subtract(immittance, one), add(immittance, one));
  const y0: Complex = { re: 1 / reference, im: 0 };
  return divide(subtract(y0, immittance), add(y0, immittance));
}

const row = (entries: readonly Complex[]) => entries.map(({ re, im }) => `${re} ${im}`).join(' ');

describe.each<Parameter>(['Z', 'Y', 'H', 'G'])('a two-port of %s-parameters', (parameter) => {
  it.each([1, 2] as const)('has the reflection at port %d that circuit theory gives', (port) => {
    fc.assert(
      fc.property(fc.tuple(complex, complex, complex, complex), ohms, ohms, (entries, r1, r2) => {
        const [p11, p12, p21, p22] = entries;
        const head = `[Version] 2.1\n# MHz ${parameter} RI\n[Number of Ports] 2\n[Two-Port Data Order] 12_21\n[Number of Frequencies] 1\n`;
        const text = `${head}[Reference] ${r1} ${r2}\n[Network Data]\n14 ${row([p11, p12, p21, p22])}\n[End]\n`;
        const immittance = seen(parameter, port, entries, [r1, r2]);
        const own = port === 1 ? r1 : r2;
        const expected = reflection(immittance, isImpedance[parameter][port - 1], own);
        const size = Math.hypot(expected.re, expected.im);
        fc.pre(Number.isFinite(size) && size < 1e3);
        const { sweep } = taken(text, { port });
        expect(sweep.referenceOhm).toBe(own);
        const scale = 1e-8 * (1 + size * size);
        expect(Math.abs(sweep.reflectionRe[0] - expected.re)).toBeLessThan(scale);
        expect(Math.abs(sweep.reflectionIm[0] - expected.im)).toBeLessThan(scale);
      }),
    );
  });

  it('reads the same if version 1 has it normalised', () => {
    const reference = 25;
    const factors: Readonly<Record<Parameter, readonly [number, number, number]>> = {
      Z: [reference, reference, reference],
      Y: [1 / reference, 1 / reference, 1 / reference],
      H: [reference, 1, 1 / reference],
      G: [1 / reference, 1, reference],
    };
    const [f11, f12, f22] = factors[parameter];
    const normalised = [1.5, 0.25, 0.5, 2];
    const physical = [1.5 * f11, 0.25 * f12, 0.5 * f12, 2 * f22];
    const pairs = (values: readonly number[]) => values.map((value) => `${value} 0`).join(' ');
    const one = `# MHz ${parameter} RI R ${reference}\n14 ${pairs(normalised)}\n`;
    const two = `[Version] 2.0\n# MHz ${parameter} RI R ${reference}\n[Number of Ports] 2\n[Two-Port Data Order] 21_12\n[Number of Frequencies] 1\n[Network Data]\n14 ${pairs(physical)}\n[End]\n`;
    for (const port of [1, 2] as const) {
      const first = taken(one, { port }).sweep;
      const second = taken(two, { port }).sweep;
      expect(first.reflectionRe[0]).toBeCloseTo(second.reflectionRe[0], 13);
      expect(first.reflectionIm[0]).toBeCloseTo(second.reflectionIm[0], 13);
    }
  });
});

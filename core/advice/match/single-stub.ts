import { type Complex, reciprocal, scale } from '../../line/complex.ts';
import { halfWave } from './half-wave.ts';

/** A stub on a line before a load, lengths in wavelengths on the line. */
export interface SingleStub {
  readonly placement: 'shunt' | 'series';
  readonly end: 'open' | 'short';
  /** From the load to the stub. */
  readonly distance: number;
  readonly length: number;
}

/**
 * The four single stubs (two places, open and shorted) that match `load` to a line
 * (D. M. Pozar, Microwave Engineering, sec. 5.2: t = tan(2 pi d) from the conductance being 1). A
 * series stub is the same problem with impedance and admittance, open and short exchanged.
 */
export function singleStubs(
  load: Complex,
  lineOhm: number,
  placement: 'shunt' | 'series',
): readonly SingleStub[] {
  const normalised = scale(load, 1 / lineOhm);
  const z = placement === 'shunt' ? normalised : reciprocal(normalised);
  return tangents(z).flatMap((t) => {
    const distance = halfWave(Math.atan(t));
    const b = susceptanceAt(z, t);
    // an open shunt stub has tan(2 pi l), a shorted one -cot(2 pi l); both must make -b
    const opened = halfWave(-Math.atan(b));
    const shorted = halfWave(Math.atan2(1, b));
    const [open, short] = placement === 'shunt' ? [opened, shorted] : [shorted, opened];
    return [
      { placement, end: 'open', distance, length: open } as const,
      { placement, end: 'short', distance, length: short } as const,
    ];
  });
}

function tangents({ re: r, im: x }: Complex): readonly number[] {
  if (Math.abs(r - 1) < 1e-12) return x === 0 ? [] : [-x / 2];
  const root = Math.sqrt(r * ((1 - r) ** 2 + x * x));
  return [(x + root) / (r - 1), (x - root) / (r - 1)];
}

/** Normalised susceptance where t = tan(2 pi d) from a normalised impedance (Pozar, eq. 5.8b by memory). */
function susceptanceAt({ re: r, im: x }: Complex, t: number): number {
  const sum = x + t;
  return (r * r * t - (1 - x * t) * sum) / (r * r + sum * sum);
}

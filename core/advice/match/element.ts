import { add, type Complex, divide, multiply, reciprocal, scale } from '../../line/complex.ts';
import { LIGHT_M_PER_S } from '../../line/propagation.ts';

/** One part of a matching network. Networks list their parts from the load to the source. */
export type MatchElement =
  | { readonly kind: 'series_inductor' | 'shunt_inductor'; readonly inductanceH: number }
  | { readonly kind: 'series_capacitor' | 'shunt_capacitor'; readonly capacitanceF: number }
  | LineElement
  | (Omit<LineElement, 'kind'> & {
      readonly kind: 'shunt_stub' | 'series_stub';
      readonly end: 'open' | 'short';
    })
  | TransformerElement;

export interface LineElement {
  readonly kind: 'line';
  readonly characteristicOhm: number;
  readonly lengthM: number;
  readonly velocityFactor: number;
}

/** An ideal transformer: the load appears multiplied by `impedanceRatio`. */
export interface TransformerElement {
  readonly kind: 'transformer';
  readonly impedanceRatio: number;
}

/** Quality factors of coils and capacitors, taken as the same at all frequencies. */
export interface ComponentQ {
  readonly inductor: number;
  readonly capacitor: number;
}

/** What a part makes of an impedance, and the share of the power that leaves it at the load's side. */
export interface Transformed {
  readonly impedance: Complex;
  readonly efficiency: number;
}

/** Impedance at the source's side of a part that ends in `load`; lines and transformers lose nothing. */
export function throughElement(
  element: MatchElement,
  load: Complex,
  frequencyHz: number,
  q: ComponentQ,
): Transformed {
  const omega = 2 * Math.PI * frequencyHz;
  switch (element.kind) {
    case 'series_inductor': {
      const reactance = omega * element.inductanceH;
      return inSeries(load, { re: reactance / q.inductor, im: reactance });
    }
    case 'series_capacitor': {
      const reactance = 1 / (omega * element.capacitanceF);
      return inSeries(load, { re: reactance / q.capacitor, im: -reactance });
    }
    case 'shunt_inductor': {
      const reactance = omega * element.inductanceH;
      return inParallel(load, reciprocal({ re: reactance / q.inductor, im: reactance }));
    }
    case 'shunt_capacitor': {
      const susceptance = omega * element.capacitanceF;
      return inParallel(load, { re: susceptance / q.capacitor, im: susceptance });
    }
    case 'line':
      return { impedance: throughLine(element, load, frequencyHz), efficiency: 1 };
    case 'shunt_stub':
      return inParallel(load, { re: 0, im: -1 / stubReactance(element, frequencyHz) });
    case 'series_stub':
      return inSeries(load, { re: 0, im: stubReactance(element, frequencyHz) });
    case 'transformer':
      return { impedance: scale(load, element.impedanceRatio), efficiency: 1 };
  }
}

function inSeries(load: Complex, part: Complex): Transformed {
  const impedance = add(load, part);
  return { impedance, efficiency: load.re / impedance.re };
}

function inParallel(load: Complex, part: Complex): Transformed {
  const before = reciprocal(load);
  const after = add(before, part);
  return { impedance: reciprocal(after), efficiency: before.re / after.re };
}

/** Z0 (ZL cos + j Z0 sin)/(Z0 cos + j ZL sin), D. M. Pozar, Microwave Engineering, eq. 2.44. */
function throughLine(line: LineElement, load: Complex, frequencyHz: number): Complex {
  const angle = electricalAngle(line, frequencyHz);
  const z0 = line.characteristicOhm;
  const cos = Math.cos(angle);
  const jSin = { re: 0, im: Math.sin(angle) };
  const top = add(scale(load, cos), scale(jSin, z0));
  const bottom = add({ re: z0 * cos, im: 0 }, multiply(load, jSin));
  return scale(divide(top, bottom), z0);
}

/** Z0 tan for a shorted, -Z0 cot for an open stub. */
function stubReactance(
  stub: Omit<LineElement, 'kind'> & { readonly end: 'open' | 'short' },
  frequencyHz: number,
): number {
  const tangent = Math.tan(electricalAngle(stub, frequencyHz));
  return stub.end === 'short'
    ? stub.characteristicOhm * tangent
    : -stub.characteristicOhm / tangent;
}

function electricalAngle(line: Omit<LineElement, 'kind'>, frequencyHz: number): number {
  return (2 * Math.PI * frequencyHz * line.lengthM) / (line.velocityFactor * LIGHT_M_PER_S);
}

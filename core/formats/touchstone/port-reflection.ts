import type { NumberFormat, OptionLine, Parameter } from './option-line.ts';
import type { PointLayout } from './points.ts';

type Complex = readonly [re: number, im: number];

const zero: Complex = [0, 0];
const one: Complex = [1, 0];

/** What one number pair stands for. */
export function complexOf(first: number, second: number, format: NumberFormat): Complex {
  if (format === 'RI') return [first, second];
  const magnitude = format === 'DB' ? 10 ** (first / 20) : first;
  if (magnitude === 0) return zero;
  const angle = (second * Math.PI) / 180;
  return [magnitude * Math.cos(angle), magnitude * Math.sin(angle)];
}

/** How the entries of a file turn into normalised ones. */
export interface Normalisation {
  readonly port: 1 | 2;
  /** Reference of each port, ohm. */
  readonly reference1: number;
  readonly reference2: number;
  /** The file's immittances are divided by the reference already. */
  readonly isNormalised: boolean;
}

/** The reflection at the asked port of one point, the other port closed by its reference. */
export function reflectionAt(
  values: Float64Array,
  start: number,
  layout: PointLayout,
  { parameter, format }: OptionLine,
  normalisation: Normalisation,
): Complex {
  const entry = (offset: number | null): Complex =>
    offset === null ? zero : complexOf(values[start + offset], values[start + offset + 1], format);
  const { port } = normalisation;
  if (parameter === 'S') return entry(port === 1 ? layout.at11 : layout.at22);
  const [scale11, scale22, scaleProduct] = scalesOf(parameter, normalisation);
  const n11 = times(entry(layout.at11), [scale11, 0]);
  if (layout.ports === 1) {
    return parameter === 'Z'
      ? divided(minus(n11, one), plus(n11, one))
      : divided(minus(one, n11), plus(one, n11));
  }
  const n22 = times(entry(layout.at22), [scale22, 0]);
  const product = times(times(entry(layout.at12), entry(layout.at21)), [scaleProduct, 0]);
  return twoPortReflection(parameter, port, n11, n22, product);
}

/**
 * Factors that normalise 11, 22 and the product 12·21. They follow from v = V/√R, i = I√R at each
 * port.
 */
function scalesOf(
  parameter: Parameter,
  { reference1, reference2, isNormalised }: Normalisation,
): readonly [number, number, number] {
  if (isNormalised) return [1, 1, 1];
  if (parameter === 'Z') return [1 / reference1, 1 / reference2, 1 / (reference1 * reference2)];
  if (parameter === 'Y') return [reference1, reference2, reference1 * reference2];
  if (parameter === 'H') return [1 / reference1, reference2, reference2 / reference1];
  return [reference1, 1 / reference2, reference1 / reference2];
}

/**
 * Reflections of a two-port from its normalised parameters and the product of 12 and 21 (the usual
 * conversion tables, for instance D. M. Pozar, Microwave Engineering, section 4.4; H and G derived
 * alike).
 */
function twoPortReflection(
  parameter: Parameter,
  port: 1 | 2,
  n11: Complex,
  n22: Complex,
  product: Complex,
): Complex {
  const plus11 = plus(one, n11);
  const plus22 = plus(one, n22);
  const whole = minus(times(plus11, plus22), product);
  const isImpedance =
    parameter === 'Z' || (parameter === 'H' && port === 1) || (parameter === 'G' && port === 2);
  const own = port === 1 ? n11 : n22;
  const other = port === 1 ? plus22 : plus11;
  const part = times(isImpedance ? minus(own, one) : minus(one, own), other);
  return divided(isImpedance ? minus(part, product) : plus(part, product), whole);
}

function plus(a: Complex, b: Complex): Complex {
  return [a[0] + b[0], a[1] + b[1]];
}

function minus(a: Complex, b: Complex): Complex {
  return [a[0] - b[0], a[1] - b[1]];
}

function times(a: Complex, b: Complex): Complex {
  return [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];
}

function divided(a: Complex, b: Complex): Complex {
  const d = b[0] * b[0] + b[1] * b[1];
  return [(a[0] * b[0] + a[1] * b[1]) / d, (a[1] * b[0] - a[0] * b[1]) / d];
}

const significantDigits = 12;

/**
 * A derived answer with its numbers rounded to 12 significant digits, which is far below any
 * half-width and keeps the noise of the arithmetic out of what people read: 1.2, not
 * 1.1999999999999997. What was measured is never rounded.
 */
export function rounded<Value>(value: Value): Value {
  return roundedDeep(value) as Value;
}

function roundedDeep(value: unknown): unknown {
  if (typeof value === 'number') {
    return Number.isInteger(value) ? value : Number(value.toPrecision(significantDigits));
  }
  if (Array.isArray(value)) return value.map(roundedDeep);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([name, one]) => [name, roundedDeep(one)]));
}

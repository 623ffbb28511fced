/**
 * What one unit in the last printed digit is worth, for each row of a column, in the unit that is
 * printed. Cells may have lost their trailing zeros, so the most decimals met in the column count;
 * where a cell has an exponent, it applies to them.
 */
export function printedSteps(text: string, cellStart: Int32Array, count: number): Float64Array {
  const steps = new Float64Array(count);
  let decimals = 0;
  for (let row = 0; row < count; row++) {
    const written = lastDigitOf(text, cellStart[row]);
    decimals = Math.max(decimals, written.decimals);
    steps[row] = written.exponent;
  }
  for (let row = 0; row < count; row++) steps[row] = 10 ** (steps[row] - decimals);
  return steps;
}

const longestNumber = 64;

function lastDigitOf(
  text: string,
  start: number,
): { readonly decimals: number; readonly exponent: number } {
  const cell = /^[+-]?\d*\.?(\d*)(?:e([+-]?\d{1,3}))?/i.exec(
    text.slice(start, start + longestNumber),
  );
  return { decimals: cell?.[1].length ?? 0, exponent: Number(cell?.[2] ?? 0) };
}

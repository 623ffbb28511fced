/**
 * Decimal text to the nearest double, bit for bit what `Number(text)` gives, with units scaled by
 * shifting the decimal exponent: 8.2 MHz is 8.2e6 Hz, where a multiplication would give
 * 8199999.999999999.
 *
 * The grammar: an optional sign, digits with at most one point (a digit on at least one side), and
 * an optional exponent. No hexadecimal, no separators, no infinities.
 */

const digit0 = 48;
const digit9 = 57;
/** Powers of ten that a double holds exactly. */
const exactPowers = Float64Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));
/** Mantissas up to here are exact in a double with room for one more digit. */
const exactMantissa = 900_719_925_474_098;

/** Reads numbers out of a text one after the other, without making strings of them. */
export class DecimalScanner {
  readonly text: string;
  /** Where the number read last ended. */
  end = 0;

  constructor(text: string) {
    this.text = text;
  }

  /**
   * The number that starts at `start`, times 10^shift; sets `end` behind it. NaN if none starts
   * there or if it exceeds the range of doubles. What may follow a number is for the caller to say.
   */
  read(start: number, shift = 0): number {
    const { text } = this;
    let at = start;
    let code = text.charCodeAt(at);
    const isNegative = code === 45;
    if (isNegative || code === 43) code = text.charCodeAt(++at);
    let mantissa = 0;
    let exponent = shift;
    let isExact = true;
    let digits = 0;
    while (code >= digit0 && code <= digit9) {
      if (mantissa > exactMantissa) isExact = false;
      else mantissa = mantissa * 10 + (code - digit0);
      digits += 1;
      code = text.charCodeAt(++at);
    }
    if (code === 46) {
      code = text.charCodeAt(++at);
      while (code >= digit0 && code <= digit9) {
        if (mantissa > exactMantissa) isExact = false;
        else {
          mantissa = mantissa * 10 + (code - digit0);
          exponent -= 1;
        }
        digits += 1;
        code = text.charCodeAt(++at);
      }
    }
    this.end = at;
    if (digits === 0) return Number.NaN;
    if (code === 69 || code === 101) exponent += this.readExponent(at);
    if (!isExact || exponent < -22 || exponent > 22) return this.readSlowly(start, shift);
    const magnitude =
      exponent < 0 ? mantissa / exactPowers[-exponent] : mantissa * exactPowers[exponent];
    return isNegative ? -magnitude : magnitude;
  }

  /** The exponent behind the `e` at `at`; 0, and `end` left before the `e`, if it has no digits. */
  private readExponent(at: number): number {
    const { text } = this;
    let place = at + 1;
    let code = text.charCodeAt(place);
    const isNegative = code === 45;
    if (isNegative || code === 43) code = text.charCodeAt(++place);
    let exponent = 0;
    const first = place;
    while (code >= digit0 && code <= digit9) {
      if (exponent < 100_000) exponent = exponent * 10 + (code - digit0);
      code = text.charCodeAt(++place);
    }
    if (place === first) return 0;
    this.end = place;
    return isNegative ? -exponent : exponent;
  }

  /** By the language's own conversion, the exponent shifted in the text. */
  private readSlowly(start: number, shift: number): number {
    const token = this.text.slice(start, this.end);
    const value = Number(shift === 0 ? token : shiftedText(token, shift));
    return Number.isFinite(value) ? value : Number.NaN;
  }
}

function shiftedText(token: string, shift: number): string {
  const at = token.search(/[eE]/);
  if (at < 0) return `${token}e${shift}`;
  return `${token.slice(0, at)}e${Number(token.slice(at + 1)) + shift}`;
}

/** The number that a whole text is, times 10^shift; NaN if the text is not exactly one number. */
export function parseDecimal(text: string, shift = 0): number {
  const scanner = new DecimalScanner(text);
  const value = scanner.read(0, shift);
  return scanner.end === text.length ? value : Number.NaN;
}

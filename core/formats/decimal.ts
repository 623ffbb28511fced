import { textCodes } from './text-codes.ts';

/**
 * Decimal text to the nearest double, bit for bit what `Number(text)` gives, with units scaled by
 * shifting the decimal exponent: 8.2 MHz is 8.2e6 Hz, where a multiplication would give
 * 8199999.999999999.
 *
 * The grammar: an optional sign, digits with at most one point (a digit on at least one side), and
 * an optional exponent. No hexadecimal, no separators, no infinities.
 */
const grammar = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?$/;

/** The number that a whole text is, times 10^shift; NaN if the text is not exactly one number. */
export function parseDecimal(text: string, shift = 0): number {
  if (!grammar.test(text)) return Number.NaN;
  const value = Number(shift === 0 ? text : shiftedText(text, shift));
  return Number.isFinite(value) ? value : Number.NaN;
}

function shiftedText(token: string, shift: number): string {
  const at = token.search(/[eE]/);
  if (at < 0) return `${token}e${shift}`;
  return `${token.slice(0, at)}e${Number(token.slice(at + 1)) + shift}`;
}

/** A byte is a digit exactly if without these bits it is at most 9; it is the digit then. */
const digit0 = 0x30;
const point = 46;
/** Powers of ten that a double holds exactly. */
const exactPowers = Float64Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));
/** Whole numbers below are exact in a double. */
const exactBelow = 2 ** 53;

/**
 * Reads numbers out of a text one after the other, without making strings of them. Where the digits
 * are below 2^53 and the power of ten is at most 22, both are exact doubles and their one product
 * or quotient is correctly rounded; all else goes through the language's own conversion.
 */
export class DecimalScanner {
  readonly text: string;
  /** The text as bytes, see `textCodes`. */
  readonly codes: Uint8Array;
  /** Where the number read last ended. */
  end = 0;

  constructor(text: string) {
    this.text = text;
    this.codes = textCodes(text);
  }

  /**
   * The number that starts at `start`, times 10^shift; sets `end` behind it. NaN if none starts
   * there or if it exceeds the range of doubles. What may follow a number is for the caller to say.
   */
  read(start: number, shift = 0): number {
    const { codes } = this;
    const sign = codes[start];
    const isNegative = sign === 45;
    const first = isNegative || sign === 43 ? start + 1 : start;
    let at = first;
    let mantissa = 0;
    let digit = codes[at] ^ digit0;
    while (digit <= 9) {
      mantissa = mantissa * 10 + digit;
      digit = codes[++at] ^ digit0;
    }
    let digits = at - first;
    let exponent = shift;
    if (codes[at] === point) {
      const fraction = ++at;
      digit = codes[at] ^ digit0;
      while (digit <= 9) {
        mantissa = mantissa * 10 + digit;
        digit = codes[++at] ^ digit0;
      }
      digits += at - fraction;
      exponent -= at - fraction;
    }
    this.end = at;
    if (digits === 0) return Number.NaN;
    if ((codes[at] | 32) === 101) exponent += this.readExponent();
    if (mantissa >= exactBelow || exponent < -22 || exponent > 22) {
      return parseDecimal(this.text.slice(start, this.end), shift);
    }
    const magnitude =
      exponent < 0 ? mantissa / exactPowers[-exponent] : mantissa * exactPowers[exponent];
    return isNegative ? -magnitude : magnitude;
  }

  /** The exponent whose `e` stands at `end`; 0, and `end` left before the `e`, without digits. */
  private readExponent(): number {
    const { codes } = this;
    let at = this.end + 1;
    const isNegative = codes[at] === 45;
    if (isNegative || codes[at] === 43) at += 1;
    let exponent = 0;
    const first = at;
    let digit = codes[at] ^ digit0;
    while (digit <= 9) {
      if (exponent < 100_000) exponent = exponent * 10 + digit;
      digit = codes[++at] ^ digit0;
    }
    if (at === first) return 0;
    this.end = at;
    return isNegative ? -exponent : exponent;
  }
}

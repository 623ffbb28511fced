/** Numbers as a reader of some language writes them. */
export interface NumberText {
  /** With this many decimals, the language's decimal sign, and a true minus sign. */
  fixed(value: number, decimals: number): string;
  /** To this many significant digits, without zeros that tell nothing. */
  significant(value: number, digits: number): string;
}

/** The numbers of a language, by its BCP 47 tag; digits are 0 to 9 in every language. */
export function numberText(language: string): NumberText {
  const sign = decimalSign(language);
  const written = (text: string) => text.replace('.', sign).replace('-', '\u2212');
  return {
    fixed: (value, decimals) => written(withoutMinusZero(value.toFixed(decimals))),
    significant: (value, digits) => written(String(Number(value.toPrecision(digits)))),
  };
}

const signs = new Map<string, string>();
const mostSigns = 100;

function decimalSign(language: string): string {
  const known = signs.get(language);
  if (known !== undefined) return known;
  const parts = new Intl.NumberFormat(language, { numberingSystem: 'latn' }).formatToParts(1.5);
  const sign = parts.find(({ type }) => type === 'decimal')?.value ?? '.';
  if (signs.size >= mostSigns) signs.clear();
  signs.set(language, sign);
  return sign;
}

function withoutMinusZero(text: string): string {
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text;
}

import { ok, type Result } from '../../result.ts';
import { parseDecimal } from '../decimal.ts';
import type { Assumption, ReadError } from '../read-types.ts';
import { type Place, refuse } from './faults.ts';

export type Parameter = 'S' | 'Y' | 'Z' | 'H' | 'G';
export type NumberFormat = 'DB' | 'MA' | 'RI';

/** What an option line says, defaults filled in. */
export interface OptionLine {
  /** Decimal exponent of the frequency unit: 0, 3, 6 or 9. */
  readonly frequencyShift: number;
  readonly parameter: Parameter;
  readonly format: NumberFormat;
  /** One resistance for all ports, or one for each. */
  readonly referenceOhm: readonly number[];
}

export interface ReadOptionLine {
  readonly option: OptionLine;
  readonly assumptions: readonly Assumption[];
}

const frequencyShifts = new Map([
  ['HZ', 0],
  ['KHZ', 3],
  ['MHZ', 6],
  ['GHZ', 9],
]);
const parameters: readonly Parameter[] = ['S', 'Y', 'Z', 'H', 'G'];
const formats: readonly NumberFormat[] = ['DB', 'MA', 'RI'];
const ohmWords = new Set(['OHM', 'OHMS', 'Ω', 'Ω']);

const form =
  'Write it as `# <Hz|kHz|MHz|GHz> <S|Y|Z> <DB|MA|RI> R <ohms>`, for instance `# MHz S RI R 50`.';

interface Parts {
  frequencyShift?: number;
  parameter?: Parameter;
  format?: NumberFormat;
  referenceOhm?: readonly number[];
}

/**
 * Reads an option line (its `#` included, comment removed). Items come in any order; what is missing
 * takes its default: GHz, S, MA, 50 ohm. An unknown word is refused: skipping it might change every
 * frequency a thousandfold.
 */
export function readOptionLine(text: string, place: Place): Result<ReadOptionLine, ReadError> {
  const assumptions: Assumption[] = [];
  const body = text.trim().slice(1);
  if (/^\S/.test(body)) {
    const detail = 'The option line has no blank after its `#`; it was read as if it had.';
    assumptions.push({ code: 'option_glued', detail, line: place.line });
  }
  const words = body.trim() === '' ? [] : body.trim().split(/[ \t]+/);
  const parts: Parts = {};
  for (let i = 0; i < words.length; i++) {
    const word = words[i].toUpperCase();
    if (word.startsWith('R') && word !== 'RI') {
      const resistance = readResistance(words, i, place);
      if (!resistance.ok) return resistance;
      if (parts.referenceOhm !== undefined) return twice('reference', place);
      parts.referenceOhm = resistance.value.referenceOhm;
      assumptions.push(...resistance.value.assumptions);
      i = resistance.value.last;
      continue;
    }
    const taken = takeWord(parts, word);
    if (taken === 'twice') return twice(words[i], place);
    if (taken === 'unknown') {
      return refuse(
        'option_unknown',
        `The option line has the unknown word \`${words[i]}\`.`,
        form,
        place,
      );
    }
  }
  const { frequencyShift = 9, parameter = 'S', format = 'MA', referenceOhm = [50] } = parts;
  return ok({ option: { frequencyShift, parameter, format, referenceOhm }, assumptions });
}

function twice(word: string, place: Place): Result<never, ReadError> {
  return refuse(
    'option_twice',
    `The option line says two things of one kind (\`${word}\`).`,
    form,
    place,
  );
}

function takeWord(parts: Parts, word: string): 'taken' | 'twice' | 'unknown' {
  const shift = frequencyShifts.get(word);
  if (shift !== undefined) {
    if (parts.frequencyShift !== undefined) return 'twice';
    parts.frequencyShift = shift;
    return 'taken';
  }
  const parameter = parameters.find((known) => known === word);
  if (parameter !== undefined) {
    if (parts.parameter !== undefined) return 'twice';
    parts.parameter = parameter;
    return 'taken';
  }
  const format = formats.find((known) => known === word);
  if (format === undefined) return 'unknown';
  if (parts.format !== undefined) return 'twice';
  parts.format = format;
  return 'taken';
}

interface Resistance {
  readonly referenceOhm: readonly number[];
  readonly assumptions: readonly Assumption[];
  /** Index of the last word that belongs to it. */
  readonly last: number;
}

/** Reads `R n …` from the word `R` on; also `R50`, `R=50`, `R (50+0j)` and a trailing unit. */
function readResistance(
  words: readonly string[],
  at: number,
  place: Place,
): Result<Resistance, ReadError> {
  const glued = words[at].slice(1).replace(/^=/, '');
  const assumptions: Assumption[] = [];
  const tolerated = (detail: string) =>
    assumptions.push({ code: 'option_resistance_form', detail, line: place.line });
  const referenceOhm: number[] = [];
  let last = at;
  if (glued !== '') {
    const value = resistanceOf(glued);
    if (value === null) {
      const detail = `The option line has \`${words[at]}\` where \`R <ohms>\` is expected.`;
      return refuse('option_resistance', detail, form, place);
    }
    tolerated(`\`${words[at]}\` was read as \`R ${value}\`.`);
    referenceOhm.push(value);
  }
  while (glued === '' && last + 1 < words.length) {
    const value = resistanceOf(words[last + 1]);
    if (value === null) break;
    if (Number.isNaN(parseDecimal(words[last + 1]))) {
      tolerated(`The reference \`${words[last + 1]}\` was read as ${value} ohm.`);
    }
    referenceOhm.push(value);
    last += 1;
  }
  if (last + 1 < words.length && ohmWords.has(words[last + 1].toUpperCase())) {
    tolerated(`The unit \`${words[last + 1]}\` after the reference was left out.`);
    last += 1;
  }
  if (referenceOhm.length === 0) {
    const what = words[at + 1] === undefined ? 'nothing' : `\`${words[at + 1]}\``;
    const detail = `After \`R\` the option line has ${what} where a positive real number of ohms is expected.`;
    return refuse('option_resistance', detail, form, place);
  }
  const bad = referenceOhm.find((value) => !(value > 0));
  if (bad !== undefined) {
    return refuse(
      'reference_not_positive',
      `The reference of ${bad} ohm is not positive.`,
      form,
      place,
    );
  }
  if (referenceOhm.length > 1 && last + 1 < words.length) {
    const detail = 'Resistances of several ports must end the option line.';
    return refuse('option_resistance', detail, form, place);
  }
  return ok({ referenceOhm, assumptions, last });
}

/** A real number, also written as a complex one whose imaginary part is exactly zero; else null. */
function resistanceOf(word: string): number | null {
  const plain = parseDecimal(word);
  if (!Number.isNaN(plain)) return plain;
  const complex = /^\(?([^()]*?[^eE(])([+-])(?:[ij]([\d.]+)|([\d.]+)[ij])\)?$/i.exec(word);
  if (complex === null) return null;
  const imaginary = parseDecimal(complex[3] ?? complex[4]);
  const real = parseDecimal(complex[1]);
  return imaginary === 0 && !Number.isNaN(real) ? real : null;
}

import { readHeader } from './header-words.ts';
import { factsOf, type Quantity, type Unit } from './quantities.ts';

/**
 * Why a guess is not certain. `meaning` and `unit` go when recomputation confirms them; `sign` goes
 * when the column only confirms others; `other` stays.
 */
export type DoubtKind = 'meaning' | 'unit' | 'sign' | 'other';

interface Doubt {
  readonly kind: DoubtKind;
  readonly why: string;
}

/** What a column is taken for, and what speaks against being sure. */
export interface ColumnGuess {
  readonly header: string;
  /** Null: not known here, not read. */
  readonly quantity: Quantity | null;
  readonly unit: Unit | null;
  readonly doubts: readonly Doubt[];
}

/** The lowest and highest frequency that an antenna is likely swept at. */
const lowestLikelyHz = 30e3;
const highestLikelyHz = 6e9;
const hertzPerUnit: readonly (readonly [Unit, number])[] = [
  ['Hz', 1],
  ['kHz', 1e3],
  ['MHz', 1e6],
  ['GHz', 1e9],
];

/** Guesses at a column from its header, the unit below it, and its numbers as they are written. */
export function guessColumn(header: string, unitBelow: string, values: Float64Array): ColumnGuess {
  if (header === '') {
    return { header, quantity: null, unit: null, doubts: [other('it has no header')] };
  }
  const words = readHeader(header, unitBelow);
  const quantity = words.quantity === null ? null : byRange(words.quantity, words.isSure, values);
  if (quantity === null) return { header, quantity, unit: null, doubts: [] };
  const doubts: Doubt[] = [];
  if (!words.isSure) doubts.push({ kind: 'meaning', why: 'its name may mean several things' });
  if (words.strayUnit !== null) {
    doubts.push(other(`a column of \`${quantity}\` is not in ${words.strayUnit}`));
  }
  const unit = words.unit ?? unitByRange(quantity, values, doubts);
  doubts.push(...rangeDoubts(quantity, unit, values), ...signDoubts(quantity, values));
  return { header, quantity: unsigned(quantity, doubts), unit, doubts };
}

/** A name with several meanings is read by its numbers: never more than a proposal. */
function byRange(quantity: Quantity, isSure: boolean, values: Float64Array): Quantity {
  if (isSure) return quantity;
  if (quantity === 'impedance_angle' && values.some((value) => Math.abs(value) > 90)) {
    return 'reflection_angle';
  }
  const isNegative = values.some((value) => value < 0);
  if (quantity === 'return_loss' && isNegative) return 'reflection_db';
  if (quantity === 'reflection_db' && !isNegative) return 'reflection_magnitude';
  return quantity;
}

function unitByRange(quantity: Quantity, values: Float64Array, doubts: Doubt[]): Unit | null {
  const { units } = factsOf(quantity);
  if (units.length === 0 || quantity === 'return_loss') return units[0] ?? null;
  if (quantity === 'reflection_magnitude' && values.every((value) => !(value > 1.05))) {
    return 'fraction';
  }
  if (quantity !== 'frequency') {
    doubts.push({ kind: 'unit', why: 'its unit is not written' });
    const isRadian = units.includes('rad') && values.every((v) => !(Math.abs(v) > 3.15));
    return isRadian ? 'rad' : units[0];
  }
  const likely = likelyFrequencyUnits(values);
  const only =
    likely.length === 1 ? ` (only ${likely[0]} places them where antennas are swept)` : '';
  doubts.push(other(`its unit is not written, and numbers are no proof of it${only}`));
  return likely[0] ?? 'MHz';
}

/** The units that place all frequencies where antennas are swept, MHz before others. */
export function likelyFrequencyUnits(values: Float64Array): Unit[] {
  const lowest = values.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const highest = values.reduce((a, b) => Math.max(a, b), 0);
  return hertzPerUnit
    .filter(([, hertz]) => lowest * hertz >= lowestLikelyHz && highest * hertz <= highestLikelyHz)
    .map(([unit]) => unit)
    .sort((a, b) => Number(b === 'MHz') - Number(a === 'MHz'));
}

function rangeDoubts(quantity: Quantity, unit: Unit | null, values: Float64Array): Doubt[] {
  const any = (test: (value: number) => boolean) => values.some(test);
  if (quantity === 'frequency' && !isMonotone(values)) {
    return [other('its numbers go up and down')];
  }
  if (quantity === 'swr' && any((swr) => swr < 0.995)) return [other('no SWR is below 1')];
  const most = unit === 'percent' ? 105 : 1.05;
  if (quantity === 'reflection_magnitude' && any((rho) => rho < 0 || rho > most)) {
    return [other('a reflection magnitude lies between 0 and 1')];
  }
  if (quantity === 'reflection_db' && any((level) => level > 0.2)) {
    return [other('a reflection in dB is not above 0')];
  }
  if (quantity === 'return_loss' && any((loss) => loss < -0.2)) {
    return [other('a return loss is not below 0')];
  }
  if (quantity === 'resistance' && any((ohms) => ohms < -1)) {
    return [other('a resistance below zero is not that of an antenna')];
  }
  return [];
}

function isMonotone(values: Float64Array): boolean {
  let up = 0;
  let down = 0;
  for (let i = 1; i < values.length; i++) {
    if (values[i] > values[i - 1]) up += 1;
    if (values[i] < values[i - 1]) down += 1;
  }
  return up === 0 || down === 0;
}

/** Signed quantities whose unsigned form is written under the same name by many instruments. */
const unsignedForm: Readonly<Partial<Record<Quantity, Quantity>>> = {
  reactance: 'reactance_magnitude',
  impedance_angle: 'impedance_angle_magnitude',
  reflection_angle: 'reflection_angle_magnitude',
};

function signDoubts(quantity: Quantity, values: Float64Array): Doubt[] {
  if (unsignedForm[quantity] === undefined || values.some((value) => value < 0)) return [];
  if (values.some((value) => value > 180) && quantity === 'reflection_angle') return [];
  const why = 'none of its numbers is negative: it may be the magnitude alone';
  return [{ kind: 'sign', why }];
}

/** The proposal for a column whose sign is in doubt is the one that claims less. */
function unsigned(quantity: Quantity, doubts: readonly Doubt[]): Quantity {
  const isDoubted = doubts.some(({ kind }) => kind === 'sign');
  return isDoubted ? (unsignedForm[quantity] ?? quantity) : quantity;
}

function other(why: string): Doubt {
  return { kind: 'other', why };
}

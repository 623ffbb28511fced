import { type Agreement, agrees, Recomputation } from './agreement.ts';
import { checkValues } from './check-values.ts';
import type { ColumnGuess, DoubtKind } from './column-guess.ts';
import { usualReferencesOhm } from './confirm-columns.ts';
import type { Frame, PlacedColumn } from './frame.ts';
import { factsOf, type Quantity } from './quantities.ts';
import { readRows } from './read-rows.ts';
import { type ChosenRecipe, recipeFor } from './recipes.ts';
import type { TableText } from './table-text.ts';

/** What became of the guesses. */
export interface ConfirmedGuesses {
  readonly columns: readonly PlacedColumn[];
  /** The reference, where columns that mix reflection and impedance fix it. */
  readonly referenceOhm: number | null;
  readonly evidence: readonly string[];
  readonly isCertain: boolean;
}

const insufficient =
  'The columns that were recognised do not determine a reflection: name at least `swr`, `return_loss`, or a pair such as `resistance` and `reactance`.';
/** Fewer rows than this agree by chance. */
const fewestRows = 5;

/**
 * Weighs guesses at columns: recomputes redundant columns at the usual references and lifts the
 * doubts that this settles. A sign is never settled so, since an SWR is even in the reactance.
 */
export function confirmGuesses(
  table: TableText,
  frame: Frame,
  guesses: readonly ColumnGuess[],
  maxPoints: number,
): ConfirmedGuesses {
  const all = guesses.flatMap(({ quantity, unit }, i): PlacedColumn[] =>
    quantity === null ? [] : [{ address: i + 1, quantity, unit }],
  );
  const { columns, chosen, unused } = usable(all);
  const recomputed =
    chosen === null || chosen.redundant.length === 0
      ? null
      : recompute(table, frame, columns, chosen, maxPoints);
  const remaining = guesses.map((guess, i) =>
    doubtsLeft(guess, i, unused, chosen, recomputed, guesses),
  );
  const evidence = [
    ...guesses.map((guess, i) => sentence(guess, i, unused.includes(i + 1), remaining[i])),
    ...(recomputed?.evidence ?? []),
    ...(chosen === null ? [insufficient] : []),
  ];
  const hasFrequency = columns.some(({ quantity }) => quantity === 'frequency');
  const contradicts = recomputed !== null && !recomputed.isAgreed;
  const isCertain =
    chosen !== null &&
    hasFrequency &&
    unused.length === 0 &&
    !contradicts &&
    remaining.every((doubts) => doubts.length === 0);
  return { columns, referenceOhm: recomputed?.referenceOhm ?? null, evidence, isCertain };
}

interface Usable {
  readonly columns: readonly PlacedColumn[];
  readonly chosen: ChosenRecipe | null;
  /** Column numbers that could neither be used nor checked. */
  readonly unused: readonly number[];
}

/** The columns that a recipe can use or check; the rest is set aside. */
function usable(all: readonly PlacedColumn[]): Usable {
  const chosen = recipeFor(all.map(({ quantity }) => quantity));
  const useless = chosen?.useless ?? [];
  const isUseless = ({ quantity }: PlacedColumn) => useless.includes(quantity);
  return {
    columns: all.filter((column) => !isUseless(column)),
    chosen,
    unused: all.filter(isUseless).map(({ address }) => address),
  };
}

interface Recomputed {
  readonly isAgreed: boolean;
  /** Redundant quantities that agree in enough rows and vary enough to mean something. */
  readonly telling: readonly Quantity[];
  readonly referenceOhm: number | null;
  readonly evidence: readonly string[];
}

function recompute(
  table: TableText,
  frame: Frame,
  columns: readonly PlacedColumn[],
  { recipe, redundant }: ChosenRecipe,
  maxPoints: number,
): Recomputed | null {
  const read = readRows(table, frame, columns, maxPoints);
  if (!read.ok) return null;
  const { rows } = read.value;
  const checked = checkValues(columns, rows);
  if (!checked.ok) {
    return { isAgreed: false, telling: [], referenceOhm: null, evidence: [checked.error.detail] };
  }
  const recomputation = new Recomputation(table.text, columns, rows, recipe);
  const sides = [...recipe.from, ...redundant].map((quantity) => factsOf(quantity).side);
  const isFixed = sides.includes('reflection') && sides.includes('impedance');
  const references = isFixed ? usualReferencesOhm : usualReferencesOhm.slice(0, 1);
  for (const ohms of references) {
    const agreements = redundant.map((quantity) => recomputation.compare(quantity, ohms));
    if (!agreements.every(agrees)) continue;
    const telling = agreements.filter(isTelling).map(({ quantity }) => quantity);
    const isKnown = isFixed && telling.length > 0;
    return {
      isAgreed: true,
      telling,
      referenceOhm: isKnown ? ohms : null,
      evidence: agreements.map((agreement) => agreementSentence(agreement, isKnown ? ohms : null)),
    };
  }
  const evidence = [
    `Recomputed from the others, ${redundant.map((one) => `\`${one}\``).join(' and ')} ${redundant.length === 1 ? 'does' : 'do'} not agree at any usual reference.`,
  ];
  return { isAgreed: false, telling: [], referenceOhm: null, evidence };
}

function isTelling(agreement: Agreement): boolean {
  return agreement.isTelling && agreement.compared - agreement.disagreeing >= fewestRows;
}

function agreementSentence(
  { quantity, compared, disagreeing }: Agreement,
  ohms: number | null,
): string {
  const at = ohms === null ? '' : ` at a reference of ${ohms} ohm`;
  return `Recomputed from the others${at}, \`${quantity}\` agrees in ${compared - disagreeing} of ${compared} rows.`;
}

/** The doubts of one guess that recomputation does not settle. */
function doubtsLeft(
  { quantity, doubts }: ColumnGuess,
  index: number,
  unused: readonly number[],
  chosen: ChosenRecipe | null,
  recomputed: Recomputed | null,
  guesses: readonly ColumnGuess[],
): ColumnGuess['doubts'] {
  if (quantity === null || chosen === null || recomputed === null) return doubts;
  if (unused.includes(index + 1)) return doubts;
  const isSource = chosen.recipe.from.includes(quantity);
  const { telling } = recomputed;
  const isConfirmed = isSource
    ? telling.some((one) => isSure(guesses, one))
    : telling.includes(quantity) && chosen.recipe.from.some((one) => isSure(guesses, one));
  if (!isConfirmed) return doubts;
  const lifted: readonly DoubtKind[] = isSource ? ['meaning', 'unit'] : ['meaning', 'unit', 'sign'];
  return doubts.filter(({ kind }) => !lifted.includes(kind));
}

function isSure(guesses: readonly ColumnGuess[], quantity: Quantity): boolean {
  const guess = guesses.find((one) => one.quantity === quantity);
  return guess?.doubts.every(({ kind }) => kind === 'sign') === true;
}

function sentence(
  { header, quantity, unit }: ColumnGuess,
  index: number,
  isUnused: boolean,
  left: ColumnGuess['doubts'],
): string {
  const column = `Column ${index + 1}${header === '' ? '' : ` \`${header.slice(0, 60)}\``}`;
  const reasons = left.map(({ why }) => why).join('; ');
  if (quantity === null) {
    return `${column}: not recognised, not read${reasons === '' ? '' : ` (${reasons})`}.`;
  }
  const what = `${quantity}${unit === null ? '' : ` in ${unit}`}`;
  if (isUnused) return `${column}: ${what}, which can neither be used nor checked here.`;
  return reasons === '' ? `${column}: ${what}.` : `${column}: ${what}? Not certain: ${reasons}.`;
}

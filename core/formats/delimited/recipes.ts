import { ok, type Result } from '../../result.ts';
import type { PhaseKnowledge } from '../../sweep.ts';
import type { ReadError } from '../read-types.ts';
import { factsOf, type Quantity } from './quantities.ts';

export type RecipeKind =
  | 'reflection_parts'
  | 'series'
  | 'reflection_polar'
  | 'impedance_polar'
  | 'admittance'
  | 'parallel'
  | 'resistance_and_impedance'
  | 'impedance_and_match'
  | 'resistance_and_match'
  | 'match';

/** Which columns a sweep is computed from, and what then is known of its phase. */
export interface Recipe {
  readonly kind: RecipeKind;
  readonly phase: PhaseKnowledge;
  /** One or two quantities. */
  readonly from: readonly Quantity[];
}

/** Ways to say how much is reflected, the finest first. */
const matches: readonly Quantity[] = [
  'reflection_magnitude',
  'reflection_db',
  'return_loss',
  'swr',
  'reflected_power',
];

/**
 * All recipes, the first that fits is taken: what tells most of the phase first; among equals what
 * needs no reference before what does, except the parts of the reflection, which are stored as such.
 */
const recipes: readonly Recipe[] = [
  recipe('reflection_parts', 'signed', 'reflection_re', 'reflection_im'),
  recipe('series', 'signed', 'resistance', 'reactance'),
  ...matches.map((match) => recipe('reflection_polar', 'signed', match, 'reflection_angle')),
  recipe('impedance_polar', 'signed', 'impedance_magnitude', 'impedance_angle'),
  recipe('admittance', 'signed', 'conductance', 'susceptance'),
  recipe('parallel', 'signed', 'parallel_resistance', 'parallel_reactance'),
  recipe('reflection_parts', 'unsigned', 'reflection_re', 'reflection_im_magnitude'),
  recipe('series', 'unsigned', 'resistance', 'reactance_magnitude'),
  ...matches.map((match) =>
    recipe('reflection_polar', 'unsigned', match, 'reflection_angle_magnitude'),
  ),
  recipe('impedance_polar', 'unsigned', 'impedance_magnitude', 'impedance_angle_magnitude'),
  recipe('resistance_and_impedance', 'unsigned', 'resistance', 'impedance_magnitude'),
  ...matches.map((match) =>
    recipe('impedance_and_match', 'unsigned', 'impedance_magnitude', match),
  ),
  ...matches.map((match) => recipe('resistance_and_match', 'unsigned', 'resistance', match)),
  ...matches.map((match) => recipe('match', 'none', match)),
];

function recipe(kind: RecipeKind, phase: PhaseKnowledge, ...from: readonly Quantity[]): Recipe {
  return { kind, phase, from };
}

export interface ChosenRecipe {
  readonly recipe: Recipe;
  /** The other columns: they must agree with what is computed. */
  readonly redundant: readonly Quantity[];
}

const rank: Readonly<Record<PhaseKnowledge, number>> = { none: 0, unsigned: 1, signed: 2 };

/** The recipe for a set of quantities and what it leaves over; null if there is none. */
export function recipeFor(
  quantities: readonly Quantity[],
): (ChosenRecipe & { readonly useless: readonly Quantity[] }) | null {
  const measured = quantities.filter((quantity) => factsOf(quantity).side !== null);
  const found = recipes.find(({ from }) => from.every((quantity) => measured.includes(quantity)));
  if (found === undefined) return null;
  const others = measured.filter((quantity) => !found.from.includes(quantity));
  const isUseful = (quantity: Quantity) => rank[factsOf(quantity).needs] <= rank[found.phase];
  return {
    recipe: found,
    redundant: others.filter(isUseful),
    useless: others.filter((quantity) => !isUseful(quantity)),
  };
}

/**
 * The same for a mapping that was told. Errors: `columns_insufficient` if there is no recipe,
 * `columns_unused` if a column can neither be used nor checked.
 */
export function chooseRecipe(quantities: readonly Quantity[]): Result<ChosenRecipe, ReadError> {
  const chosen = recipeFor(quantities);
  if (chosen === null) {
    return aboutColumns(
      'columns_insufficient',
      `${list(quantities)} do not determine a reflection.`,
      'Map a pair such as resistance and reactance, reflection_re and reflection_im, impedance_magnitude and impedance_angle, or swr or return_loss alone.',
    );
  }
  const [useless] = chosen.useless;
  if (useless === undefined) return ok(chosen);
  return aboutColumns(
    'columns_unused',
    `\`${useless}\` adds nothing that could be used or checked beside ${list(chosen.recipe.from)}.`,
    'Leave that column out (by order: `skip`), or map the column that belongs to it.',
  );
}

function list(quantities: readonly Quantity[]): string {
  return quantities.map((quantity) => `\`${quantity}\``).join(' and ');
}

function aboutColumns(code: string, detail: string, remedy: string): Result<never, ReadError> {
  return { ok: false, error: { code, detail, remedy, parameter: 'columns' } };
}

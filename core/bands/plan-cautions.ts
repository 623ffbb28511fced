import type { Caution } from '../analysis/summary.ts';
import { licencesOf, limitPlansOf, type PlanBand } from './bands-of.ts';
import type { BandPlan, BandSegment } from './plan.ts';

/** A report's plan and bands, as far as the cautions about them need it. */
export interface PlanUse {
  readonly plan: BandPlan;
  readonly licence: string | null;
  readonly designBands: readonly string[];
  /** Every band of the plan. */
  readonly known: readonly PlanBand[];
  /** The bands that the report is about. */
  readonly reported: readonly PlanBand[];
}

/** What a reader must know of the plan that a report was judged by. */
export function planCautions(use: PlanUse): readonly Caution[] {
  return [
    ...editionCautions(use.plan),
    ...memoryCautions(use.reported),
    ...permissionCautions(use.reported),
    ...licenceCautions(use.plan, use.licence),
    ...unknownBandCautions(use),
  ];
}

function editionCautions(plan: BandPlan): readonly Caution[] {
  const judgedBy = new Set([plan, ...limitPlansOf(plan)]);
  const cautions = [...judgedBy].flatMap((one): Caution[] => {
    if (one.editionStanding === 'current') return [];
    const [code, why] =
      one.editionStanding === 'old'
        ? ['plan_old_edition', 'is taken from an old edition']
        : ['plan_unconfirmed', 'was not compared with its latest edition'];
    const detail = `The plan ${one.id} ${why} (${one.edition}). Check the current text of ${one.authority}.`;
    return [{ code, detail }];
  });
  return [...cautions, ...kindCautions(plan)];
}

function kindCautions(plan: BandPlan): readonly Caution[] {
  if (plan.kind === 'bandplan') {
    const detail =
      'The segments are a voluntary plan. The limits of the bands come from the allocation or the licence rows behind it.';
    return [{ code: 'plan_voluntary', detail }];
  }
  if (plan.kind === 'allocation') {
    const detail =
      'The plan is a table of allocations, not a permission: your national licence decides what you may use.';
    return [{ code: 'plan_not_a_licence', detail }];
  }
  return [];
}

function memoryCautions(bands: readonly PlanBand[]): readonly Caution[] {
  const isFromMemory = (row: BandSegment) => row.verified === 'memory';
  const names = bands
    .filter(({ segments, limitRows }) => [...segments, ...limitRows].some(isFromMemory))
    .map(({ band }) => band);
  if (names.length === 0) return [];
  const detail = `Some rows of the plan are from memory and were compared with no document (${names.join(', ')}). Check them before relying on them.`;
  return [{ code: 'plan_rows_from_memory', detail }];
}

function permissionCautions(bands: readonly PlanBand[]): readonly Caution[] {
  const names = bands.filter((band) => band.nationalRanges.length > 0).map(({ band }) => band);
  if (names.length === 0) return [];
  const detail = `In ${names.join(', ')} some frequencies are open only where a national administration permits them; they are not counted as usable.`;
  return [{ code: 'national_rows_not_counted', detail }];
}

function licenceCautions(plan: BandPlan, licence: string | null): readonly Caution[] {
  const classes = licencesOf(plan);
  if (licence === null) {
    if (classes.length < 2) return [];
    const detail = `No operator class was given, so the rows of every class count (${classes.join(', ')}). A class may use only its own.`;
    return [{ code: 'licence_not_given', detail }];
  }
  if (classes.includes(licence)) return [];
  const detail =
    classes.length === 0
      ? `The plan ${plan.id} has no operator classes; the class ${licence} made no difference.`
      : `The plan ${plan.id} knows no class ${licence}, so no row counts. It knows ${classes.join(', ')}.`;
  return [{ code: 'licence_unknown', detail }];
}

function unknownBandCautions({ plan, designBands, known }: PlanUse): readonly Caution[] {
  const names = designBands.filter((name) => !known.some(({ band }) => band === name));
  if (names.length === 0) return [];
  const detail = `The plan ${plan.id} permits nothing on ${names.join(', ')} to this class, or does not cover it; nothing is claimed of it.`;
  return [{ code: 'design_band_not_in_plan', detail }];
}

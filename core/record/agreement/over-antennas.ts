import type { DriftMeasure, DriftSweep } from '../drift/drift-series.ts';
import { ridgeFit } from '../drift/ridge-fit.ts';
import { type SeriesModel, seriesModel } from '../drift/series-model.ts';
import { usualScatter } from '../drift/usual-scatter.ts';
import { median } from '../statistics/robust.ts';

/** How far an instrument lies from the others, from all antennas that it measured at any time. */
export interface BiasOverAntennas {
  readonly measure: DriftMeasure;
  readonly analyzerId: string;
  readonly measurements: number;
  /** Relative, from the middle one of the others, with 95 % limits. */
  readonly bias: number;
  readonly low: number;
  readonly high: number;
  /** It differs from most of the others by more than chance and more than is usual. */
  readonly off: boolean;
}

/** One measurement, less what its antenna, the year, the weather and events explain. */
interface Left {
  readonly place: string;
  readonly analyzerId: string;
  readonly value: number;
  readonly scatter: number;
}

const normal95 = 1.959964;
/** Farther off than so many times the scatter is a mishap and no bias. */
const wild = 5;
/** An instrument with fewer measurements is not judged. */
const fewest = 3;

/**
 * Biases from what each antenna's own series leaves for its instruments, over all antennas, also
 * where the instruments never met. Each antenna's level in each era is fitted with them. Empty
 * below three instruments: of two that differ nobody knows which is off.
 */
export function biasesOverAntennas(
  series: readonly (readonly DriftSweep[])[],
  measure: DriftMeasure,
): readonly BiasOverAntennas[] {
  const left = series.flatMap((sweeps, antenna) => {
    const model = seriesModel(sweeps, measure, new Map());
    return model === null ? [] : leftOf(model, antenna);
  });
  const ids = [...new Set(left.map(({ analyzerId }) => analyzerId))].toSorted().filter((id) => {
    return left.filter(({ analyzerId }) => analyzerId === id).length >= fewest;
  });
  const judged = left.filter(({ analyzerId }) => ids.includes(analyzerId));
  if (ids.length < 3) return [];
  return ids.map((id) => biasOf(id, ids, judged, measure));
}

function leftOf(model: SeriesModel, antenna: number): readonly Left[] {
  return model.sweeps.flatMap(({ analyzerId, eraIndex }, i) => {
    const value = model.ofInstruments[i];
    const limit = wild * model.scatter + 3 * usualScatter[model.measure].instrument;
    if (analyzerId === null || Math.abs(value) > limit) return [];
    return [{ place: `${antenna} ${eraIndex}`, analyzerId, value, scatter: model.scatter }];
  });
}

/** Fits all others from this one, so that each standard error is that of a difference. */
function biasOf(
  id: string,
  ids: readonly string[],
  left: readonly Left[],
  measure: DriftMeasure,
): BiasOverAntennas {
  const others = ids.filter((other) => other !== id);
  const weights = Float64Array.from(left, ({ scatter }) => 1 / scatter ** 2);
  const prior = 1 / (2 * usualScatter[measure].instrument) ** 2;
  const columns = others.map((other) => ({
    values: centred(left, weights, ({ analyzerId }) => Number(analyzerId === other)),
    priorPrecision: prior,
  }));
  const values = centred(left, weights, ({ value }) => value);
  const { factors, standardErrors } = ridgeFit(columns, values, weights);
  const limit = usualScatter[measure].instrumentLimit;
  const far = others.filter(
    (_, k) => Math.abs(factors[k]) > Math.max(limit, 3 * standardErrors[k]),
  );
  const bias = -median(factors);
  const reach = normal95 * median(standardErrors);
  return {
    measure,
    analyzerId: id,
    measurements: left.filter(({ analyzerId }) => analyzerId === id).length,
    bias,
    low: bias - reach,
    high: bias + reach,
    off: far.length > others.length / 2,
  };
}

/** A column less its weighted mean at each place: that eliminates the places' levels. */
function centred(
  left: readonly Left[],
  weights: Float64Array,
  of: (one: Left) => number,
): Float64Array {
  const sums = new Map<string, { sum: number; weight: number }>();
  left.forEach((one, i) => {
    const { sum, weight } = sums.get(one.place) ?? { sum: 0, weight: 0 };
    sums.set(one.place, { sum: sum + weights[i] * of(one), weight: weight + weights[i] });
  });
  return Float64Array.from(left, (one) => {
    const { sum, weight } = sums.get(one.place) ?? { sum: 0, weight: 1 };
    return of(one) - sum / weight;
  });
}

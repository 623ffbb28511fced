/** The measurements of one item, a list for each laboratory (here: instrument). */
export type GroupedMeasurements = readonly (readonly number[])[];

/** Repeatability and reproducibility at one level, in the unit of the measurements. */
export interface Precision {
  readonly groups: number;
  readonly measurements: number;
  /** Mean of all measurements. */
  readonly mean: number;
  /** Standard deviation within a group. */
  readonly repeatability: number;
  /** Standard deviation between groups beyond what repeatability explains. */
  readonly betweenGroups: number;
  /** Standard deviation of single measurements by any group. */
  readonly reproducibility: number;
}

/**
 * Repeatability and reproducibility by ISO 5725-2:1994, clause 7.4.5, for groups of unequal size.
 * Null unless there are two groups and at least one group has two measurements.
 */
export function precision(groups: GroupedMeasurements): Precision | null {
  const filled = groups.filter((group) => group.length > 0);
  const measurements = filled.reduce((sum, group) => sum + group.length, 0);
  if (filled.length < 2 || measurements === filled.length) return null;
  // Deviations from a first value: leading digits that all have in common cost no accuracy.
  const shift = filled[0][0];
  const shifted = filled.map((group) => group.map((value) => value - shift));
  const means = shifted.map(mean);
  const grandMean = shifted.reduce((sum, group) => sum + group.reduce(add, 0), 0) / measurements;
  const within = shifted.reduce((sum, group, i) => sum + squaresAbout(group, means[i]), 0);
  const repeatabilityVariance = within / (measurements - filled.length);
  const between = shifted.reduce(
    (sum, group, i) => sum + group.length * (means[i] - grandMean) ** 2,
    0,
  );
  const squaredSizes = filled.reduce((sum, group) => sum + group.length ** 2, 0);
  const typicalSize = (measurements - squaredSizes / measurements) / (filled.length - 1);
  const betweenVariance = Math.max(
    0,
    (between / (filled.length - 1) - repeatabilityVariance) / typicalSize,
  );
  return {
    groups: filled.length,
    measurements,
    mean: grandMean + shift,
    repeatability: Math.sqrt(repeatabilityVariance),
    betweenGroups: Math.sqrt(betweenVariance),
    reproducibility: Math.sqrt(repeatabilityVariance + betweenVariance),
  };
}

function add(sum: number, value: number): number {
  return sum + value;
}

function mean(values: readonly number[]): number {
  return values.reduce(add, 0) / values.length;
}

function squaresAbout(values: readonly number[], centre: number): number {
  return values.reduce((sum, value) => sum + (value - centre) ** 2, 0);
}

import { type DriftMeasure, type DriftSweep, driftMeasures } from './drift-series.ts';
import { type EraTrend, eraTrends } from './era-trend.ts';
import { type DriftFinding, findingsOf } from './findings.ts';
import { lostResonance, overdue } from './other-findings.ts';
import { type InstrumentBias, type KnownBiases, seriesModel } from './series-model.ts';

export interface DriftReport {
  readonly trends: readonly EraTrend[];
  /** How far each instrument lies from the others on this antenna, relative. */
  readonly biases: readonly (InstrumentBias & { readonly measure: DriftMeasure })[];
  readonly findings: readonly DriftFinding[];
}

/** When tests are due: milliseconds since 1970, UTC; null where the antenna has no interval. */
export interface DueTest {
  readonly nowMs: number;
  readonly dueMs: number | null;
}

const nothingKnown: KnownBiases = new Map();

/**
 * Judges one band of an antenna over time: trends by era, and what changed. `sweeps` ascend in time.
 * `known` has what else is known of the instruments, for instance from their agreement.
 */
export function driftOf(
  sweeps: readonly DriftSweep[],
  known: KnownBiases = nothingKnown,
  due: DueTest | null = null,
): DriftReport {
  const models = driftMeasures.flatMap((measure) => seriesModel(sweeps, measure, known) ?? []);
  return {
    trends: models.flatMap(eraTrends),
    biases: models.flatMap(({ measure, biases }) => biases.map((bias) => ({ measure, ...bias }))),
    findings: [...findingsOf(models), ...lostResonance(sweeps), ...overdue(sweeps, due)],
  };
}

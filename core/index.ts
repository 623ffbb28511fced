export { standingCautions } from './advice/cautions.ts';
export { type BandsOfOptions, bandsOf, licencesOf, type PlanBand } from './bands/bands-of.ts';
export {
  type BandName,
  type BandPlan,
  type BandSegment,
  bandNames,
  type EditionStanding,
  isBandName,
  type PlanKind,
  type SegmentFamily,
  type SegmentStatus,
  type Verified,
} from './bands/plan.ts';
export { findPlan, listPlans } from './bands/plans.ts';
export type { HzRange } from './bands/ranges.ts';
export { type UsableOptions, usableBands } from './bands/usable.ts';
export type {
  BandUse,
  Permission,
  RangeUse,
  SegmentUse,
  UsableReport,
  UsableVerdict,
} from './bands/usable-report.ts';
export { fail, ok, type Result } from './result.ts';
export {
  type ComplexSweep,
  makeSweep,
  type PhaseKnowledge,
  reflectionMagnitude,
  type ScalarSweep,
  type Sweep,
  type SweepError,
} from './sweep.ts';

export type { AntennaKind } from './advice/antenna-kind.ts';
export { standingCautions } from './advice/cautions.ts';
export type { Aim, Finding, FindingFacts, NextStep } from './advice/finding.ts';
export { findings } from './advice/findings.ts';
export { type HotSpot, type HotSpotRequest, type HotSpots, hotSpots } from './advice/hot-spots.ts';
export type { BandMatch } from './advice/match/band-swr.ts';
export type { ComponentQ, MatchElement } from './advice/match/element.ts';
export { type MatchAdvice, type MatchOption, matchOptions } from './advice/match/match-options.ts';
export type { MatchKind, MatchRequest } from './advice/match/match-request.ts';
export { feedPointStress, lineStress, powerCautions } from './advice/power.ts';
export { type RadiatorKind, radiatorOf } from './advice/radiator.ts';
export { trimAdvice } from './advice/trim.ts';
export type { TrimAdvice, TrimRequest } from './advice/trim-request.ts';
export { type Analysis, analyse } from './analysis/analysis.ts';
export { type LoadCheck, type LoadCheckError, residualError } from './analysis/check-load.ts';
export {
  type InstrumentError,
  instrumentErrorOf,
  type StatedInstrumentError,
} from './analysis/instrument-error.ts';
export { qualityFlagCodes } from './analysis/quality.ts';
export { curveOf, swrCurve } from './analysis/refined-swr.ts';
export { noiseOfRepeats } from './analysis/repeat-noise.ts';
export {
  analysisVersion,
  type SummariseOptions,
  summarise,
  summariseAnalysis,
} from './analysis/summarise.ts';
export type {
  Absence,
  Caution,
  MatchedBandwidth,
  Plane,
  QualityFlag,
  ReactanceMagnitudeMinimum,
  Resonance,
  Summary,
  SwrMinimum,
  UsableSpan,
} from './analysis/summary.ts';
export type { SwrCurve, SwrExtremes } from './analysis/swr-curve.ts';
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
export type { ChartHeading, ChartStyle } from './chart/chart-style.ts';
export { type CompareChart, compareChart, type NamedSweep } from './chart/compare-chart.ts';
export {
  type HistoryChart,
  type HistoryPoint,
  type HistorySeries,
  historyChart,
} from './chart/history-chart.ts';
export { type ImpedanceChart, impedanceChart } from './chart/impedance-chart.ts';
export { type ThemeName, themeNames } from './chart/palettes.ts';
export {
  type ReflectionDistanceChart,
  reflectionDistanceChart,
} from './chart/reflection-distance-chart.ts';
export { type SmithChart, smithChart } from './chart/smith-chart.ts';
export type { SweepChart } from './chart/sweep-chart.ts';
export { swrChart } from './chart/swr-chart.ts';
export { columnsGrammar } from './formats/delimited/columns-grammar.ts';
export { formatColumns } from './formats/delimited/format-columns.ts';
export type { ColumnMapping, MappedColumn } from './formats/delimited/mapping.ts';
export { parseColumns } from './formats/delimited/parse-columns.ts';
export { type Quantity, quantities, type Unit } from './formats/delimited/quantities.ts';
export { sweepCsvColumns, writeSweepCsv } from './formats/delimited/write-sweep-csv.ts';
export { detect } from './formats/detect.ts';
export { sweepJsonSchema } from './formats/json/schema.ts';
export { writeSweepJson } from './formats/json/write-sweep-json.ts';
export { type ReadSweepOptions, readSweep } from './formats/read-sweep.ts';
export {
  type Assumption,
  defaultReadLimits,
  type FileFormat,
  type ReadError,
  type ReadLimits,
  type ReadSweep,
} from './formats/read-types.ts';
export { type DecodedText, decodeText } from './formats/text.ts';
export { readTouchstone, type TouchstoneOptions } from './formats/touchstone/read-touchstone.ts';
export { type WriteError, writeTouchstone } from './formats/touchstone/write-touchstone.ts';
export { type BothEnds, bothEnds, type LineReport, lineReport } from './line/both-ends.ts';
export { type Cable, fitCable, type StatedCable } from './line/cable.ts';
export { type CatalogueCable, cables, findCable } from './line/cables.ts';
export { checkLine } from './line/check/check-line.ts';
export type { LineCheck, LineUnderTest } from './line/check/checked-line.ts';
export { compareLineChecks } from './line/check/compare-checks.ts';
export type { Conditioning, Standing } from './line/conditioning.ts';
export { type FeedLine, type FeedLineSection, resolveFeedLine } from './line/feed-line.ts';
export { type FeedPointSummary, feedPointSummary } from './line/feed-point-summary.ts';
export { fromFeedPoint, matchedLossDb, toFeedPoint } from './line/line.ts';
export {
  type Impedance,
  type Impedances,
  impedanceOf,
  type Reflection,
  type ReflectionColumns,
  reflectionOf,
  reflectionsOf,
  sweepImpedances,
} from './network/impedance.ts';
export { renormalise, renormaliseSweep } from './network/renormalise.ts';
export {
  magnitudeOfReturnLoss,
  mismatchLossDb,
  returnLossDb,
  sweepReturnLossDb,
} from './network/return-loss.ts';
export { magnitudeOfSwr, sweepSwr, swrOf } from './network/swr.ts';
export {
  type Agreement,
  agreementOf,
  type InstrumentAgreement,
} from './record/agreement/agreement.ts';
export { type BiasOverAntennas, biasesOverAntennas } from './record/agreement/over-antennas.ts';
export {
  automaticBaseline,
  type BandBaseline,
  type BaselineResonance,
  type BaselineValue,
  chosenBaseline,
  isGoodBand,
} from './record/baseline.ts';
export {
  type BandChange,
  type ChangeVerdict,
  type ComparedAntenna,
  type ComparedSweep,
  type Comparison,
  compareSweeps,
  type ExplainingLength,
  type MeasureChange,
  type ResonanceChange,
} from './record/compare.ts';
export {
  type Conditions,
  type Ground,
  grounds,
  type Weather,
  weathers,
} from './record/conditions.ts';
export { type CurveDifference, curveDifference } from './record/curve-difference.ts';
export { type DriftReport, type DueTest, driftOf } from './record/drift/drift.ts';
export {
  type DriftMeasure,
  type DriftSweep,
  type DriftValue,
  driftMeasures,
  driftSeries,
  type Wetness,
} from './record/drift/drift-series.ts';
export type { EraTrend, Interval } from './record/drift/era-trend.ts';
export { type DriftCode, type DriftFinding, driftCodes } from './record/drift/findings.ts';
export type { InstrumentBias, KnownBias, KnownBiases } from './record/drift/series-model.ts';
export { byUrgency, type Due, type DueQuestion, type DueState, dueOf } from './record/due.ts';
export { bandToFile, type FilingBand } from './record/filing.ts';
export {
  type BandMeasures,
  type HistoryRow,
  type MeasuredAnswers,
  type MeasuredMinimum,
  type MeasuredResonance,
  type MeasuredSpan,
  measuresOf,
  type SweepMeasures,
} from './record/measures.ts';
export { type TrackModel, usualTrackModel } from './record/track-filter.ts';
export {
  followResonances,
  type ResonanceTrack,
  type TrackPoint,
  type TrackStanding,
} from './record/tracks.ts';
export { type TrimOccasion, trimPairsOf } from './record/trim-pairs.ts';
export {
  eraIndexAt,
  eraStartsMs,
  startsEra,
  type Work,
  type WorkKind,
  workKinds,
} from './record/work.ts';
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

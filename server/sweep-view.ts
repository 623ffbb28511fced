import { type Analysis, analyse } from '../core/analysis/analysis.ts';
import {
  type InstrumentError,
  instrumentErrorOf,
  reflectionErrorBound,
} from '../core/analysis/instrument-error.ts';
import { curveOf } from '../core/analysis/refined-swr.ts';
import { summariseAnalysis, usualSwrLimits } from '../core/analysis/summarise.ts';
import type { Summary } from '../core/analysis/summary.ts';
import type { SwrCurve } from '../core/analysis/swr-curve.ts';
import type { Assumption } from '../core/formats/read-types.ts';
import type { FeedLine } from '../core/line/feed-line.ts';
import { feedPointCurve } from '../core/line/feed-point-curve.ts';
import { feedPointSummary } from '../core/line/feed-point-summary.ts';
import { matchedLossDb } from '../core/line/line.ts';
import { renormaliseSweep } from '../core/network/renormalise.ts';
import { reflectionMagnitude, type Sweep } from '../core/sweep.ts';
import { type LineView, lineViewOf } from './lines/line-report.ts';
import { Problem } from './problems.ts';
import type { ReportBasis } from './report-basis.ts';

/** A sweep at the plane and reference of a basis; all that is answered of it is read off here. */
export interface SweepView {
  readonly sweep: Sweep;
  readonly summary: Summary;
  /** Answers for the limits that the view was made for. */
  readonly curve: SwrCurve;
  /** Null for a sweep that was taken at the feed point. */
  readonly line: LineView | null;
}

/** Looks at a sweep on a basis. Throws `plane-unavailable` where the line cannot be removed. */
export function viewOf(
  basis: ReportBasis,
  measured: Sweep,
  assumptions: readonly Assumption[],
  swrLimits: readonly number[] = usualSwrLimits,
): SweepView {
  const removed = lineToRemove(basis);
  if (removed !== null) return feedPointView(basis, measured, assumptions, swrLimits, removed);
  const { plane, line, maxSwr } = basis;
  const analysis = analyseOn(basis, measured, 1);
  const { sweep } = analysis;
  const summary = summariseAnalysis(analysis, { plane, assumptions, swrLimits });
  return {
    sweep,
    summary,
    curve: curveOf(analysis),
    line: line === null ? null : lineViewOf(line, sweep, summary, maxSwr, null),
  };
}

/** The line between the plane of the sweep and that of the basis; null where there is none. */
export function lineToRemove({ plane, line }: ReportBasis): FeedLine | null {
  if (plane === 'measured' || line === null || !line.resolved.ok) return null;
  const { sections } = line.resolved.value;
  return sections.length === 0 ? null : line.resolved.value;
}

function feedPointView(
  basis: ReportBasis,
  measured: Sweep,
  assumptions: readonly Assumption[],
  swrLimits: readonly number[],
  removed: FeedLine,
): SweepView {
  const { plane, line, maxSwr } = basis;
  // A small error of the reflection grows by the loss of the way there and back.
  const growth = 10 ** (matchedLossDb(removed, highestHz(measured)) / 10);
  const options = { plane, assumptions, swrLimits };
  const found = feedPointSummary(measured, removed, reflectionU95(basis, measured), (sweep) =>
    summariseAnalysis(analyseOn(basis, sweep, growth), options),
  );
  if (!found.ok) {
    const { code, detail } = found.error;
    throw new Problem('plane-unavailable', { detail, members: { code } });
  }
  const { summary, removal, conditioning } = found.value;
  const analysis = analyseOn(basis, removal.sweep, growth);
  const atShack = renormaliseSweep(measured, basis.referenceOhm);
  return {
    sweep: analysis.sweep,
    summary,
    curve: feedPointCurve(curveOf(analysis), removal, summary),
    line: line === null ? null : lineViewOf(line, atShack, summary, maxSwr, conditioning),
  };
}

function analyseOn(
  { referenceOhm, residualErrors }: ReportBasis,
  sweep: Sweep,
  growth: number,
): Analysis {
  const instrument = residualErrors === null ? null : instrumentErrorOf(residualErrors);
  return analyse(
    renormaliseSweep(sweep, referenceOhm),
    instrument === null ? null : grown(instrument, growth),
  );
}

function grown({ directivity, sourceMatch, tracking }: InstrumentError, growth: number) {
  const times = (error: number | null) => (error === null ? null : growth * error);
  return {
    directivity: times(directivity),
    sourceMatch: times(sourceMatch),
    tracking: times(tracking),
  };
}

/** What the analyzer may be off by in the middle of its readings; null where that is not known. */
export function reflectionU95({ residualErrors }: ReportBasis, measured: Sweep): number | null {
  if (residualErrors === null || residualErrors.directivityDb === null) return null;
  const magnitudes = reflectionMagnitude(measured).toSorted();
  return reflectionErrorBound(
    instrumentErrorOf(residualErrors),
    magnitudes[magnitudes.length >> 1],
  );
}

function highestHz({ frequencyHz }: Sweep): number {
  return frequencyHz[frequencyHz.length - 1];
}

import type { Caution } from '../../core/analysis/summary.ts';
import type { Assumption } from '../../core/formats/read-types.ts';
import type { Cable } from '../../core/line/cable.ts';
import { checkLine } from '../../core/line/check/check-line.ts';
import type { LineCheck } from '../../core/line/check/checked-line.ts';
import { type ComparableCheck, compareLineChecks } from '../../core/line/check/compare-checks.ts';
import type { EndLoss } from '../../core/line/check/end-loss.ts';
import type { LineCheckError } from '../../core/line/check/grid.ts';
import type { ReflectionTrace } from '../../core/line/check/trace.ts';
import { ok, type Result } from '../../core/result.ts';
import type { Sweep } from '../../core/sweep.ts';
import type { LineCheckRecord, TestedLine } from '../store/port.ts';
import { toCamelCase } from '../wire/case.ts';
import type { LineCheckReportWire } from '../wire/line-check.ts';

/** A line to be checked, as it is kept and with its cable looked up. */
export interface LineToCheck {
  readonly tested: TestedLine;
  readonly cable: Cable | null;
  /** What the record of the antenna was asked for. */
  readonly assumptions: readonly Assumption[];
}

/** What a check keeps: short lists, so that a record stays small. */
export interface CheckedForRecord {
  readonly check: Omit<LineCheck, 'trace' | 'farEnd' | 'loss'>;
  readonly loss: EndLoss | null;
  readonly trace: ThinTrace;
}

/** A trace cut behind the end of the line, each value the largest of a few bins. */
export interface ThinTrace {
  readonly stepM: number;
  readonly magnitude: readonly number[];
  readonly aliasFreeM: number;
  readonly resolutionM: number;
  readonly window: Omit<ReflectionTrace['window'], 'weights'>;
  readonly lossCompensated: boolean;
}

/** Checks a line and thins what came of it. Errors as `checkLine`. */
export function checkForRecord(
  sweep: Sweep,
  { tested, cable, assumptions }: LineToCheck,
): Result<CheckedForRecord, LineCheckError> {
  const checked = checkLine(sweep, { ...tested, cable });
  if (!checked.ok) return checked;
  const { trace, farEnd, loss, ...check } = checked.value;
  return ok({
    check: { ...check, assumptions: [...assumptions, ...check.assumptions] },
    loss: loss === null ? null : thinLoss(loss),
    trace: thinTrace(trace, longest(check.lengthM, tested.lengthM)),
  });
}

function longest(seen: number | null, stated: number | null): number | null {
  return seen === null || stated === null ? (seen ?? stated) : Math.max(seen, stated);
}

const mostLossPoints = 101;

function thinLoss(loss: EndLoss): EndLoss {
  const last = loss.frequencyHz.length - 1;
  const every = Math.ceil(last / (mostLossPoints - 1));
  const thin = (values: Float64Array) => values.filter((_, i) => i % every === 0 || i === last);
  return {
    ...loss,
    frequencyHz: thin(loss.frequencyHz),
    lossDb: thin(loss.lossDb),
    smoothLossDb: thin(loss.smoothLossDb),
    expectedLossDb: loss.expectedLossDb === null ? null : thin(loss.expectedLossDb),
  };
}

const mostTraceSteps = 1000;
/** What lies this many times behind the end are echoes to and fro. */
const traceReach = 1.5;

function thinTrace(trace: ReflectionTrace, lengthM: number | null): ThinTrace {
  const { binM, aliasFreeM, resolutionM, lossCompensated } = trace;
  const { weights, ...window } = trace.window;
  const reachM = lengthM === null ? aliasFreeM : Math.min(aliasFreeM, traceReach * lengthM);
  const bins = Math.min(trace.magnitude.length, Math.ceil(reachM / binM) + 1);
  const together = Math.ceil(bins / mostTraceSteps);
  const magnitude = Array.from({ length: Math.ceil(bins / together) }, (_, i) =>
    Math.max(...trace.magnitude.subarray(i * together, (i + 1) * together)),
  );
  return {
    stepM: binM * together,
    magnitude: magnitude.map((value) => Number(value.toPrecision(5))),
    aliasFreeM,
    resolutionM,
    window,
    lossCompensated,
  };
}

/** What changed since the check before, by the store's order; a file is not compared with itself. */
export interface ChangesSince {
  readonly comparedWith: string | null;
  readonly changes: readonly Caution[];
}

/** Compares a check with the newest of those before it. */
export function changesSince(
  record: LineCheckRecord,
  older: readonly LineCheckRecord[],
): ChangesSince {
  const { fileSha256 } = record.measured;
  const before = older.find(({ measured }) => measured.fileSha256 !== fileSha256);
  if (before === undefined) return { comparedWith: null, changes: [] };
  return {
    comparedWith: before.id,
    changes: compareLineChecks(comparable(before), comparable(record)),
  };
}

function comparable({ reportJson }: LineCheckRecord): ComparableCheck {
  const report: LineCheckReportWire = JSON.parse(reportJson);
  return toCamelCase(report);
}

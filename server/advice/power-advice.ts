import { bandLoads, loadAt } from '../../core/advice/match/band-loads.ts';
import {
  type FeedPointStress,
  feedPointStress,
  type LineStress,
  lineStress,
} from '../../core/advice/power.ts';
import type { Absence } from '../../core/analysis/summary.ts';
import { add, type Complex, divide, magnitude, subtract } from '../../core/line/complex.ts';
import type { FeedLine } from '../../core/line/feed-line.ts';
import { toFeedPoint } from '../../core/line/line.ts';
import { fail, ok, type Result } from '../../core/result.ts';
import type { ComplexSweep, Sweep } from '../../core/sweep.ts';
import type { ReportBasis } from '../report-basis.ts';

type Reason = Pick<Absence, 'code' | 'detail'>;

/** Voltage and current at a power, at the feed point and where the line has most. */
export interface PowerAdvice {
  readonly powerW: number;
  readonly frequencyHz: number;
  readonly feedPoint:
    | (FeedPointStress & { readonly resistanceOhm: number; readonly reactanceOhm: number })
    | null;
  readonly line: (LineStress & { readonly characteristicOhm: number; readonly swr: number }) | null;
  readonly absent: readonly Absence[];
}

/** What a net power into the feed point makes of the antenna at one frequency of its sweep. */
export function powerAdvice(
  powerW: number,
  frequencyHz: number,
  impedance: Result<Complex, Reason>,
  line: FeedLine | null,
): PowerAdvice {
  const none = { powerW, frequencyHz, feedPoint: null, line: null };
  if (!impedance.ok) return { ...none, absent: [absence('power.feed_point', impedance.error)] };
  const stress = feedPointStress(impedance.value, powerW);
  if (!stress.ok) return { ...none, absent: [absence('power.feed_point', stress.error)] };
  const { re: resistanceOhm, im: reactanceOhm } = impedance.value;
  const onLine = stressOnLine(impedance.value, powerW, line);
  return {
    ...none,
    feedPoint: { ...stress.value, resistanceOhm, reactanceOhm },
    line: onLine.ok ? onLine.value : null,
    absent: onLine.ok ? [] : [absence('power.line', onLine.error)],
  };
}

function stressOnLine(load: Complex, powerW: number, line: FeedLine | null) {
  const last = line?.sections.at(-1);
  if (last === undefined) {
    return fail({
      code: 'no_line',
      detail: 'No feed line is recorded between analyzer and antenna.',
    });
  }
  const { characteristicOhm } = last.cable;
  const z0 = { re: characteristicOhm, im: 0 };
  const rho = magnitude(divide(subtract(load, z0), add(load, z0)));
  const swr = (1 + rho) / (1 - rho);
  const stress = lineStress(characteristicOhm, swr, powerW);
  return stress.ok ? ok({ ...stress.value, characteristicOhm, swr }) : stress;
}

/** The sweep at the feed point, removing the line of the basis where that must and can be done. */
export function feedPointSweep(
  { plane, line }: ReportBasis,
  sweep: Sweep,
): Result<ComplexSweep, Reason> {
  if (sweep.phase !== 'signed') {
    return fail({
      code: 'phase_needed',
      detail: 'The impedance at the feed point needs the full complex reflection.',
    });
  }
  if (plane === 'feed_point' || line === null) return ok(sweep);
  return line.resolved.ok ? toFeedPoint(sweep, line.resolved.value) : line.resolved;
}

/** The impedance of a sweep at one frequency. */
export function impedanceAt(
  sweep: Result<ComplexSweep, Reason>,
  frequencyHz: number,
): Result<Complex, Reason> {
  if (!sweep.ok) return sweep;
  const load = loadAt(bandLoads(sweep.value, 0, Number.POSITIVE_INFINITY), frequencyHz);
  if (load !== null) return ok(load);
  return fail({
    code: 'frequency_not_swept',
    detail: `The sweep does not reach ${frequencyHz} Hz.`,
  });
}

export function absence(field: string, { code, detail }: Reason): Absence {
  return { field, code, detail };
}

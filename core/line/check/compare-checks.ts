import type { Caution } from '../../analysis/summary.ts';
import type { LineCheck, LocatedDiscontinuity } from './checked-line.ts';

/** What of a check is compared, so that a record may keep less than the whole. */
export interface ComparableCheck
  extends Pick<LineCheck, 'electricalLengthM' | 'electricalLengthU95M' | 'separableM'> {
  readonly discontinuities: readonly LocatedDiscontinuity[];
  readonly loss: SmoothLoss | null;
}

interface SmoothLoss {
  readonly frequencyHz: ArrayLike<number>;
  readonly smoothLossDb: ArrayLike<number>;
  readonly smoothU95Db: number;
}

/** A line gained loss if it grew by this part of the earlier at least (common practice, no source). */
const TELLING_GAIN = 0.1;
/** A reflection changed if it did so by this much. */
const TELLING_CHANGE = 0.03;

/**
 * What changed between two checks of one line: `line_gained_loss`, `line_length_changed`,
 * `line_fault_new`, `line_fault_gone`, `line_fault_moved`, `line_fault_grew`. The shared velocity
 * factor cancels, so that places are compared by noise and resolution alone.
 */
export function compareLineChecks(
  earlier: ComparableCheck,
  later: ComparableCheck,
): readonly Caution[] {
  return [
    ...gainedLoss(earlier, later),
    ...changedLength(earlier, later),
    ...faults(earlier, later),
  ];
}

function gainedLoss(earlier: ComparableCheck, later: ComparableCheck): readonly Caution[] {
  if (earlier.loss === null || later.loss === null) return [];
  const low = Math.max(earlier.loss.frequencyHz[0], later.loss.frequencyHz[0]);
  const high = Math.min(topHz(earlier.loss.frequencyHz), topHz(later.loss.frequencyHz));
  if (!(high > low)) return [];
  const middle = (low + high) / 2;
  const before = smoothAt(earlier.loss, middle);
  const after = smoothAt(later.loss, middle);
  const halfWidth = Math.hypot(earlier.loss.smoothU95Db, later.loss.smoothU95Db);
  if (after - before <= Math.max(halfWidth, TELLING_GAIN * before)) return [];
  return [
    {
      code: 'line_gained_loss',
      detail: `At ${(middle / 1e6).toFixed(1)} MHz the line lost ${before.toFixed(2)} dB before and loses ${after.toFixed(2)} dB now (+-${halfWidth.toFixed(2)} dB).`,
    },
  ];
}

function changedLength(earlier: ComparableCheck, later: ComparableCheck): readonly Caution[] {
  const before = earlier.electricalLengthM;
  const after = later.electricalLengthM;
  if (before === null || after === null) return [];
  const halfWidth = Math.hypot(
    earlier.electricalLengthU95M ?? 0,
    later.electricalLengthU95M ?? 0,
    0.002 * before,
  );
  if (Math.abs(after - before) <= halfWidth) return [];
  return [
    {
      code: 'line_length_changed',
      detail: `The electrical length was ${before.toFixed(2)} m and is ${after.toFixed(2)} m: another line, a break, or water in it.`,
    },
  ];
}

function faults(earlier: ComparableCheck, later: ComparableCheck): readonly Caution[] {
  const before = onLine(earlier);
  const after = onLine(later);
  const reach = Math.max(earlier.separableM, later.separableM);
  const left = new Set(before);
  const findings: Caution[] = [];
  for (const place of after) {
    const old = nearest(place, left, reach);
    if (old === null) {
      findings.push({
        code: 'line_fault_new',
        detail: `A reflection of ${size(place)} at ${metres(place)} is new.`,
      });
      continue;
    }
    left.delete(old);
    findings.push(...changedFault(old, place, reach));
  }
  for (const old of left) {
    findings.push({
      code: 'line_fault_gone',
      detail: `The reflection of ${size(old)} at ${metres(old)} is gone.`,
    });
  }
  return findings;
}

function changedFault(
  old: LocatedDiscontinuity,
  place: LocatedDiscontinuity,
  reach: number,
): readonly Caution[] {
  const findings: Caution[] = [];
  if (Math.abs(place.distanceM - old.distanceM) > reach / 4) {
    findings.push({
      code: 'line_fault_moved',
      detail: `The reflection at ${metres(old)} is now at ${metres(place)}.`,
    });
  }
  if (place.magnitude - old.magnitude > TELLING_CHANGE) {
    findings.push({
      code: 'line_fault_grew',
      detail: `The reflection at ${metres(place)} grew from ${size(old)} to ${size(place)}.`,
    });
  }
  return findings;
}

function nearest(
  place: LocatedDiscontinuity,
  candidates: ReadonlySet<LocatedDiscontinuity>,
  reach: number,
): LocatedDiscontinuity | null {
  let best: LocatedDiscontinuity | null = null;
  let least = reach;
  for (const candidate of candidates) {
    const distance = Math.abs(candidate.distanceM - place.distanceM);
    if (distance < least) [best, least] = [candidate, distance];
  }
  return best;
}

function onLine(check: ComparableCheck): readonly LocatedDiscontinuity[] {
  return check.discontinuities.filter((place) => place.kind === 'on_line');
}

/** Of the first point at or above a frequency inside the sweep; the smooth loss hardly moves in one step. */
function smoothAt({ frequencyHz, smoothLossDb }: SmoothLoss, hz: number): number {
  let upper = 0;
  while (frequencyHz[upper] < hz) upper++;
  return smoothLossDb[upper];
}

function topHz(frequencyHz: ArrayLike<number>): number {
  return frequencyHz[frequencyHz.length - 1];
}

function metres(place: LocatedDiscontinuity): string {
  return `${place.distanceM.toFixed(2)} m`;
}

function size(place: LocatedDiscontinuity): string {
  return place.magnitude.toFixed(2);
}

import { fail, ok, type Result } from './result.ts';

/**
 * What is known of the phase of the reflection.
 * `signed`: the full complex value. `unsigned`: the sign of the reactance is unknown, so only what
 * is even in it holds. `none`: the magnitude alone.
 */
export type PhaseKnowledge = 'signed' | 'unsigned' | 'none';

interface SweepBase {
  /** Hertz, strictly ascending, finite, not negative. */
  readonly frequencyHz: Float64Array;
  /** The real, positive reference resistance of the reflection, ohm. */
  readonly referenceOhm: number;
}

/**
 * A sweep whose reflection is complex. With `unsigned` phase the imaginary part is stored as its
 * magnitude (>= 0) and its sign must not be used.
 */
export interface ComplexSweep extends SweepBase {
  readonly phase: 'signed' | 'unsigned';
  readonly reflectionRe: Float64Array;
  readonly reflectionIm: Float64Array;
}

/** A sweep of which only the magnitude of the reflection is known (SWR or return loss). */
export interface ScalarSweep extends SweepBase {
  readonly phase: 'none';
  readonly reflectionMagnitude: Float64Array;
}

/** One measurement at one plane: 1 to many points of reflection against frequency. */
export type Sweep = ComplexSweep | ScalarSweep;

export type SweepErrorCode =
  | 'sweep_empty'
  | 'sweep_lengths_differ'
  | 'sweep_not_finite'
  | 'sweep_frequency_negative'
  | 'sweep_not_ascending'
  | 'sweep_reference_not_positive'
  | 'sweep_magnitude_negative';

export interface SweepError {
  readonly code: SweepErrorCode;
  readonly detail: string;
  /** Zero-based index of the first point at fault, where one point is. */
  readonly index?: number;
}

/**
 * Checks what every sweep promises (at least one point, equal lengths, finite values, strictly
 * ascending frequency, positive reference) and returns it frozen; the arrays are kept, not copied.
 */
export function makeSweep(candidate: Sweep): Result<Sweep, SweepError> {
  const { frequencyHz, referenceOhm } = candidate;
  const points = frequencyHz.length;
  if (points === 0) return fail({ code: 'sweep_empty', detail: 'The sweep has no points.' });
  if (!(referenceOhm > 0) || !Number.isFinite(referenceOhm)) {
    return fail({
      code: 'sweep_reference_not_positive',
      detail: `The reference must be a positive number of ohms; it is ${referenceOhm}.`,
    });
  }
  const parts =
    candidate.phase === 'none'
      ? [candidate.reflectionMagnitude]
      : [candidate.reflectionRe, candidate.reflectionIm];
  if (parts.some((part) => part.length !== points)) {
    return fail({
      code: 'sweep_lengths_differ',
      detail: 'Frequencies and reflections differ in number.',
    });
  }
  const index = firstBadFrequency(frequencyHz);
  if (index >= 0) return fail(frequencyError(frequencyHz, index));
  for (const part of parts) {
    const at = firstNotFinite(part);
    if (at >= 0) return fail(notFinite(at));
  }
  const magnitudeLike =
    candidate.phase === 'none'
      ? candidate.reflectionMagnitude
      : candidate.phase === 'unsigned'
        ? candidate.reflectionIm
        : null;
  const negative = magnitudeLike?.findIndex((value) => value < 0) ?? -1;
  if (negative >= 0) {
    return fail({
      code: 'sweep_magnitude_negative',
      detail: `Point ${negative + 1} has a negative magnitude.`,
      index: negative,
    });
  }
  return ok(Object.freeze(candidate));
}

function firstNotFinite(values: Float64Array): number {
  for (let i = 0; i < values.length; i++) if (!Number.isFinite(values[i])) return i;
  return -1;
}

function firstBadFrequency(frequencyHz: Float64Array): number {
  let previous = -1;
  for (let i = 0; i < frequencyHz.length; i++) {
    const f = frequencyHz[i];
    if (!(f > previous && f >= 0 && f < Number.POSITIVE_INFINITY)) return i;
    previous = f;
  }
  return -1;
}

function frequencyError(frequencyHz: Float64Array, index: number): SweepError {
  const f = frequencyHz[index];
  if (!Number.isFinite(f)) return notFinite(index);
  if (f < 0) {
    return {
      code: 'sweep_frequency_negative',
      detail: `Point ${index + 1} has the negative frequency ${f} Hz.`,
      index,
    };
  }
  return {
    code: 'sweep_not_ascending',
    detail: `Point ${index + 1} (${f} Hz) does not lie above the point before it (${frequencyHz[index - 1]} Hz).`,
    index,
  };
}

function notFinite(index: number): SweepError {
  return { code: 'sweep_not_finite', detail: `Point ${index + 1} is not a finite number.`, index };
}

/** |reflection| at every point, whatever is known of the phase. */
export function reflectionMagnitude(sweep: Sweep): Float64Array {
  if (sweep.phase === 'none') return sweep.reflectionMagnitude;
  const { reflectionRe: re, reflectionIm: im } = sweep;
  const magnitude = new Float64Array(re.length);
  for (let i = 0; i < re.length; i++) magnitude[i] = Math.sqrt(re[i] * re[i] + im[i] * im[i]);
  return magnitude;
}

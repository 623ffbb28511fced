/** Two sweeps around one piece of work: what was done to the length, what the frequency did. */
export interface TrimPair {
  /** Positive for longer, metres. */
  readonly lengthChangeM: number;
  readonly frequencyChangeHz: number;
  /** 95 % half-width of the change; null if unknown. */
  readonly frequencyChangeU95Hz: number | null;
}

/** What an antenna's own history says of its length. */
export interface TrimSensitivity {
  readonly hzPerM: number;
  /** Null where one pair without a half-width is all there is. */
  readonly u95HzPerM: number | null;
  readonly pairs: number;
  /** The largest change that was tried, metres. */
  readonly largestChangeM: number;
}

/** Student's t, two-sided 95 %, for 1 to 10 degrees of freedom (standard table). */
const STUDENT_T = [12.706, 4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228];
const STUDENT_T_BEYOND = 2.2;

/**
 * Sensitivity as the least-squares line through the origin; its half-width is the larger of what
 * the scatter about it says and what the pairs' own half-widths say. Null without a usable pair.
 */
export function trimSensitivity(pairs: readonly TrimPair[]): TrimSensitivity | null {
  const usable = pairs.filter(
    (pair) => pair.lengthChangeM !== 0 && Number.isFinite(pair.frequencyChangeHz),
  );
  if (usable.length === 0) return null;
  const square = sum(usable, (pair) => pair.lengthChangeM ** 2);
  const hzPerM = sum(usable, (pair) => pair.lengthChangeM * pair.frequencyChangeHz) / square;
  return {
    hzPerM,
    u95HzPerM: larger(scatter(usable, hzPerM, square), stated(usable, square)),
    pairs: usable.length,
    largestChangeM: Math.max(...usable.map((pair) => Math.abs(pair.lengthChangeM))),
  };
}

function scatter(pairs: readonly TrimPair[], hzPerM: number, square: number): number | null {
  const freedom = pairs.length - 1;
  if (freedom === 0) return null;
  const left = sum(pairs, (pair) => (pair.frequencyChangeHz - hzPerM * pair.lengthChangeM) ** 2);
  const t = STUDENT_T[freedom - 1] ?? STUDENT_T_BEYOND;
  return (t * Math.sqrt(left / freedom)) / Math.sqrt(square);
}

function stated(pairs: readonly TrimPair[], square: number): number | null {
  let total = 0;
  for (const { lengthChangeM, frequencyChangeU95Hz } of pairs) {
    if (frequencyChangeU95Hz === null) return null;
    total += (lengthChangeM * frequencyChangeU95Hz) ** 2;
  }
  return Math.sqrt(total) / square;
}

function larger(a: number | null, b: number | null): number | null {
  if (a === null) return b;
  return b === null ? a : Math.max(a, b);
}

function sum<T>(items: readonly T[], value: (item: T) => number): number {
  return items.reduce((total, item) => total + value(item), 0);
}

import type { ComplexSweep } from '../sweep.ts';

/**
 * Standard deviation of one component of the reflection from sweeps of one antenna by one instrument
 * on the same frequencies: the scatter about their mean at each point, pooled. It checks the noise
 * that each sweep tells of itself; drift between the sweeps counts as scatter. Null for fewer than two
 * sweeps or different frequencies.
 */
export function noiseOfRepeats(sweeps: readonly ComplexSweep[]): number | null {
  if (sweeps.length < 2) return null;
  const [{ frequencyHz }] = sweeps;
  const points = frequencyHz.length;
  const isSame = ({ frequencyHz: other }: ComplexSweep) =>
    other.length === points && other.every((f, i) => f === frequencyHz[i]);
  if (!sweeps.every(isSame)) return null;
  let squares = 0;
  for (let i = 0; i < points; i++) {
    for (const part of ['reflectionRe', 'reflectionIm'] as const) {
      const mean = sweeps.reduce((sum, sweep) => sum + sweep[part][i], 0) / sweeps.length;
      for (const sweep of sweeps) squares += (sweep[part][i] - mean) ** 2;
    }
  }
  return Math.sqrt(squares / (2 * points * (sweeps.length - 1)));
}

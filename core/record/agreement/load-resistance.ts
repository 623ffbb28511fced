import type { Sweep } from '../../sweep.ts';
import { median } from '../statistics/robust.ts';

/**
 * The resistance that a sweep shows of a load, ohm: the median over its points of
 * R = Z0 (1 - |Γ|²) / |1 - Γ|². Null without phase, and where it is not a positive number.
 */
export function loadResistanceOhm(sweep: Sweep): number | null {
  if (sweep.phase === 'none') return null;
  const { reflectionRe, reflectionIm, referenceOhm } = sweep;
  const resistances = reflectionRe.map((re, i) => {
    const im2 = reflectionIm[i] ** 2;
    return (referenceOhm * (1 - re * re - im2)) / ((1 - re) ** 2 + im2);
  });
  const middle = median(resistances);
  return Number.isFinite(middle) && middle > 0 ? middle : null;
}

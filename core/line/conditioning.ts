import type { Caution } from '../analysis/summary.ts';
import { reflectionMagnitude } from '../sweep.ts';
import type { Removal } from './removal-half-width.ts';

/** How far an answer at the feed point can be relied on. */
export type Standing = 'good' | 'weak' | 'worthless';

/** What the removal of the line left of the answer. */
export interface Conditioning {
  /** Of magnitudes: SWR, return loss, usable spans. */
  readonly swr: Standing;
  /** Of complex values: resistance, reactance, resonance. */
  readonly impedance: Standing;
  /** Medians over the sweep. */
  readonly medianReflectionU95: number;
  readonly medianMagnitudeU95: number;
  readonly medianMagnification: number;
  readonly reasons: readonly Caution[];
}

/**
 * Half-widths of the reflection: above the first an answer is weak, above the second it says next
 * to nothing (the whole plane has radius 1; common practice, no source).
 */
const WEAK = 0.1;
const WORTHLESS = 0.3;
/** An error that grows this much comes from a line that keeps the antenna from being seen. */
const GREAT_MAGNIFICATION = 10;

/** Judges a removal; says why it is weak, worthless or contradicts itself. */
export function judgeRemoval(removal: Removal): Conditioning {
  const medianReflectionU95 = median(removal.reflectionU95);
  const medianMagnitudeU95 = median(removal.magnitudeU95);
  const medianMagnification = median(removal.magnification);
  const reasons: Caution[] = [];
  const impossible = impossibleLoss(removal);
  if (impossible !== null) reasons.push(impossible);
  if (medianMagnification >= GREAT_MAGNIFICATION) {
    reasons.push({
      code: 'line_hides_antenna',
      detail: `On its way through this line an error of the measured reflection grows ${medianMagnification.toFixed(0)} times; what comes back tells little of the antenna. Measure at the feed point.`,
    });
  }
  const contradicted = impossible?.code === 'line_loss_impossible';
  const swr = contradicted ? 'worthless' : standing(medianMagnitudeU95);
  const impedance = contradicted ? 'worthless' : standing(medianReflectionU95);
  if (impedance !== 'good' && !contradicted) {
    reasons.push(uncertainty(swr, impedance, medianReflectionU95));
  }
  return { swr, impedance, medianReflectionU95, medianMagnitudeU95, medianMagnification, reasons };
}

function standing(halfWidth: number): Standing {
  if (halfWidth >= WORTHLESS) return 'worthless';
  return halfWidth >= WEAK ? 'weak' : 'good';
}

function uncertainty(swr: Standing, impedance: Standing, halfWidth: number): Caution {
  const which = swr === 'good' ? 'Impedance and resonance are' : 'SWR, impedance and resonance are';
  return {
    code: impedance === 'weak' ? 'feed_point_uncertain' : 'feed_point_worthless',
    detail: `The reflection at the feed point is known to +-${halfWidth.toFixed(2)} only (of at most 1): ${which} ${impedance} there. A better known length, velocity factor and loss of the line, or a measurement at the feed point, would help.`,
  };
}

/** |reflection| above 1 at the feed point: the antenna would give back more than it got. */
function impossibleLoss(removal: Removal): Caution | null {
  const rho = reflectionMagnitude(removal.sweep);
  const above = rho.filter((size) => size > 1).length;
  if (above === 0) return null;
  const points = `${above} of ${removal.sweep.frequencyHz.length} points`;
  const stillAbove = rho.some((size, i) => size > 1 + removal.magnitudeU95[i]);
  if (stillAbove) {
    return {
      code: 'line_loss_impossible',
      detail: `Without the stated line more would come back than was sent at ${points}: the line loses less than stated, or another line is there.`,
    };
  }
  return {
    code: 'line_loss_doubtful',
    detail: `Without the stated line more would come back than was sent at ${points}; within its half-width a smaller loss explains it.`,
  };
}

function median(values: Float64Array): number {
  const sorted = values.toSorted();
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

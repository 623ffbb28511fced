import type { BandPlan } from '../../../core/bands/plan.ts';
import { findPlan } from '../../../core/bands/plans.ts';

/** The plan of an id that a test relies on. */
export function knownPlan(id: string): BandPlan {
  const plan = findPlan(id);
  if (plan === null) throw new Error(`There is no plan ${id}.`);
  return plan;
}

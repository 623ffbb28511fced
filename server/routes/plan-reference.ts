import { licencesOf } from '../../core/bands/bands-of.ts';
import { findPlan } from '../../core/bands/plans.ts';
import type { ProblemPlace } from '../problems.ts';

type Place = Pick<ProblemPlace, 'pointer' | 'parameter'>;

/** What is wrong with a plan and an operator class that a request names; empty if both exist. */
export function planFaults(
  planId: string,
  licence: string | null,
  places: { readonly plan: Place; readonly licence: Place },
): ProblemPlace[] {
  const plan = findPlan(planId);
  if (plan === null) {
    return [{ detail: `There is no plan \`${planId}\`; /v1/plans has them all.`, ...places.plan }];
  }
  const classes = licencesOf(plan);
  if (licence === null || classes.includes(licence)) return [];
  const known = classes.length === 0 ? 'none' : classes.join(', ');
  return [
    { detail: `${plan.id} has no class \`${licence}\`; it has ${known}.`, ...places.licence },
  ];
}

import type { BandPlan } from './plan.ts';
import { deAfuv } from './plans/de-afuv.ts';
import { iaruR1 } from './plans/iaru-r1.ts';
import { iaruR2 } from './plans/iaru-r2.ts';
import { iaruR3 } from './plans/iaru-r3.ts';
import { ituR1 } from './plans/itu-r1.ts';
import { ituR2 } from './plans/itu-r2.ts';
import { ituR3 } from './plans/itu-r3.ts';
import { lvClassA } from './plans/lv-class-a.ts';
import { national4m } from './plans/national-4m.ts';
import { ukOfcomFull } from './plans/uk-ofcom-full.ts';
import { usArrlVhf } from './plans/us-arrl-vhf.ts';
import { usFcc } from './plans/us-fcc.ts';

const plans: readonly BandPlan[] = [
  ituR1,
  ituR2,
  ituR3,
  national4m,
  iaruR1,
  iaruR2,
  iaruR3,
  usFcc,
  usArrlVhf,
  ukOfcomFull,
  deAfuv,
  lvClassA,
];

/** Every band plan: allocations first, then voluntary plans, then licences. */
export function listPlans(): readonly BandPlan[] {
  return plans;
}

/** The plan of this id (`iaru-r1`, `us-fcc`, …), or null. */
export function findPlan(id: string): BandPlan | null {
  return plans.find((plan) => plan.id === id) ?? null;
}

import type { DueTest } from './drift.ts';
import type { DriftSweep } from './drift-series.ts';
import type { DriftFinding } from './findings.ts';

const fewestBefore = 3;
const fewestWithout = 2;

/** A resonance that an era had in nearly every sweep, and its newest sweeps do not have. */
export function lostResonance(sweeps: readonly DriftSweep[]): readonly DriftFinding[] {
  const eras = [...new Set(sweeps.map(({ eraIndex }) => eraIndex))];
  return eras.flatMap((eraIndex) => {
    const own = sweeps.filter((sweep) => sweep.eraIndex === eraIndex && sweep.resonant !== null);
    const last = own.findLastIndex(({ resonant }) => resonant === true);
    const before = own.slice(0, last + 1);
    const without = own.slice(last + 1);
    const had = before.filter(({ resonant }) => resonant === true).length;
    if (had < fewestBefore || had < 0.8 * before.length || without.length < fewestWithout)
      return [];
    return [
      {
        code: 'resonance_lost' as const,
        eraIndex,
        measure: null,
        detail: `${had} of ${before.length} sweeps had a resonance here; the newest ${without.length} have none.`,
        evidence: without.map(({ sweepId }) => sweepId),
        confidence: without.length > 2 ? ('high' as const) : ('medium' as const),
        next: 'inspect_antenna' as const,
        change: null,
        sinceMs: without[0].measuredAtMs,
      },
    ];
  });
}

/** That the next test should have been made by now. */
export function overdue(
  sweeps: readonly DriftSweep[],
  due: DueTest | null,
): readonly DriftFinding[] {
  const newest = sweeps.at(-1);
  if (due === null || due.dueMs === null || newest === undefined || due.nowMs <= due.dueMs)
    return [];
  const days = Math.floor((due.nowMs - due.dueMs) / (24 * 3600 * 1000));
  return [
    {
      code: 'test_overdue',
      eraIndex: newest.eraIndex,
      measure: null,
      detail: `The next test was due ${days} days ago.`,
      evidence: [newest.sweepId],
      confidence: 'high',
      next: 'sweep_again',
      change: null,
      sinceMs: due.dueMs,
    },
  ];
}

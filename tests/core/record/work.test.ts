import { describe, expect, it } from 'vitest';
import { eraIndexAt, eraStartsMs } from '../../../core/record/work.ts';

describe('the eras of an antenna', () => {
  const startsMs = eraStartsMs([
    { kind: 'repaired', doneAtMs: 300 },
    { kind: 'inspected', doneAtMs: 200 },
    { kind: 'trimmed', doneAtMs: 100 },
  ]);

  it('begin with each piece of work but an inspection, whatever the order it was told in', () => {
    expect(startsMs).toEqual([100, 300]);
  });

  it('hold what was measured from one piece of work to the next', () => {
    expect([50, 99, 100, 250, 300, 900].map((ms) => eraIndexAt(startsMs, ms))).toEqual([
      0, 0, 1, 1, 2, 2,
    ]);
  });

  it('are one where nothing was done', () => {
    expect(eraIndexAt([], 5)).toBe(0);
  });
});

import { describe, expect, it } from 'vitest';
import { byUrgency, dueOf } from '../../../core/record/due.ts';
import { dayMs } from '../../support/history-rows.ts';

const due = (lastTestDay: number | null, intervalDays: number | null, nowDay = 1000) =>
  dueOf({
    addedAtMs: 0,
    lastTestMs: lastTestDay === null ? null : lastTestDay * dayMs,
    intervalDays,
    nowMs: nowDay * dayMs,
  });

describe('an antenna with an interval', () => {
  it('is due that long after its newest test, and overdue after that', () => {
    expect(due(700, 365)).toMatchObject({ state: 'not_due', dueAtMs: 1065 * dayMs });
    expect(due(664, 365)).toMatchObject({ state: 'due_soon', overdueDays: -29 });
    expect(due(635, 365)).toMatchObject({ state: 'due_soon', overdueDays: 0 });
    expect(due(600, 365)).toMatchObject({ state: 'overdue', overdueDays: 35 });
  });

  it('that was never tested is due since it is in the record', () => {
    expect(due(null, 365)).toMatchObject({ state: 'never_tested', dueAtMs: 0, overdueDays: 1000 });
  });
});

describe('an antenna without an interval', () => {
  it('is never due', () => {
    expect(due(null, null)).toEqual({
      state: 'no_interval',
      intervalDays: null,
      dueAtMs: null,
      overdueDays: null,
    });
  });
});

describe('the list of what is due', () => {
  it('begins with the longest overdue and ends with those that never are', () => {
    const sorted = [due(1, null), due(700, 365), due(600, 365), due(300, 365)].toSorted(byUrgency);
    expect(sorted.map(({ overdueDays }) => overdueDays)).toEqual([335, 35, -65, null]);
  });
});

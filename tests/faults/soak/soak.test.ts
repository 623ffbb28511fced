import { describe, expect, it } from 'vitest';
import type { Gauges } from './gauges.ts';
import { judge } from './judge.ts';

/** Eighty readings over an hour; memory goes up and down by 8 MiB around its line. */
function gaugesOf({ growthMibPerHour = 0, handlesPerHour = 0, logMibPerHour = 0 } = {}): Gauges[] {
  return Array.from({ length: 80 }, (_, i) => {
    const hour = i / 80;
    return {
      minute: hour * 60,
      residentMib: 150 + growthMibPerHour * hour + 8 * Math.sin(i * 2.4),
      handles: 40 + Math.round(handlesPerHour * hour),
      logMib: 4 + logMibPerHour * hour,
    };
  });
}

describe('the judgement of a soak', () => {
  it('finds nothing in a service that stays as it is', () => {
    expect(judge(gaugesOf()).faults).toEqual([]);
  });

  it('has the true slope in its interval', () => {
    const { slopeLow, slopeHigh } = judge(gaugesOf({ growthMibPerHour: 20 }));
    expect(slopeLow).toBeLessThan(20);
    expect(slopeHigh).toBeGreaterThan(20);
  });

  it.each([
    ['memory that grows', { growthMibPerHour: 120 }, 'memory grows'],
    ['handles left open', { handlesPerHour: 200 }, 'handles are left open'],
    ['a log never cut', { logMibPerHour: 100 }, 'the write-ahead log is not cut'],
  ])('finds out %s', (_, growth, fault) => {
    expect(judge(gaugesOf(growth)).faults).toEqual([fault]);
  });
});

import { describe, expect, it } from 'vitest';
import type { AntennaKind } from '../../../core/advice/antenna-kind.ts';
import { trimAdvice } from '../../../core/advice/trim.ts';
import { trimSensitivity } from '../../../core/advice/trim-history.ts';
import type { TrimRequest } from '../../../core/advice/trim-request.ts';
import { accepted, refusalOf } from '../line/builders.ts';

const dipole: TrimRequest = {
  kind: 'dipole',
  goal: 'resonance',
  fromHz: 14.0e6,
  fromU95Hz: 5e3,
  targetHz: 14.175e6,
  lengthM: 10.2,
  throughLine: false,
  history: [],
};
const trim = (change: Partial<TrimRequest>) => accepted(trimAdvice({ ...dipole, ...change }));
const pair = (cm: number, khz: number, u95Khz: number | null = null) => ({
  lengthChangeM: cm / 100,
  frequencyChangeHz: khz * 1e3,
  frequencyChangeU95Hz: u95Khz === null ? null : u95Khz * 1e3,
});
const codes = (list: readonly { code: string }[]) => list.map((each) => each.code);

describe('a bare wire that resonates too low', () => {
  it('is shortened in proportion to the frequency', () => {
    const advice = trim({});
    expect(advice).toMatchObject({
      method: 'simple_rule',
      direction: 'shorten',
      goal: 'resonance',
    });
    expect(advice.lengthChangeM).toBeCloseTo(10.2 * (14.0 / 14.175 - 1), 12);
    expect(advice.lengthChangeFraction).toBeCloseTo(14.0 / 14.175 - 1, 12);
    expect(advice.lengthChangeU95M).toBeCloseTo(
      10.2 * Math.hypot(0.05 * (14.0 / 14.175 - 1), 5e3 / 14.175e6),
      9,
    );
    expect(codes(advice.cautions)).toEqual(['trim_in_steps', 'trim_transmitter_off']);
    expect(advice.detail).toContain('to about 5 %');
  });

  it.each([
    // induced EMF, thin dipoles made 1 % longer (recomputed): length m, MHz before and after
    [10, 14.5703652192, 14.4266165167],
    [20, 7.30179542616, 7.22971754896],
    [1, 142.629386152, 141.232655378],
    [0.95, 147.279147187, 145.851736726],
  ])('and is %d m long follows the rule within its stated half-width', (lengthM, before, after) => {
    const advice = trim({ lengthM, fromHz: before * 1e6, targetHz: after * 1e6, fromU95Hz: 0 });
    const error = Math.abs((advice.lengthChangeM ?? 0) - 0.01 * lengthM);
    expect(advice.direction).toBe('lengthen');
    expect(error).toBeGreaterThan(0);
    expect(error).toBeLessThan(advice.lengthChangeU95M ?? 0);
  });

  it('of unrecorded length is given the usual one, and that is said', () => {
    const advice = trim({ lengthM: null });
    // 468/f ft (handbook value from memory): 33.43 ft at 14.0 MHz
    expect(advice.lengthChangeM).toBeCloseTo((468 / 14) * 0.3048 * (14.0 / 14.175 - 1), 3);
    expect(codes(advice.assumptions)).toEqual(['length_estimated']);
    const vertical = trim({ lengthM: null, kind: 'vertical_with_radials' });
    expect(vertical.lengthChangeM).toBeCloseTo((advice.lengthChangeM ?? 0) / 2, 9);
  });

  it('of unrecorded length and harmonic gets a fraction only', () => {
    const advice = trim({ lengthM: null, kind: 'end_fed' });
    expect(advice.lengthChangeM).toBeNull();
    expect(advice.lengthChangeU95M).toBeNull();
    expect(advice.lengthChangeFraction).toBeCloseTo(-0.01235, 5);
    expect(advice.detail).toContain('1.23 % of its length');
  });

  it('has no half-width where that of the frequency is unknown', () => {
    expect(trim({ fromU95Hz: null }).lengthChangeU95M).toBeNull();
  });

  it('more than 5 % off is asked for a trial first', () => {
    const advice = trim({ targetHz: 15e6 });
    expect(advice).toMatchObject({ method: 'trial', lengthChangeM: null });
    expect(advice.trialChangeM).toBeCloseTo(-0.01 * 10.2, 12);
    expect(advice.detail).toContain('more than 5 %');
  });

  it('through a line is warned of its resonance, not of its least SWR', () => {
    const [first] = trim({ throughLine: true }).cautions;
    expect(first.code).toBe('resonance_seen_through_line');
    const minimum = trim({ throughLine: true, goal: 'swr_minimum' });
    expect(codes(minimum.cautions)).not.toContain('resonance_seen_through_line');
    expect(minimum.goal).toBe('swr_minimum');
  });

  it('within the half-width of its measurement is left alone', () => {
    const advice = trim({ targetHz: 14.004e6 });
    expect(advice).toMatchObject({ method: 'leave', direction: 'leave', lengthChangeM: 0 });
    expect(trim({ targetHz: 14e6, fromU95Hz: null }).method).toBe('leave');
  });
});

describe('loaded, trapped and coupled antennas', () => {
  it.each<AntennaKind>([
    'loaded_dipole',
    'trap_dipole',
    'beam',
    'vertical',
    'five_eighths_vertical',
    'other',
  ])('(%s) never get the simple rule, but a small trial', (kind) => {
    const advice = trim({ kind });
    expect(advice).toMatchObject({
      method: 'trial',
      lengthChangeM: null,
      lengthChangeFraction: null,
    });
    expect(advice.trialChangeM).toBeLessThan(0);
    // a loaded short dipole moves half as much as the rule says (recomputed: -0.46 per unit)
    expect(Math.abs(advice.trialChangeM ?? 1)).toBeLessThan(0.5 * 10.2 * (1 - 14.0 / 14.175));
  });

  it('of unknown length get the trial as a fraction', () => {
    const advice = trim({ kind: 'trap_dipole', lengthM: null });
    expect(advice.trialChangeM).toBeNull();
    expect(advice.detail).toContain('% of its length');
    expect(advice.detail).toContain('innermost');
  });

  it('that are tuned by a capacitor are not trimmed', () => {
    const advice = trim({ kind: 'small_loop' });
    expect(advice.trialChangeM).toBeNull();
    expect(advice.detail).toContain('capacitor');
  });
});

describe('an antenna with a history of its own', () => {
  it('is trimmed by its measured sensitivity', () => {
    const history = [pair(-10, 125), pair(6, -76), pair(-4, 49)];
    const advice = trim({ kind: 'loaded_dipole', history });
    expect(advice.method).toBe('own_sensitivity');
    const slope = -(10 * 125 + 6 * 76 + 4 * 49) / (100 + 36 + 16);
    expect(advice.sensitivity?.hzPerM).toBeCloseTo(slope * 1e5, 3);
    expect(advice.lengthChangeM).toBeCloseTo(175 / slope / 100, 9);
    expect(advice.lengthChangeU95M).toBeGreaterThan(0);
    expect(advice.lengthChangeFraction).toBeCloseTo((advice.lengthChangeM ?? 0) / 10.2, 12);
    expect(advice.detail).toContain('3 earlier change');
    expect(codes(advice.cautions)).not.toContain('beyond_history');
  });

  it('is told when the change goes far beyond what was tried', () => {
    const advice = trim({ history: [pair(-1, 12, 1)], lengthM: null });
    expect(codes(advice.cautions)).toContain('beyond_history');
    expect(advice.lengthChangeFraction).toBeNull();
  });

  it('of one pair without a half-width has a sensitivity without one', () => {
    const advice = trim({ history: [pair(-10, 125)] });
    expect(advice.method).toBe('own_sensitivity');
    expect(advice.lengthChangeU95M).toBeNull();
    expect(trim({ history: [pair(-10, 125, 4)], fromU95Hz: null }).lengthChangeU95M).toBeNull();
  });

  it('that contradicts physics or scatters is not believed', () => {
    const wrong = trim({ history: [pair(10, 125, 2)] });
    expect(wrong.method).toBe('simple_rule');
    expect(codes(wrong.cautions)).toContain('history_contradicts');
    const vague = trim({ history: [pair(-10, 125), pair(-10, -90)], kind: 'beam' });
    expect(vague.method).toBe('trial');
    expect(codes(vague.cautions)).toContain('history_too_vague');
  });
});

describe('the sensitivity of a history', () => {
  it('is not known without a change of length', () => {
    expect(trimSensitivity([])).toBeNull();
    expect(trimSensitivity([pair(0, 100)])).toBeNull();
  });

  it("has the larger of the half-widths of scatter and of the pairs' own", () => {
    const exact = trimSensitivity([pair(-10, 100, 5), pair(10, -100, 5)]);
    expect(exact?.u95HzPerM).toBeCloseTo((Math.SQRT2 * 5e3 * 0.1) / (2 * 0.01), 6);
    const scattered = trimSensitivity([pair(-10, 110, 1), pair(-10, 90, 1)]);
    // residuals +-10 kHz about 100 kHz per 10 cm, t = 12.706 for one degree of freedom
    expect(scattered?.u95HzPerM).toBeCloseTo((12.706 * Math.sqrt(2e8)) / Math.sqrt(0.02), 3);
    const twelve = Array.from({ length: 12 }, (_, i) => pair(-10, 100 + (i % 2 ? 5 : -5)));
    expect(trimSensitivity(twelve)?.u95HzPerM).toBeCloseTo(
      (2.2 * Math.sqrt((12 * 25e6) / 11)) / Math.sqrt(0.12),
      3,
    );
  });
});

describe('a trim that cannot be told', () => {
  it.each([
    ['frequency_not_positive', { fromHz: 0 }],
    ['frequency_not_positive', { targetHz: Number.NaN }],
    ['length_not_positive', { lengthM: -1 }],
  ])('is refused as %s', (code, change) => {
    expect(refusalOf(trimAdvice({ ...dipole, ...change }))).toBe(code);
  });
});

import { describe, expect, it } from 'vitest';
import { standingCautions } from '../../../core/advice/cautions.ts';

function detailOf(code: string): string {
  const caution = standingCautions.find((one) => one.code === code);
  if (caution === undefined) throw new Error(`There is no caution ${code}.`);
  return caution.detail;
}

describe('the standing cautions', () => {
  it('are seven, each with its own code', () => {
    expect(new Set(standingCautions.map(({ code }) => code)).size).toBe(7);
    expect(standingCautions).toHaveLength(7);
  });

  it('say that the whole emission must lie inside an edge', () => {
    expect(detailOf('emission_width_at_edge')).toMatch(/whole emission/);
  });

  it('say that a low SWR proves neither resonance nor efficiency', () => {
    expect(detailOf('low_swr_proves_little')).toMatch(/neither resonance nor efficiency/);
  });

  it.each([
    ['rf_exposure', /limits .* that apply where the station stands/],
    ['power_lines', /local rules/],
    ['lightning', /local codes/],
    ['climbing', /local work rules/],
  ])('defer in %s to what holds at the place', (code, pointer) => {
    expect(detailOf(code)).toMatch(pointer);
  });

  it('warn of voltage at the ends of an antenna', () => {
    expect(detailOf('antenna_voltage')).toMatch(/wire ends/);
  });

  it('declare nothing safe', () => {
    expect(standingCautions.map(({ detail }) => detail).join(' ')).not.toMatch(/\b(is|are) safe\b/);
  });
});

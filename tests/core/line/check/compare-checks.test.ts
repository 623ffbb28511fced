import { describe, expect, it } from 'vitest';
import { findCable } from '../../../../core/line/cables.ts';
import { checkLine } from '../../../../core/line/check/check-line.ts';
import type { LineCheck } from '../../../../core/line/check/checked-line.ts';
import { compareLineChecks } from '../../../../core/line/check/compare-checks.ts';
import { fromFeedPoint } from '../../../../core/line/line.ts';
import { accepted, evenly, exactCable, lineOf, reflectionSweep, section } from '../builders.ts';

const coax = findCable('m17-74-rg213') ?? exactCable();

/** A check of a 30 m line: a splice of some impedance at a place, more loss, another band. */
function check(
  facts: {
    splice?: readonly [m: number, ohm: number];
    lossFactor?: number;
    lengthM?: number;
    farEnd?: 'open' | 'loaded';
    bandHz?: readonly [number, number];
  } = {},
): LineCheck {
  const { splice, lossFactor = 1, lengthM = 30, farEnd = 'open', bandHz = [1e6, 101e6] } = facts;
  const { attenuation } = coax;
  const cable = {
    ...coax,
    attenuation: {
      ...attenuation,
      conductorDbPer100M: attenuation.conductorDbPer100M * lossFactor,
    },
  };
  const [at, ohm] = splice ?? [10, 50];
  const line = lineOf(
    section(cable, at),
    section({ ...cable, characteristicOhm: ohm }, 0.3),
    section(cable, lengthM - at - 0.3),
  );
  const open = reflectionSweep(evenly(bandHz[0], bandHz[1], 401), () => ({ re: 1, im: 0 }));
  return accepted(
    checkLine(accepted(fromFeedPoint(open, line)), {
      farEnd,
      cable: coax,
      velocityFactor: null,
      velocityFactorU95: null,
      lengthM: null,
      lengthU95M: null,
      window: 'kaiser_6',
      compensateLoss: false,
    }),
  );
}

const codes = (earlier: LineCheck, later: LineCheck) =>
  compareLineChecks(earlier, later).map((finding) => finding.code);

describe('a line checked twice', () => {
  it('has no findings when it stayed as it was', () => {
    expect(codes(check({ splice: [12, 65] }), check({ splice: [12, 65] }))).toEqual([]);
  });

  it('gained loss', () => {
    expect(codes(check(), check({ lossFactor: 1.5 }))).toEqual(['line_gained_loss']);
  });

  it('gained a fault, or lost one', () => {
    expect(codes(check(), check({ splice: [12, 65] }))).toEqual(['line_fault_new']);
    expect(codes(check({ splice: [12, 65] }), check())).toEqual(['line_fault_gone']);
  });

  it('has a fault that moved a little', () => {
    expect(codes(check({ splice: [12, 65] }), check({ splice: [12.8, 65] }))).toEqual([
      'line_fault_moved',
    ]);
  });

  it('has a fault that grew', () => {
    expect(codes(check({ splice: [12, 65] }), check({ splice: [12, 85] }))).toEqual([
      'line_fault_grew',
    ]);
  });

  it('has another length', () => {
    expect(codes(check(), check({ lengthM: 25 }))).toContain('line_length_changed');
  });

  it('is compared for loss only where both sweeps overlap, and where both saw the end', () => {
    const high = check({ lossFactor: 2, bandHz: [200e6, 300e6] });
    expect(codes(check(), high)).not.toContain('line_gained_loss');
    expect(codes(check(), check({ lossFactor: 2, farEnd: 'loaded' }))).toEqual([]);
  });
});

import { describe, expect, it } from 'vitest';
import type { AntennaKind } from '../../../core/advice/antenna-kind.ts';
import { type HotSpotRequest, hotSpots } from '../../../core/advice/hot-spots.ts';
import {
  expectedResistance,
  type RadiatorKind,
  radiatorOf,
} from '../../../core/advice/radiator.ts';
import { dipoleImpedance } from '../../../server/demo/models/induced-emf.ts';
import { accepted, refusalOf } from '../line/builders.ts';

const LIGHT = 299_792_458;
const hz = 7.1e6;
const wavelengthM = LIGHT / hz;
const request: HotSpotRequest = {
  radiator: 'half_wave_dipole',
  frequencyHz: hz,
  powerW: 100,
  feedResistanceOhm: 64,
  armM: null,
  radiusM: null,
};
const spotsOf = (change: Partial<HotSpotRequest>) => accepted(hotSpots({ ...request, ...change }));
const places = (change: Partial<HotSpotRequest>) =>
  spotsOf(change).spots.map((spot) => [spot.what, spot.place]);

describe('a half-wave dipole under power', () => {
  const dipole = spotsOf({});

  it('has its current at the feed and its voltage at the ends', () => {
    expect(places({})).toEqual([
      ['high_current', 'feed'],
      ['high_voltage', 'end'],
    ]);
    expect(places({ radiator: 'half_wave_vertical' })).toEqual(places({}));
  });

  it('has the feed current of its power and no current at its ends', () => {
    expect(dipole.currentA[0]).toBeCloseTo(Math.sqrt(100 / 64), 9);
    expect(dipole.currentA.at(-1)).toBeCloseTo(0, 9);
  });

  it('has hundreds of volts at its ends at 100 W', () => {
    // 60 (ln(2h/a) - 1) times the current: about 540 ohm for 1 mm wire on 7 MHz (recomputed)
    const meanOhm = 60 * (Math.log((2 * wavelengthM) / 4 / 0.001) - 1);
    expect(meanOhm).toBeGreaterThan(500);
    expect(dipole.voltageV.at(-1)).toBeCloseTo(meanOhm * Math.sqrt(100 / 64), 6);
    const end = dipole.spots.find((spot) => spot.place === 'end');
    expect(end?.voltageV).toBeGreaterThan(600);
  });

  it('has a current that falls as a cosine from the middle', () => {
    // sinusoidal distribution, C. A. Balanis, Antenna Theory, sec. 4.5: half way it is cos(45 deg)
    expect(dipole.currentA[50] / dipole.currentA[0]).toBeCloseTo(Math.SQRT1_2, 9);
  });

  it('says that the ends burn, that nothing is declared safe, and what was assumed', () => {
    const codes = dipole.cautions.map((caution) => caution.code);
    expect(codes[0]).toBe('ends_burn_and_arc');
    expect(codes).toContain('power_exposure_local');
    expect(codes).not.toContain('radials_carry_current');
    expect(dipole.assumptions.map((each) => each.code)).toEqual([
      'arm_length_assumed',
      'radius_assumed',
    ]);
  });

  it('assumes nothing where all is stated', () => {
    expect(spotsOf({ armM: 10, radiusM: 0.0015 }).assumptions).toEqual([]);
  });
});

describe('a vertical over radials', () => {
  it('has its current at the foot and its voltage at the top', () => {
    const facts = { radiator: 'quarter_wave_over_radials', feedResistanceOhm: null } as const;
    expect(places(facts)).toEqual([
      ['high_current', 'feed'],
      ['high_voltage', 'end'],
    ]);
    const vertical = spotsOf(facts);
    expect(vertical.cautions.map((each) => each.code)).toContain('radials_carry_current');
    expect(vertical.assumptions.map((each) => each.code)).toContain('feed_resistance_assumed');
    expect(vertical.measuredResistanceOhm).toBeNull();
  });
});

describe('a five-eighths vertical', () => {
  const tall = spotsOf({ radiator: 'five_eighths_vertical', frequencyHz: 145e6 });
  const wave = LIGHT / 145e6;

  it('has voltage an eighth of a wave above the foot and at the top, current between', () => {
    expect(tall.spots.map((spot) => [spot.what, spot.place])).toEqual([
      ['high_voltage', 'along'],
      ['high_current', 'along'],
      ['high_voltage', 'end'],
    ]);
    expect(tall.spots[0].distanceM / wave).toBeCloseTo(0.125, 9);
    expect(tall.spots[1].distanceM / wave).toBeCloseTo(0.375, 9);
  });

  it('carries 1.41 times its feed current at the maximum', () => {
    expect(tall.spots[1].currentA / tall.currentA[0]).toBeCloseTo(Math.SQRT2, 9);
  });
});

describe('a loaded short dipole', () => {
  it('has its current at the feed, falling nearly evenly to the ends', () => {
    const short = spotsOf({
      radiator: 'loaded_short_dipole',
      frequencyHz: 3.65e6,
      armM: 5,
      feedResistanceOhm: 14,
    });
    expect(short.spots[0]).toMatchObject({ what: 'high_current', place: 'feed', distanceM: 0 });
    expect(short.currentA[0]).toBeCloseTo(Math.sqrt(100 / 14), 9);
    expect(short.currentA[50] / short.currentA[0]).toBeCloseTo(0.5, 1);
    expect(short.assumptions.map((each) => each.code)).toContain('loaded_at_centre');
    // short dipole 20 pi^2 (l/lambda)^2: 2.926 ohm for 10 m on 3.65 MHz (recomputed)
    expect(short.expected.lowOhm).toBeCloseTo(2.925998264, 8);
  });
});

describe('a feed point at a current node', () => {
  it('keeps the estimate finite', () => {
    const fullWave = spotsOf({ armM: wavelengthM / 2, feedResistanceOhm: 3000 });
    expect(Math.max(...fullWave.currentA)).toBeLessThan(11 * Math.sqrt(100 / 3000));
  });
});

describe('the feed resistance that theory expects', () => {
  it('is that of the induced-EMF method', () => {
    const half = dipoleImpedance(LIGHT, { lengthM: 0.5, radiusM: 1e-4 });
    expect(expectedResistance('half_wave_dipole', 0.25).highOhm).toBeCloseTo(half.re, 1);
    expect(expectedResistance('quarter_wave_over_radials', 0.25).highOhm).toBeCloseTo(
      half.re / 2,
      1,
    );
    const tall = dipoleImpedance(LIGHT, { lengthM: 1.25, radiusM: 1e-4 }).re / 2;
    const { lowOhm, highOhm } = expectedResistance('five_eighths_vertical', 0.625);
    expect(tall).toBeGreaterThan(lowOhm);
    expect(tall).toBeLessThan(highOhm);
    expect(expectedResistance('half_wave_vertical', 0.25).highOhm).toBe(100);
  });
});

describe('a measured feed resistance beside theory', () => {
  const compared = (change: Partial<HotSpotRequest>) => spotsOf(change).comparison;

  it('is below, within or above it', () => {
    expect(compared({ feedResistanceOhm: 40 })?.standing).toBe('below');
    expect(compared({ feedResistanceOhm: 66 })?.standing).toBe('within');
    expect(compared({ feedResistanceOhm: 95 })?.standing).toBe('above');
    expect(compared({ feedResistanceOhm: null })).toBeNull();
  });

  it('above that of a vertical over radials points to loss in the ground', () => {
    const vertical = compared({ radiator: 'quarter_wave_over_radials', feedResistanceOhm: 55 });
    expect(vertical).toMatchObject({ standing: 'above' });
    expect(vertical?.detail).toContain('loss in ground and radials');
  });

  it('far above that of a loaded short dipole points to its coils', () => {
    const loaded = compared({
      radiator: 'loaded_short_dipole',
      frequencyHz: 3.65e6,
      armM: 5,
      feedResistanceOhm: 14,
    });
    expect(loaded?.detail).toContain('loss in coils');
  });
});

describe('kinds of antenna', () => {
  it.each<[AntennaKind, string | null]>([
    ['dipole', 'half_wave_dipole'],
    ['vertical', 'half_wave_vertical'],
    ['vertical_with_radials', 'quarter_wave_over_radials'],
    ['five_eighths_vertical', 'five_eighths_vertical'],
    ['loaded_dipole', 'loaded_short_dipole'],
    ['loop', null],
    ['trap_dipole', null],
    ['beam', null],
  ])('%s has the distribution of %s', (kind, radiator) => {
    expect(radiatorOf(kind)).toBe(radiator);
  });

  it('have a usual length where none is stated', () => {
    const arm = (radiator: RadiatorKind) => spotsOf({ radiator }).armM / wavelengthM;
    expect(arm('half_wave_dipole')).toBeCloseTo(0.25, 12);
    expect(arm('five_eighths_vertical')).toBeCloseTo(0.625, 12);
    expect(arm('loaded_short_dipole')).toBeCloseTo(0.125, 12);
  });

  it('that are taken for something say so', () => {
    const codes = spotsOf({ radiator: 'half_wave_vertical' }).assumptions.map((each) => each.code);
    expect(codes).toContain('vertical_taken_as_half_wave');
  });
});

describe('hot spots that theory does not tell', () => {
  it.each([
    ['request_not_positive', { powerW: 0 }],
    ['request_not_positive', { feedResistanceOhm: -3 }],
    ['request_not_positive', { armM: Number.POSITIVE_INFINITY }],
    ['arm_out_of_range', { armM: 40 }],
    ['arm_out_of_range', { armM: 0.005 }],
  ])('are refused as %s', (code, change) => {
    expect(refusalOf(hotSpots({ ...request, ...change }))).toBe(code);
  });
});

import { describe, expect, it } from 'vitest';
import { licencesOf, limitPlansOf } from '../../../core/bands/bands-of.ts';
import {
  type BandPlan,
  type BandSegment,
  bandNames,
  isBandName,
} from '../../../core/bands/plan.ts';
import { findPlan, listPlans } from '../../../core/bands/plans.ts';
import { mergeRanges } from '../../../core/bands/ranges.ts';

const rows = listPlans().flatMap((plan) => plan.segments.map((segment) => ({ plan, segment })));

function rowsOf(plan: BandPlan, band: string, licence: string | undefined): readonly BandSegment[] {
  return plan.segments.filter((row) => row.band === band && row.licence === licence);
}

function named(plan: BandPlan, { band, lowHz, highHz, licence = '' }: BandSegment): string {
  return `${plan.id} ${licence} ${band} ${lowHz}-${highHz}`;
}

/** Whether every hertz of `inner` lies in `outer`, rows that touch taken together. */
function isCovered(inner: BandSegment, outer: readonly BandSegment[]): boolean {
  return mergeRanges(outer).some(
    (range) => range.lowHz <= inner.lowHz && inner.highHz <= range.highHz,
  );
}

describe('the band plans', () => {
  it('are twelve, with 551 rows', () => {
    expect(listPlans().map(({ id }) => id)).toEqual([
      'itu-r1',
      'itu-r2',
      'itu-r3',
      'national-4m',
      'iaru-r1',
      'iaru-r2',
      'iaru-r3',
      'us-fcc',
      'us-arrl-vhf',
      'uk-ofcom-full',
      'de-afuv',
      'lv-class-a',
    ]);
    expect(rows).toHaveLength(551);
  });

  it('are found by id', () => {
    expect(findPlan('us-fcc')?.authority).toBe('Federal Communications Commission');
    expect(findPlan('nowhere')).toBeNull();
  });

  it('name who issued them, which edition and where it was taken from', () => {
    for (const plan of listPlans()) {
      const texts = [plan.title, plan.authority, plan.edition, plan.source, plan.region];
      expect(texts.every((text) => text.length > 2)).toBe(true);
    }
  });

  it('name only plans that exist as those they nest in', () => {
    for (const plan of listPlans()) {
      expect(plan.nestsIn.map((id) => findPlan(id)?.id)).toEqual(plan.nestsIn);
    }
  });

  it('have edges in whole hertz, low below high, on named bands', () => {
    const bad = rows.filter(
      ({ segment: { band, lowHz, highHz } }) =>
        !isBandName(band) ||
        !Number.isInteger(lowHz) ||
        !Number.isInteger(highHz) ||
        lowHz <= 0 ||
        lowHz >= highHz,
    );
    expect(bad).toEqual([]);
  });

  it('stand in ascending order', () => {
    for (const { segments } of listPlans()) {
      expect(segments.map((row) => row.lowHz)).toEqual(
        segments.map((row) => row.lowHz).sort((a, b) => a - b),
      );
    }
  });

  it('never overlap within a plan, class and band', () => {
    let compared = 0;
    for (const plan of listPlans()) {
      for (const licence of [undefined, ...licencesOf(plan)]) {
        for (const band of bandNames) {
          const own = rowsOf(plan, band, licence);
          for (let i = 1; i < own.length; i++) {
            compared++;
            expect(own[i].lowHz, named(plan, own[i])).toBeGreaterThanOrEqual(own[i - 1].highHz);
          }
        }
      }
    }
    expect(compared).toBeGreaterThan(300);
  });

  it('say of every row where it was read, or that it was not', () => {
    const said = rows.map(({ segment }) => segment.verified);
    expect(said.every((text) => text === 'memory' || /^read in: \w/.test(text))).toBe(true);
    expect(said.filter((text) => text === 'memory')).toHaveLength(31);
  });

  it('name no place on a disk and no address on a network', () => {
    expect(JSON.stringify(listPlans())).not.toMatch(
      /\/\/|\.(com|org|de|cz|cl|be|services)\b|stored/,
    );
  });

  it('carry a status on every allocation and licence row, and a class on every licence row', () => {
    for (const { plan, segment } of rows) {
      expect(segment.status !== undefined, named(plan, segment)).toBe(plan.kind !== 'bandplan');
      expect(segment.licence !== undefined, named(plan, segment)).toBe(plan.kind === 'licence');
    }
  });

  it('allow no bandwidth above the width of the segment', () => {
    const limited = rows.filter(({ segment }) => segment.maxBandwidthHz !== undefined);
    expect(limited.length).toBeGreaterThan(200);
    for (const { plan, segment } of limited) {
      const widthHz = segment.highHz - segment.lowHz;
      expect(segment.maxBandwidthHz, named(plan, segment)).toBeLessThanOrEqual(widthHz);
    }
  });
});

describe('a plan that nests in another', () => {
  it('keeps within it, but for rows that say why not', () => {
    let outside = 0;
    for (const { plan, segment } of rows.filter(({ plan }) => plan.nestsIn.length > 0)) {
      const parents = plan.nestsIn.flatMap((id) => findPlan(id)?.segments ?? []);
      const outer = parents.filter((row) => row.band === segment.band);
      const isInside = isCovered(segment, outer);
      expect(isInside, named(plan, segment)).toBe(segment.outsideParent === undefined);
      if (!isInside) outside++;
    }
    expect(outside).toBe(27);
  });

  it('is limited by that plan if it is voluntary, else by itself', () => {
    const limitIds = (id: string) => {
      const plan = findPlan(id);
      return plan === null ? null : limitPlansOf(plan).map((limit) => limit.id);
    };
    expect(limitIds('iaru-r1')).toEqual(['itu-r1', 'national-4m']);
    expect(limitIds('us-arrl-vhf')).toEqual(['us-fcc']);
    expect(limitIds('de-afuv')).toEqual(['de-afuv']);
  });
});

describe('operator classes in the United States', () => {
  // 47 CFR 97.301: each class has what the lower class has, and more.
  it('contain one another from Technician to Amateur Extra', () => {
    const plan = findPlan('us-fcc');
    expect(plan).not.toBeNull();
    if (plan === null) return;
    const classes = ['Technician', 'General', 'Advanced', 'Amateur Extra'];
    expect([...licencesOf(plan)].sort()).toEqual([...classes].sort());
    let checked = 0;
    for (let i = 1; i < classes.length; i++) {
      for (const lower of plan.segments.filter((row) => row.licence === classes[i - 1])) {
        checked++;
        expect(isCovered(lower, rowsOf(plan, lower.band, classes[i])), named(plan, lower)).toBe(
          true,
        );
      }
    }
    expect(checked).toBe(78);
  });

  // FCC 25-60, in force 13 Feb 2026: channels centred on 5332, 5348, 5373 and 5405 kHz, 2.8 kHz wide.
  it('have four channels and one range at 60 m', () => {
    const sixty = findPlan('us-fcc')?.segments.filter(
      (row) => row.band === '60m' && row.licence === 'General',
    );
    expect(sixty?.map((row) => [row.lowHz, row.highHz])).toEqual([
      [5_330_600, 5_333_400],
      [5_346_600, 5_349_400],
      [5_351_500, 5_366_500],
      [5_371_600, 5_374_400],
      [5_403_600, 5_406_400],
    ]);
  });
});

describe('allocations that are widely known', () => {
  // ITU Radio Regulations, Article 5: values from memory of the table, agreed on by every plan text.
  it.each([
    ['itu-r1', '20m', 14_000_000, 14_350_000],
    ['itu-r2', '20m', 14_000_000, 14_350_000],
    ['itu-r3', '20m', 14_000_000, 14_350_000],
    ['itu-r1', '40m', 7_000_000, 7_200_000],
    ['itu-r2', '40m', 7_000_000, 7_300_000],
    ['itu-r1', '30m', 10_100_000, 10_150_000],
    ['itu-r1', '2m', 144_000_000, 146_000_000],
    ['itu-r2', '2m', 144_000_000, 148_000_000],
  ])('%s gives %s from %i to %i Hz', (id, band, lowHz, highHz) => {
    const own = findPlan(id)?.segments.filter((row) => row.band === band) ?? [];
    expect(mergeRanges(own)).toEqual([{ lowHz, highHz }]);
  });
});

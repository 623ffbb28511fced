import { describe, expect, it } from 'vitest';
import { bandsOf, licencesOf } from '../../../core/bands/bands-of.ts';
import { bandNames } from '../../../core/bands/plan.ts';
import { findPlan } from '../../../core/bands/plans.ts';
import { mergeRanges } from '../../../core/bands/ranges.ts';
import { knownPlan } from './known-plan.ts';

function bandOf(id: string, band: string, licence?: string) {
  const options = licence === undefined ? {} : { licence };
  return bandsOf(knownPlan(id), options).find((one) => one.band === band);
}

describe('the bands of an allocation', () => {
  it('ascend in frequency', () => {
    const names = bandsOf(knownPlan('itu-r1')).map(({ band }) => band);
    expect(names).toEqual(bandNames.filter((name) => names.includes(name)));
    expect(names).toHaveLength(16);
  });

  it('take rows that touch as one range', () => {
    expect(bandOf('itu-r2', '80m')).toMatchObject({
      lowHz: 3_500_000,
      highHz: 4_000_000,
      ranges: [{ lowHz: 3_500_000, highHz: 4_000_000 }],
      nationalRanges: [],
    });
  });

  it('keep national rows out of what is generally permitted', () => {
    expect(bandOf('itu-r1', '6m')).toMatchObject({
      lowHz: 50_000_000,
      highHz: 52_000_000,
      ranges: [{ lowHz: 50_000_000, highHz: 52_000_000 }],
      nationalRanges: [{ lowHz: 52_000_000, highHz: 54_000_000 }],
    });
    expect(bandOf('itu-r1', '160m')).toMatchObject({ lowHz: 1_810_000, highHz: 1_850_000 });
  });

  it('show where a band lies that has national rows alone, and permit nothing there', () => {
    expect(bandOf('national-4m', '4m')).toMatchObject({
      lowHz: 69_900_000,
      highHz: 70_500_000,
      ranges: [],
    });
  });
});

describe('the bands of a voluntary plan', () => {
  it('are limited by the allocation behind it, whatever its own rows say', () => {
    const band = bandOf('iaru-r1', '160m');
    expect(band?.segments.at(-1)?.highHz).toBe(2_000_000);
    expect(band?.ranges).toEqual([{ lowHz: 1_810_000, highHz: 1_850_000 }]);
  });

  it('are limited by the licence behind it', () => {
    expect(bandOf('us-arrl-vhf', '2m', 'Technician')?.ranges).toEqual([
      { lowHz: 144_000_000, highHz: 148_000_000 },
    ]);
  });

  it('are only those that it divides', () => {
    expect(bandsOf(knownPlan('us-arrl-vhf')).map(({ band }) => band)).toEqual(['6m', '2m', '70cm']);
  });
});

describe('the bands of a licence', () => {
  it('are those of the class', () => {
    expect(bandOf('us-fcc', '40m', 'Technician')).toMatchObject({
      lowHz: 7_025_000,
      highHz: 7_125_000,
    });
    expect(bandOf('us-fcc', '20m', 'Technician')).toBeUndefined();
  });

  it('are those of every class together where none is given', () => {
    expect(bandOf('us-fcc', '40m')).toMatchObject({ lowHz: 7_000_000, highHz: 7_300_000 });
  });

  it('may go beyond the allocation, for national law comes first', () => {
    const channels = bandOf('us-fcc', '60m', 'General');
    expect(channels?.ranges).toHaveLength(5);
    expect(channels?.highHz).toBe(5_406_400);
    expect(findPlan('itu-r2')?.segments.find((row) => row.band === '60m')?.highHz).toBe(5_366_500);
  });

  it('may fall short of the allocation', () => {
    expect(bandOf('de-afuv', '20m', 'N')).toBeUndefined();
    expect(bandOf('itu-r1', '20m')).toBeDefined();
  });

  it('name its classes', () => {
    expect(licencesOf(knownPlan('de-afuv')).toSorted()).toEqual(['A', 'E', 'N']);
    expect(licencesOf(knownPlan('us-arrl-vhf'))).toHaveLength(4);
    expect(licencesOf(knownPlan('itu-r1'))).toEqual([]);
  });
});

describe('ranges', () => {
  it('become one where they touch or overlap, in whatever order they come', () => {
    const ranges = [
      { lowHz: 5, highHz: 9 },
      { lowHz: 1, highHz: 3 },
      { lowHz: 3, highHz: 4 },
      { lowHz: 6, highHz: 7 },
    ];
    expect(mergeRanges(ranges)).toEqual([
      { lowHz: 1, highHz: 4 },
      { lowHz: 5, highHz: 9 },
    ]);
  });
});

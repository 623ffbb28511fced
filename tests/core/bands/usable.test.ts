import { describe, expect, it } from 'vitest';
import { standingCautions } from '../../../core/advice/cautions.ts';
import { type UsableOptions, usableBands } from '../../../core/bands/usable.ts';
import type { BandUse } from '../../../core/bands/usable-report.ts';
import { knownPlan } from './known-plan.ts';
import { swrPolyline } from './swr-polyline.ts';

type Polyline = Parameters<typeof swrPolyline>;

function report(polyline: Polyline, plan: string, options: Partial<UsableOptions> = {}) {
  return usableBands(swrPolyline(...polyline), knownPlan(plan), { maxSwr: 2, ...options });
}

function onlyBand(polyline: Polyline, plan = 'itu-r1', options: Partial<UsableOptions> = {}) {
  const { bands } = report(polyline, plan, options);
  expect(bands).toHaveLength(1);
  return bands[0];
}

/** A curve with the SWR `edge` at both ends of the 20 m band and 1 in its middle. */
function acrossTwentyMetres(edge: number): Polyline[0] {
  return [
    [14_000_000, edge],
    [14_175_000, 1],
    [14_350_000, edge],
  ];
}

describe('a band that was swept as a whole', () => {
  it('is usable where SWR never passes the limit', () => {
    expect(onlyBand([acrossTwentyMetres(1.9)])).toMatchObject({
      band: '20m',
      lowHz: 14_000_000,
      highHz: 14_350_000,
      permission: 'general',
      verdict: 'usable',
      marginal: false,
      detail: 'SWR is at or below 2 on the whole band.',
      sweptFraction: 1,
      usableFraction: 1,
      worstSwr: 1.9,
      worstSwrHz: 14_000_000,
      minimumSwr: 1,
      minimumSwrHz: 14_175_000,
      spans: [{ lowHz: 14_000_000, highHz: 14_350_000 }],
    });
  });

  it('is usable where SWR just reaches the limit', () => {
    expect(onlyBand([acrossTwentyMetres(2)]).verdict).toBe('usable');
  });

  it('is partly usable where SWR passes the limit', () => {
    const band = onlyBand([acrossTwentyMetres(3)]);
    expect(band.verdict).toBe('partly_usable');
    expect(band.usableFraction).toBe(0.5);
    expect(band.spans).toEqual([{ lowHz: 14_087_500, highHz: 14_262_500 }]);
    expect(band.detail).toBe(
      'SWR is at or below 2 on 50 % of the band and above it elsewhere; 100 % of the band was swept.',
    );
  });

  it('is not usable where SWR is above the limit throughout', () => {
    const flat: Polyline[0] = [
      [13_900_000, 2.1],
      [14_400_000, 2.1],
    ];
    expect(onlyBand([flat])).toMatchObject({
      verdict: 'not_usable',
      usableFraction: 0,
      spans: [],
      detail: 'SWR is above 2 on the whole band.',
    });
  });

  it('has no span where SWR falls to the limit just at its edge', () => {
    const touching: Polyline[0] = [
      [13_900_000, 1],
      [14_000_000, 2],
      [14_400_000, 6],
    ];
    expect(onlyBand([touching])).toMatchObject({ verdict: 'not_usable', spans: [] });
  });

  it('counts as swept if the sweep stops within a hertz of its edge', () => {
    const band = onlyBand([
      [
        [14_000_000.4, 1.5],
        [14_349_999.2, 1.5],
      ],
    ]);
    expect(band).toMatchObject({ verdict: 'usable', sweptFraction: 1, usableFraction: 1 });
    expect(band.spans).toEqual([{ lowHz: 14_000_000, highHz: 14_350_000 }]);
  });

  it('reports total reflection as the worst, without a number', () => {
    const band = onlyBand([
      [
        [14_000_000, 1],
        [14_300_000, 3],
        [14_350_000, Number.POSITIVE_INFINITY],
      ],
    ]);
    expect(band).toMatchObject({ worstSwr: null, worstSwrHz: 14_350_000, minimumSwr: 1 });
  });
});

describe('a band that was swept in part', () => {
  const lowerHalf = (low: number, high: number): Polyline => [
    [
      [14_000_000, low],
      [14_175_000, high],
    ],
  ];

  it('is partly swept if what was swept is usable: the rest is unknown', () => {
    expect(onlyBand(lowerHalf(1.2, 1.8))).toMatchObject({
      verdict: 'partly_swept',
      sweptFraction: 0.5,
      usableFraction: 0.5,
      worstSwr: 1.8,
      detail:
        'Only 50 % of the band was swept; SWR is at or below 2 there, and the rest is unknown.',
    });
  });

  it('is partly swept if what was swept is not usable: the rest may be', () => {
    expect(onlyBand(lowerHalf(3, 2.5))).toMatchObject({
      verdict: 'partly_swept',
      sweptFraction: 0.5,
      usableFraction: 0,
      detail: 'Only 50 % of the band was swept; SWR is above 2 there, and the rest is unknown.',
    });
  });

  it('is partly usable if the swept part holds both: so it is whatever the rest may be', () => {
    expect(onlyBand(lowerHalf(1, 3))).toMatchObject({
      verdict: 'partly_usable',
      sweptFraction: 0.5,
      usableFraction: 0.25,
    });
  });

  it('is never said to be swept by 0 or 100 %', () => {
    const sliver = (fromHz: number, toHz: number) =>
      onlyBand([
        [
          [fromHz, 1],
          [toHz, 1],
        ],
      ]).detail;
    expect(sliver(13_900_000, 14_000_500)).toContain('less than 1 %');
    expect(sliver(13_900_000, 14_349_500)).toContain('more than 99 %');
  });

  it('of one point has no width, and a verdict of partly swept', () => {
    expect(onlyBand([[[14_100_000, 1.1]]])).toMatchObject({
      verdict: 'partly_swept',
      sweptFraction: 0,
      usableFraction: 0,
      worstSwr: 1.1,
      detail:
        'Only one frequency of the band was swept; SWR is at or below 2 there, and the rest is unknown.',
    });
  });
});

describe('the bands that a report is about', () => {
  it('are those that the sweep touches, ascending', () => {
    const wide: Polyline[0] = [
      [6_900_000, 1.5],
      [14_200_000, 1.5],
    ];
    expect(report([wide], 'itu-r1').bands.map(({ band, verdict }) => [band, verdict])).toEqual([
      ['40m', 'usable'],
      ['30m', 'usable'],
      ['20m', 'partly_swept'],
    ]);
  });

  it('are not those at whose edge the sweep ends', () => {
    const below: Polyline[0] = [
      [13_000_000, 1.5],
      [14_000_000, 1.5],
    ];
    expect(report([below], 'itu-r1').bands).toEqual([]);
  });

  it('are also those the antenna is meant for, as not swept', () => {
    const { bands } = report([acrossTwentyMetres(1.5)], 'itu-r1', { designBands: ['20m', '40m'] });
    expect(bands.map(({ band }) => band)).toEqual(['40m', '20m']);
    expect(bands[0]).toMatchObject({
      verdict: 'not_swept',
      marginal: false,
      sweptFraction: 0,
      usableFraction: 0,
      worstSwr: null,
      worstSwrHz: null,
      minimumSwr: null,
      detail: 'The sweep does not reach this band.',
    });
    expect(bands[0].segments.every(({ verdict }) => verdict === 'not_swept')).toBe(true);
  });

  it('leave out a design band that the plan does not have, and say so', () => {
    const { bands, cautions } = report([acrossTwentyMetres(1.5)], 'itu-r1', {
      designBands: ['20m', '4m'],
    });
    expect(bands.map(({ band }) => band)).toEqual(['20m']);
    expect(cautions).toContainEqual(
      expect.objectContaining({
        code: 'design_band_not_in_plan',
        detail: expect.stringContaining('4m'),
      }),
    );
  });
});

describe('a band of channels', () => {
  // Five ranges: four of 2.8 kHz and one of 15 kHz, 26.2 kHz in all, in a hull of 75.8 kHz.
  const general = { licence: 'General' };

  it('is measured over the channels, not over the gaps between them', () => {
    const narrow: Polyline[0] = [
      [5_300_000, 3],
      [5_350_000, 3],
      [5_350_001, 1.5],
      [5_367_000, 1.5],
      [5_367_001, 3],
      [5_410_000, 3],
    ];
    const band = onlyBand([narrow], 'us-fcc', general);
    expect(band).toMatchObject({
      band: '60m',
      lowHz: 5_330_600,
      highHz: 5_406_400,
      verdict: 'partly_usable',
      sweptFraction: 1,
    });
    expect(band.ranges).toHaveLength(5);
    expect(band.usableFraction).toBeCloseTo(15 / 26.2, 12);
    expect(band.spans).toEqual([{ lowHz: 5_351_500, highHz: 5_366_500 }]);
  });

  it('is usable where only the gaps are above the limit', () => {
    const gapAbove: Polyline[0] = [
      [5_330_000, 1.5],
      [5_380_000, 1.5],
      [5_390_000, 9],
      [5_400_000, 1.5],
      [5_410_000, 1.5],
    ];
    expect(onlyBand([gapAbove], 'us-fcc', general)).toMatchObject({
      verdict: 'usable',
      usableFraction: 1,
      worstSwr: 1.5,
    });
  });

  it('has no number for its worst SWR if one channel meets total reflection', () => {
    const lastTotal: Polyline[0] = [
      [5_330_000, 1.5],
      [5_403_000, 1.4],
      [5_405_000, Number.POSITIVE_INFINITY],
      [5_407_000, Number.POSITIVE_INFINITY],
    ];
    expect(onlyBand([lastTotal], 'us-fcc', general)).toMatchObject({
      worstSwr: null,
      worstSwrU95: null,
      minimumSwrHz: 5_374_400,
    });
  });

  it('is partly swept where the sweep misses a channel', () => {
    const fourOfFive: Polyline[0] = [
      [5_340_000, 1.5],
      [5_410_000, 1.5],
    ];
    const band = onlyBand([fourOfFive], 'us-fcc', general);
    expect(band.verdict).toBe('partly_swept');
    expect(band.sweptFraction).toBeCloseTo(23.4 / 26.2, 12);
  });

  it('does not appear for a sweep that fits between two channels', () => {
    const between: Polyline[0] = [
      [5_380_000, 1],
      [5_390_000, 1],
    ];
    expect(report([between], 'us-fcc', general).bands).toEqual([]);
  });
});

describe('rows that only a national administration opens', () => {
  const flat = (lowHz: number, highHz: number): Polyline => [
    [
      [lowHz, 1.2],
      [highHz, 1.2],
    ],
  ];

  it('add nothing to a band that is generally permitted below them', () => {
    const band = onlyBand(flat(50_000_000, 54_000_000));
    expect(band).toMatchObject({
      permission: 'part_national',
      highHz: 52_000_000,
      verdict: 'usable',
      spans: [{ lowHz: 50_000_000, highHz: 52_000_000 }],
    });
    expect(band.detail).toContain('are left out');
    expect(
      band.segments.map(({ status, permission, verdict, usableFraction }) => [
        status,
        permission,
        verdict,
        usableFraction,
      ]),
    ).toEqual([
      ['secondary', 'general', 'usable', 1],
      ['national', 'national', 'not_usable', 0],
    ]);
  });

  it('make a band that has no others not usable once swept, with its SWR told all the same', () => {
    const band = onlyBand(flat(69_000_000, 71_000_000), 'national-4m');
    expect(band).toMatchObject({
      permission: 'national',
      verdict: 'not_usable',
      marginal: false,
      sweptFraction: 1,
      usableFraction: 0,
      worstSwr: 1.2,
      spans: [],
      ranges: [],
    });
    expect(band.detail).toContain('whatever the SWR');
  });

  it('make such a band not usable also where it was swept in part', () => {
    const band = onlyBand(flat(70_000_000, 71_000_000), 'national-4m');
    expect(band).toMatchObject({ verdict: 'not_usable', usableFraction: 0 });
    expect(band.sweptFraction).toBeCloseTo(5 / 6, 12);
  });

  it('leave a band that has no others not swept until it is', () => {
    const { bands } = report([acrossTwentyMetres(1.5)], 'iaru-r1', { designBands: ['4m'] });
    expect(bands.find(({ band }) => band === '4m')).toMatchObject({
      permission: 'national',
      verdict: 'not_swept',
    });
  });

  it('are told of in a caution', () => {
    const { cautions } = report(flat(50_000_000, 54_000_000), 'itu-r1');
    expect(cautions).toContainEqual(
      expect.objectContaining({
        code: 'national_rows_not_counted',
        detail: expect.stringContaining('6m'),
      }),
    );
  });
});

describe('segments of a voluntary plan', () => {
  it('are judged each for itself within the band', () => {
    const { segments, verdict } = onlyBand([acrossTwentyMetres(3)], 'iaru-r1');
    expect(verdict).toBe('partly_usable');
    expect(segments.length).toBeGreaterThan(5);
    expect(segments[0]).toMatchObject({
      use: 'CW, contest preferred',
      family: 'cw',
      status: null,
      licence: null,
      maxBandwidthHz: 200,
      lowHz: 14_000_000,
      highHz: 14_060_000,
      verdict: 'not_usable',
      sweptFraction: 1,
      usableFraction: 0,
      worstSwr: 3,
    });
    const beacons = segments.find(({ family }) => family === 'beacon');
    expect(beacons).toMatchObject({ lowHz: 14_099_000, highHz: 14_101_000, verdict: 'usable' });
  });

  it('are judged over their generally permitted part', () => {
    const band = onlyBand(
      [
        [
          [1_800_000, 1.5],
          [2_000_000, 1.5],
        ],
      ],
      'iaru-r1',
    );
    expect(band).toMatchObject({
      verdict: 'usable',
      highHz: 1_850_000,
      permission: 'part_national',
    });
    expect(band.segments.at(-1)).toMatchObject({
      lowHz: 1_843_000,
      highHz: 2_000_000,
      permission: 'part_national',
      verdict: 'usable',
      usableFraction: 1,
    });
  });

  it('take nothing from the band where they leave a gap', () => {
    const flat: Polyline = [
      [
        [143_000_000, 1.5],
        [147_000_000, 1.5],
      ],
    ];
    const band = onlyBand(flat, 'iaru-r1');
    expect(band.ranges).toEqual([{ lowHz: 144_000_000, highHz: 146_000_000 }]);
    expect(band.verdict).toBe('usable');
  });
});

describe('a class of licence', () => {
  const forty: Polyline = [
    [
      [7_000_000, 1.5],
      [7_100_000, 1.5],
      [7_300_000, 3.5],
    ],
  ];

  it('is judged by its own rows', () => {
    const band = onlyBand(forty, 'us-fcc', { licence: 'Technician' });
    expect(band).toMatchObject({ lowHz: 7_025_000, highHz: 7_125_000, verdict: 'usable' });
    expect(band.segments.map(({ licence }) => licence)).toEqual(['Technician']);
  });

  it('counts every class if none is given, and says so', () => {
    const { bands, cautions, licence } = report(forty, 'us-fcc');
    expect(licence).toBeNull();
    expect(bands[0]).toMatchObject({ lowHz: 7_000_000, verdict: 'partly_usable' });
    expect(cautions.map(({ code }) => code)).toContain('licence_not_given');
  });

  it('that the plan does not know permits nothing, and says so', () => {
    const { bands, cautions } = report(forty, 'us-fcc', { licence: 'Full' });
    expect(bands).toEqual([]);
    expect(cautions.map(({ code }) => code)).toContain('licence_unknown');
  });

  it('makes no difference to an allocation, and says so', () => {
    const { bands, cautions } = report(forty, 'itu-r2', { licence: 'Full' });
    expect(bands).toHaveLength(1);
    expect(cautions).toContainEqual(
      expect.objectContaining({
        code: 'licence_unknown',
        detail: expect.stringContaining('no difference'),
      }),
    );
  });
});

describe('a verdict within the uncertainty of the measurement', () => {
  const edges = (edge: number, halfWidths: Polyline[1]): BandUse =>
    onlyBand([acrossTwentyMetres(edge), halfWidths]);

  it('is marginal where the worst SWR is within its half-width of the limit', () => {
    expect(edges(1.97, { swr: 0.05 })).toMatchObject({ verdict: 'usable', marginal: true });
    expect(edges(2.03, { swr: 0.05 })).toMatchObject({ verdict: 'partly_usable', marginal: true });
    expect(edges(1.97, { swr: 0.02 }).marginal).toBe(false);
    expect(edges(1.97, { swr: 0.05 }).detail).toContain('smaller than the half-width');
  });

  it('is marginal where the least SWR is within its half-width of the limit', () => {
    const dip: Polyline[0] = [
      [14_000_000, 4],
      [14_175_000, 2.02],
      [14_350_000, 4],
    ];
    expect(onlyBand([dip, { swr: 0.05 }])).toMatchObject({ verdict: 'not_usable', marginal: true });
    expect(onlyBand([dip, { swr: 0.01 }]).marginal).toBe(false);
  });

  it('is marginal where a crossing is within its half-width of the edge of the band', () => {
    const rising: Polyline[0] = [
      [14_000_000, 1],
      [14_349_000, 2],
      [14_400_000, 3],
    ];
    expect(onlyBand([rising, { edgeHz: 2_000 }])).toMatchObject({
      verdict: 'partly_usable',
      marginal: true,
    });
    expect(onlyBand([rising, { edgeHz: 500 }]).marginal).toBe(false);
  });

  it('is not marginal where no half-width is known', () => {
    expect(edges(1.999, {}).marginal).toBe(false);
  });

  it('is marginal where the usable span is narrower than the half-widths of its edges', () => {
    const dip: Polyline[0] = [
      [14_000_000, 4],
      [14_175_000, 1.99],
      [14_350_000, 4],
    ];
    expect(onlyBand([dip, { edgeHz: 1_000 }])).toMatchObject({
      verdict: 'partly_usable',
      marginal: true,
    });
    expect(onlyBand([dip, { edgeHz: 100 }]).marginal).toBe(false);
  });
});

describe('the cautions of a report', () => {
  const codesFor = (plan: string, licence?: string) =>
    report([acrossTwentyMetres(1.5)], plan, licence === undefined ? {} : { licence }).cautions.map(
      ({ code }) => code,
    );
  const standing = standingCautions.map(({ code }) => code);

  it('always end with the standing ones', () => {
    expect(codesFor('de-afuv', 'A')).toEqual(standing);
  });

  it('tell of an old edition', () => {
    expect(codesFor('iaru-r3')).toEqual([
      'plan_old_edition',
      'plan_unconfirmed',
      'plan_voluntary',
      ...standing,
    ]);
  });

  it('tell of rows from memory in a band of the report, and only then', () => {
    expect(codesFor('itu-r1')).toEqual(['plan_unconfirmed', 'plan_not_a_licence', ...standing]);
    const { cautions } = report([[[1_900_000, 1]]], 'iaru-r1', { designBands: ['160m'] });
    expect(cautions).toContainEqual(
      expect.objectContaining({
        code: 'plan_rows_from_memory',
        detail: expect.stringContaining('160m'),
      }),
    );
  });
});

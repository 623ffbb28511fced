import type { BandPlan } from '../plan.ts';
import { type SegmentGroup, segmentsOf } from '../segment-group.ts';

const nationalPage = 'read in: a Latvian band-plan page, national rule rows';

const groups: readonly SegmentGroup[] = [
  {
    verified: nationalPage,
    status: 'secondary',
    licences: ['A'],
    rows: [
      ['2200m', 135_700, 137_800, 'all modes', 'allocation', 200, '1 W e.i.r.p., 200 Hz'],
      ['630m', 472_000, 479_000, 'all modes', 'allocation', 800, '1 W e.i.r.p., 800 Hz'],
      ['160m', 1_850_000, 2_000_000, 'all modes', 'allocation', null, '10 W'],
      [
        '60m',
        5_351_500,
        5_366_500,
        'all modes',
        'allocation',
        null,
        '15 W e.i.r.p.; the secondary copy prints an 800 Hz limit, possibly copied from 630 m.',
      ],
      ['30m', 10_100_000, 10_150_000, 'all modes', 'allocation', 500, '1000 W, 500 Hz'],
      ['6m', 50_000_000, 52_000_000, 'all modes', 'allocation', null, '800 W'],
      ['4m', 70_000_000, 70_500_000, 'all modes', 'allocation', null, '100 W'],
    ],
  },
  {
    verified: nationalPage,
    status: 'primary',
    licences: ['A'],
    rows: [
      ['160m', 1_810_000, 1_850_000, 'all modes', 'allocation', null, '1000 W'],
      ['80m', 3_500_000, 3_800_000, 'all modes', 'allocation', null, '1000 W'],
      ['40m', 7_000_000, 7_200_000, 'all modes', 'allocation', null, '1000 W'],
      ['20m', 14_000_000, 14_350_000, 'all modes', 'allocation', null, '1000 W'],
      ['17m', 18_068_000, 18_168_000, 'all modes', 'allocation', null, '1000 W'],
      ['15m', 21_000_000, 21_450_000, 'all modes', 'allocation', null, '1000 W'],
      ['12m', 24_890_000, 24_990_000, 'all modes', 'allocation', null, '1000 W'],
      ['10m', 28_000_000, 29_700_000, 'all modes', 'allocation', null, '1000 W'],
      [
        '2m',
        144_000_000,
        146_000_000,
        'all modes',
        'allocation',
        null,
        '100 W, 1000 W below 144.4 MHz for some uses',
      ],
      [
        '70cm',
        430_000_000,
        440_000_000,
        'all modes',
        'allocation',
        null,
        '100 W, 1000 W in 432.0-432.4 MHz for some uses',
      ],
    ],
  },
];

/** Latvia amateur bands, class A. */
export const lvClassA: BandPlan = {
  id: 'lv-class-a',
  title: 'Latvia amateur bands, class A',
  kind: 'licence',
  authority: 'Latvian national frequency plan and amateur rules',
  edition: 'undated secondary copy; treat as unconfirmed',
  editionStanding: 'unconfirmed',
  source: 'Latvian amateur radio regulation, band table',
  region: 'Latvia (ITU Region 1)',
  nestsIn: ['itu-r1', 'national-4m'],
  note: 'secondary copy of unknown date; power figures in the notes may be out of date.',
  segments: segmentsOf(groups),
};

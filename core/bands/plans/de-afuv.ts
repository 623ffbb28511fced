import type { BandPlan } from '../plan.ts';
import { type SegmentGroup, segmentsOf } from '../segment-group.ts';

const anlage1 =
  'read in: an exam-training copy of AFuV Anlage 1, state of 27 May 2024, as of 5 Oct 2026';

const groups: readonly SegmentGroup[] = [
  {
    verified: anlage1,
    status: 'secondary',
    licences: ['A'],
    rows: [
      ['2200m', 135_700, 137_800, 'all modes', 'allocation', 800, '1 W ERP'],
      ['630m', 472_000, 479_000, 'all modes', 'allocation', 800, '1 W ERP'],
      ['60m', 5_351_500, 5_366_500, 'all modes', 'allocation', 2700, '9.14 W ERP'],
      ['30m', 10_100_000, 10_150_000, 'all modes', 'allocation', 800, '150 W PEP'],
      [
        '6m',
        50_000_000,
        50_400_000,
        'all modes',
        'allocation',
        12_000,
        '750 W PEP; fixed stations, horizontal polarisation',
      ],
      [
        '6m',
        50_400_000,
        52_000_000,
        'all modes',
        'allocation',
        12_000,
        '25 W PEP; fixed stations, horizontal polarisation',
      ],
      [
        '23cm',
        1_240_000_000,
        1_300_000_000,
        'all modes',
        'allocation',
        2_000_000,
        '750 W PEP; 1247-1263 MHz 3.05 W ERP',
      ],
    ],
  },
  {
    verified: anlage1,
    status: 'primary',
    licences: ['A'],
    rows: [
      ['160m', 1_810_000, 1_850_000, 'all modes', 'allocation', 2700, '750 W PEP'],
      ['80m', 3_500_000, 3_800_000, 'all modes', 'allocation', 2700, '750 W PEP'],
      ['40m', 7_000_000, 7_200_000, 'all modes', 'allocation', 2700, '750 W PEP'],
      ['20m', 14_000_000, 14_350_000, 'all modes', 'allocation', 2700, '750 W PEP'],
      ['17m', 18_068_000, 18_168_000, 'all modes', 'allocation', 2700, '750 W PEP'],
      ['15m', 21_000_000, 21_450_000, 'all modes', 'allocation', 2700, '750 W PEP'],
      ['12m', 24_890_000, 24_990_000, 'all modes', 'allocation', 2700, '750 W PEP'],
      ['10m', 28_000_000, 29_000_000, 'all modes', 'allocation', 7000, '750 W PEP'],
      ['10m', 29_000_000, 29_700_000, 'all modes', 'allocation', 40_000, '750 W PEP'],
      ['2m', 144_000_000, 146_000_000, 'all modes', 'allocation', 40_000, '750 W PEP'],
      ['70cm', 430_000_000, 440_000_000, 'all modes', 'allocation', 2_000_000, '750 W PEP'],
    ],
  },
  {
    verified: anlage1,
    status: 'secondary',
    licences: ['A', 'E'],
    rows: [
      [
        '160m',
        1_850_000,
        1_890_000,
        'all modes',
        'allocation',
        2700,
        '75 W PEP (more at weekends)',
      ],
      [
        '160m',
        1_890_000,
        2_000_000,
        'all modes',
        'allocation',
        2700,
        '10 W PEP (more at weekends)',
      ],
    ],
  },
  {
    verified: anlage1,
    status: 'primary',
    licences: ['E'],
    rows: [
      ['160m', 1_810_000, 1_850_000, 'all modes', 'allocation', 2700, '100 W PEP'],
      ['80m', 3_500_000, 3_800_000, 'all modes', 'allocation', 2700, '100 W PEP'],
      ['15m', 21_000_000, 21_450_000, 'all modes', 'allocation', 2700, '100 W PEP'],
      ['10m', 28_000_000, 29_000_000, 'all modes', 'allocation', 7000, '100 W PEP'],
      ['10m', 29_000_000, 29_700_000, 'all modes', 'allocation', 40_000, '100 W PEP'],
      ['2m', 144_000_000, 146_000_000, 'all modes', 'allocation', 40_000, '75 W PEP'],
      ['70cm', 430_000_000, 440_000_000, 'all modes', 'allocation', 2_000_000, '75 W PEP'],
    ],
  },
  {
    verified: anlage1,
    status: 'secondary',
    licences: ['E'],
    rows: [
      [
        '23cm',
        1_240_000_000,
        1_300_000_000,
        'all modes',
        'allocation',
        2_000_000,
        '75 W PEP; 1247-1263 MHz 3.05 W ERP',
      ],
    ],
  },
  {
    verified: anlage1,
    status: 'primary',
    licences: ['N'],
    rows: [
      ['10m', 28_000_000, 29_000_000, 'all modes', 'allocation', 7000, '10 W ERP'],
      ['10m', 29_000_000, 29_700_000, 'all modes', 'allocation', 40_000, '10 W ERP'],
      ['2m', 144_000_000, 146_000_000, 'all modes', 'allocation', 40_000, '6.1 W ERP'],
      ['70cm', 430_000_000, 440_000_000, 'all modes', 'allocation', 2_000_000, '6.1 W ERP'],
    ],
  },
];

/** Germany amateur bands by class. */
export const deAfuv: BandPlan = {
  id: 'de-afuv',
  title: 'Germany amateur bands by class',
  kind: 'licence',
  authority: 'Bundesnetzagentur / federal ordinance',
  edition: 'AFuV as amended 27 May 2024 (BGBl. 2024 I Nr. 175), in force 24 Jun 2024',
  editionStanding: 'current',
  source: 'Amateurfunkverordnung (AFuV), Anlage 1',
  region: 'Germany (ITU Region 1)',
  nestsIn: ['itu-r1'],
  note: 'Power figures are in the row notes. The temporary 4 m permission in Germany is not in this table.',
  segments: segmentsOf(groups),
};

import type { BandPlan } from '../plan.ts';
import { type SegmentGroup, segmentsOf } from '../segment-group.ts';

const iaruLfMf = 'read in: the IARU Region 1 page on LF and MF allocations';
const cfr97301 =
  'read in: secondary copies of 47 CFR 97.301, Region columns (VHF and UHF as of 2021)';
const footnotes160m = 'read in: a public copy of the table of allocations at 1810 kHz';
const iaruHf = 'read in: the IARU Region 1 page on HF allocations';
const fcc2560 = 'read in: FCC 25-60, paragraph 32, as quoted on 10 Dec 2025';
const table52MHz = 'read in: a public copy of the table of allocations at 52 MHz';
const alsoSatellite = 'Also amateur-satellite. Status from memory.';

const groups: readonly SegmentGroup[] = [
  {
    verified: iaruLfMf,
    status: 'secondary',
    rows: [
      [
        '2200m',
        135_700,
        137_800,
        'amateur',
        'allocation',
        null,
        'No. 5.67A: 1 W e.i.r.p. maximum; 5.67B closes it in some countries of Regions 1 and 3.',
      ],
    ],
  },
  {
    verified: cfr97301,
    status: 'secondary',
    rows: [
      [
        '630m',
        472_000,
        479_000,
        'amateur',
        'allocation',
        null,
        'No. 5.80A: 1 W e.i.r.p., up to 5 W in some territories. Status and power from memory.',
      ],
      ['30m', 10_100_000, 10_150_000, 'amateur', 'allocation', null, 'Fixed is primary.'],
      [
        '70cm',
        430_000_000,
        440_000_000,
        'amateur',
        'allocation',
        null,
        'Radiolocation is primary. Status from memory.',
      ],
      [
        '33cm',
        902_000_000,
        928_000_000,
        'amateur',
        'allocation',
        null,
        'Region 2 only. Status from memory.',
      ],
      [
        '23cm',
        1_240_000_000,
        1_300_000_000,
        'amateur',
        'allocation',
        null,
        'WRC-23 added guidance protecting radionavigation-satellite receivers, no edge change (memory). Status from memory.',
      ],
    ],
  },
  {
    verified: footnotes160m,
    status: 'primary',
    rows: [['160m', 1_800_000, 1_850_000, 'amateur', 'allocation', null, 'Status from memory.']],
  },
  {
    verified: cfr97301,
    status: 'primary',
    rows: [
      [
        '160m',
        1_850_000,
        2_000_000,
        'amateur',
        'allocation',
        null,
        'Shared with other services. Status from memory.',
      ],
      [
        '40m',
        7_000_000,
        7_300_000,
        'amateur',
        'allocation',
        null,
        '7000-7100 kHz is also amateur-satellite (memory). 7200-7300 kHz must not constrain Region 1/3 broadcasting (5.142).',
      ],
      [
        '20m',
        14_000_000,
        14_350_000,
        'amateur',
        'allocation',
        null,
        '14000-14250 kHz is also amateur-satellite. Status from memory.',
      ],
      ['17m', 18_068_000, 18_168_000, 'amateur', 'allocation', null, alsoSatellite],
      ['15m', 21_000_000, 21_450_000, 'amateur', 'allocation', null, alsoSatellite],
      ['12m', 24_890_000, 24_990_000, 'amateur', 'allocation', null, alsoSatellite],
      ['10m', 28_000_000, 29_700_000, 'amateur', 'allocation', null, alsoSatellite],
      ['2m', 144_000_000, 146_000_000, 'amateur', 'allocation', null, alsoSatellite],
      ['2m', 146_000_000, 148_000_000, 'amateur', 'allocation', null, 'Status from memory.'],
    ],
  },
  {
    verified: iaruHf,
    status: 'primary',
    rows: [
      [
        '80m',
        3_500_000,
        3_750_000,
        'amateur',
        'allocation',
        null,
        'Additional or alternative allocations in named countries (5.119, 5.122).',
      ],
      ['80m', 3_750_000, 4_000_000, 'amateur', 'allocation', null, 'Shared with fixed and mobile.'],
    ],
  },
  {
    verified: fcc2560,
    status: 'secondary',
    rows: [
      [
        '60m',
        5_351_500,
        5_366_500,
        'amateur',
        'allocation',
        null,
        'No. 5.133B (WRC-15): 15 W e.i.r.p., higher in some named countries.',
      ],
    ],
  },
  {
    verified: table52MHz,
    status: 'primary',
    rows: [['6m', 50_000_000, 54_000_000, 'amateur', 'allocation']],
  },
  {
    verified: 'memory',
    status: 'primary',
    rows: [
      [
        '1.25m',
        220_000_000,
        225_000_000,
        'amateur',
        'allocation',
        null,
        'Shared with fixed and mobile (primary) and radiolocation.',
      ],
    ],
  },
  {
    verified: cfr97301,
    status: 'national',
    rows: [
      [
        '70cm',
        420_000_000,
        430_000_000,
        'amateur',
        'allocation',
        null,
        'Additional secondary allocation in named countries only (5.270: United States and Jamaica in this region); list from memory.',
      ],
      [
        '70cm',
        440_000_000,
        450_000_000,
        'amateur',
        'allocation',
        null,
        'Additional secondary allocation in named countries only (5.270: United States and Jamaica in this region); list from memory.',
      ],
    ],
  },
];

/** ITU Radio Regulations, Article 5: amateur service, Region 2. */
export const ituR2: BandPlan = {
  id: 'itu-r2',
  title: 'ITU Radio Regulations, Article 5: amateur service, Region 2',
  kind: 'allocation',
  authority: 'ITU',
  edition:
    'Radio Regulations 2020 (WRC-19) content as read through secondary texts; 2024 edition not read',
  editionStanding: 'unconfirmed',
  source:
    'ITU Radio Regulations, Volume 1, Article 5, Section IV (Table of Frequency Allocations) and footnotes',
  region: 'ITU Region 2',
  nestsIn: [],
  note: 'Edges of most bands rest on the Region columns of 47 CFR 97.301, which agree with Article 5 but are not Article 5. National rows are footnote allocations, usable only in the named countries.',
  segments: segmentsOf(groups),
};

import type { BandPlan } from '../plan.ts';
import { type SegmentGroup, segmentsOf } from '../segment-group.ts';

const studyTextTechnician = 'read in: a study text quoting 47 CFR 97.301(e), 97.305 and 97.307(f)';
const ruleTables =
  'read in: tables of 47 CFR 97.301 and 97.305 as of 7 Aug 2026, and a 2021 copy of 97.301';
const studyTextGeneral = 'read in: a study text quoting 47 CFR 97.301(d) and 97.305';
const rule2026 =
  'read in: Federal Register of 14 Jan 2026, document 2026-00587 (opening), a bulletin on it, and a secondary copy';
const studyText = 'read in: a study text quoting 47 CFR 97.301 and 97.305, as of 30 Jul 2026';
const channelEdges =
  '100 W ERP. Edges are centre plus/minus 1.4 kHz, computed from the 2.8 kHz limit.';
const phone7075 =
  'Phone in 7.075-7.100 MHz only for stations outside the continental US (97.307(f)(11)).';
const outside60m = 'US channel outside the ITU 60 m allocation';

const groups: readonly SegmentGroup[] = [
  {
    verified: studyTextTechnician,
    status: 'primary',
    licences: ['Technician'],
    rows: [
      ['80m', 3_525_000, 3_600_000, 'CW only', 'cw', null, '200 W PEP. 97.307(f)(9).'],
      ['40m', 7_025_000, 7_125_000, 'CW only', 'cw', null, '200 W PEP. 97.307(f)(9).'],
      ['15m', 21_025_000, 21_200_000, 'CW only', 'cw', null, '200 W PEP. 97.307(f)(9).'],
      ['10m', 28_000_000, 28_300_000, 'CW, RTTY, data', 'digital', 2800, '200 W PEP.'],
      ['10m', 28_300_000, 28_500_000, 'CW, SSB phone', 'phone', null, '200 W PEP. 97.307(f)(10).'],
    ],
  },
  {
    verified: ruleTables,
    status: 'primary',
    licences: ['Technician', 'General', 'Advanced', 'Amateur Extra'],
    rows: [
      ['6m', 50_000_000, 50_100_000, 'CW only', 'cw'],
      ['6m', 50_100_000, 54_000_000, 'MCW, phone, image, RTTY, data', 'all'],
      ['2m', 144_000_000, 144_100_000, 'CW only', 'cw'],
      ['2m', 144_100_000, 148_000_000, 'MCW, phone, image, RTTY, data', 'all'],
      [
        '1.25m',
        222_000_000,
        225_000_000,
        'all modes including spread spectrum',
        'all',
        null,
        'ITU band starts at 220 MHz; 220-222 MHz is not amateur in the US.',
      ],
    ],
  },
  {
    verified: ruleTables,
    status: 'secondary',
    licences: ['Technician', 'General', 'Advanced', 'Amateur Extra'],
    rows: [
      [
        '1.25m',
        219_000_000,
        220_000_000,
        'data, fixed message forwarding only',
        'digital',
        100_000,
        '50 W PEP; advance notice needed (97.303(l)). Bandwidth figure from memory.',
        'US allocation just below the ITU Region 2 band',
      ],
      [
        '70cm',
        420_000_000,
        450_000_000,
        'all modes including spread spectrum',
        'all',
        null,
        'No transmission north of Line A in 420-430 MHz; power limits near listed military areas.',
      ],
      ['33cm', 902_000_000, 928_000_000, 'all modes', 'all'],
      ['23cm', 1_240_000_000, 1_300_000_000, 'all modes', 'all'],
    ],
  },
  {
    verified: studyTextGeneral,
    status: 'secondary',
    licences: ['General'],
    rows: [
      [
        '2200m',
        135_700,
        137_800,
        'CW, RTTY, data, phone, image',
        'all',
        null,
        '1 W e.i.r.p.; UTC notification needed (97.303(g)).',
      ],
      [
        '630m',
        472_000,
        479_000,
        'CW, RTTY, data, phone, image',
        'all',
        null,
        '5 W e.i.r.p. (1 W in part of Alaska); UTC notification needed (97.303(g)).',
      ],
    ],
  },
  {
    verified: studyTextGeneral,
    status: 'primary',
    licences: ['General'],
    rows: [
      ['160m', 1_800_000, 2_000_000, 'CW, RTTY, data, phone, image', 'all'],
      ['80m', 3_525_000, 3_600_000, 'CW, RTTY, data', 'digital', 2800],
      ['80m', 3_800_000, 4_000_000, 'CW, phone, image', 'phone', null, 'Called 75 m in the rule.'],
      ['40m', 7_025_000, 7_125_000, 'CW, RTTY, data', 'digital', 2800, phone7075],
      ['40m', 7_175_000, 7_300_000, 'CW, phone, image', 'phone'],
      [
        '30m',
        10_100_000,
        10_150_000,
        'CW, RTTY, data',
        'digital',
        2800,
        '200 W PEP. US table entry is AMATEUR in capitals under US247: primary at home, must protect fixed stations abroad; internationally secondary.',
      ],
      ['20m', 14_025_000, 14_150_000, 'CW, RTTY, data', 'digital', 2800],
      ['20m', 14_225_000, 14_350_000, 'CW, phone, image', 'phone'],
      ['17m', 18_068_000, 18_110_000, 'CW, RTTY, data', 'digital', 2800],
      ['17m', 18_110_000, 18_168_000, 'CW, phone, image', 'phone'],
      ['15m', 21_025_000, 21_200_000, 'CW, RTTY, data', 'digital', 2800],
      ['15m', 21_275_000, 21_450_000, 'CW, phone, image', 'phone'],
      ['12m', 24_890_000, 24_930_000, 'CW, RTTY, data', 'digital', 2800],
      ['12m', 24_930_000, 24_990_000, 'CW, phone, image', 'phone'],
      [
        '10m',
        28_000_000,
        28_300_000,
        'CW, RTTY, data',
        'digital',
        2800,
        '2.8 kHz inferred here: 97.307(f)(4), the old 10 m data rule, is now reserved.',
      ],
      ['10m', 28_300_000, 29_700_000, 'CW, phone, image', 'phone'],
    ],
  },
  {
    verified: rule2026,
    status: 'secondary',
    licences: ['General', 'Advanced', 'Amateur Extra'],
    rows: [
      [
        '60m',
        5_330_600,
        5_333_400,
        'channel centred on 5332 kHz: phone, CW, RTTY, data',
        'channel',
        2800,
        channelEdges,
        outside60m,
      ],
      [
        '60m',
        5_346_600,
        5_349_400,
        'channel centred on 5348 kHz: phone, CW, RTTY, data',
        'channel',
        2800,
        channelEdges,
        outside60m,
      ],
      [
        '60m',
        5_351_500,
        5_366_500,
        'phone, CW, RTTY, data',
        'all',
        2800,
        '9.15 W ERP. In force 13 Feb 2026; replaces the 5358.5 kHz channel.',
      ],
      [
        '60m',
        5_371_600,
        5_374_400,
        'channel centred on 5373 kHz: phone, CW, RTTY, data',
        'channel',
        2800,
        channelEdges,
        outside60m,
      ],
      [
        '60m',
        5_403_600,
        5_406_400,
        'channel centred on 5405 kHz: phone, CW, RTTY, data',
        'channel',
        2800,
        channelEdges,
        outside60m,
      ],
    ],
  },
  {
    verified: studyText,
    status: 'secondary',
    licences: ['Advanced', 'Amateur Extra'],
    rows: [
      [
        '2200m',
        135_700,
        137_800,
        'CW, RTTY, data, phone, image',
        'all',
        null,
        '1 W e.i.r.p.; UTC notification needed (97.303(g)).',
      ],
      [
        '630m',
        472_000,
        479_000,
        'CW, RTTY, data, phone, image',
        'all',
        null,
        '5 W e.i.r.p. (1 W in part of Alaska); UTC notification needed (97.303(g)).',
      ],
    ],
  },
  {
    verified: studyText,
    status: 'primary',
    licences: ['Advanced', 'Amateur Extra'],
    rows: [
      ['160m', 1_800_000, 2_000_000, 'CW, RTTY, data, phone, image', 'all'],
      ['40m', 7_125_000, 7_300_000, 'CW, phone, image', 'phone'],
      [
        '30m',
        10_100_000,
        10_150_000,
        'CW, RTTY, data',
        'digital',
        2800,
        '200 W PEP. US table entry is AMATEUR in capitals under US247: primary at home, must protect fixed stations abroad; internationally secondary.',
      ],
      ['17m', 18_068_000, 18_110_000, 'CW, RTTY, data', 'digital', 2800],
      ['17m', 18_110_000, 18_168_000, 'CW, phone, image', 'phone'],
      ['12m', 24_890_000, 24_930_000, 'CW, RTTY, data', 'digital', 2800],
      ['12m', 24_930_000, 24_990_000, 'CW, phone, image', 'phone'],
      [
        '10m',
        28_000_000,
        28_300_000,
        'CW, RTTY, data',
        'digital',
        2800,
        '2.8 kHz inferred here: 97.307(f)(4), the old 10 m data rule, is now reserved.',
      ],
      ['10m', 28_300_000, 29_700_000, 'CW, phone, image', 'phone'],
    ],
  },
  {
    verified: studyText,
    status: 'primary',
    licences: ['Advanced'],
    rows: [
      ['80m', 3_525_000, 3_600_000, 'CW, RTTY, data', 'digital', 2800],
      ['80m', 3_700_000, 4_000_000, 'CW, phone, image', 'phone', null, 'Called 75 m in the rule.'],
      ['40m', 7_025_000, 7_125_000, 'CW, RTTY, data', 'digital', 2800, phone7075],
      ['20m', 14_025_000, 14_150_000, 'CW, RTTY, data', 'digital', 2800],
      ['20m', 14_175_000, 14_350_000, 'CW, phone, image', 'phone'],
      ['15m', 21_025_000, 21_200_000, 'CW, RTTY, data', 'digital', 2800],
      ['15m', 21_225_000, 21_450_000, 'CW, phone, image', 'phone'],
    ],
  },
  {
    verified: studyText,
    status: 'primary',
    licences: ['Amateur Extra'],
    rows: [
      ['80m', 3_500_000, 3_600_000, 'CW, RTTY, data', 'digital', 2800],
      ['80m', 3_600_000, 4_000_000, 'CW, phone, image', 'phone', null, 'Called 75 m in the rule.'],
      ['40m', 7_000_000, 7_125_000, 'CW, RTTY, data', 'digital', 2800, phone7075],
      ['20m', 14_000_000, 14_150_000, 'CW, RTTY, data', 'digital', 2800],
      ['20m', 14_150_000, 14_350_000, 'CW, phone, image', 'phone'],
      ['15m', 21_000_000, 21_200_000, 'CW, RTTY, data', 'digital', 2800],
      ['15m', 21_200_000, 21_450_000, 'CW, phone, image', 'phone'],
    ],
  },
];

/** United States amateur segments by operator class (ITU Region 2). */
export const usFcc: BandPlan = {
  id: 'us-fcc',
  title: 'United States amateur segments by operator class (ITU Region 2)',
  kind: 'licence',
  authority: 'Federal Communications Commission',
  edition: '47 CFR Part 97 as amended by 91 FR 1405 (14 Jan 2026, in force 13 Feb 2026)',
  editionStanding: 'current',
  source:
    '47 CFR 97.301 (bands), 97.303 (sharing, 60 m channels), 97.305 and 97.307 (emissions), 97.313 (power)',
  region: 'United States (ITU Region 2)',
  nestsIn: ['itu-r2'],
  note: 'Edges and emission families were read in copies of the rule. Status was read for 60 m, 30 m, 2 m, 70 cm, 33 cm and 23 cm; it is from memory for the rest. A class may use only its own rows; rows of a higher class include those of a lower one.',
  segments: segmentsOf(groups),
};

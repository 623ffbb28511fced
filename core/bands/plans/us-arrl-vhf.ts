import type { BandPlan } from '../plan.ts';
import { type SegmentGroup, segmentsOf } from '../segment-group.ts';

const sixMetreMix = 'read in: a secondary copy that mixes the ARRL and a Canadian plan';
const planPage = 'read in: the ARRL band plan page as of 25 Sep 2026';
const noteOnPlan = 'read in: a note citing the ARRL plan';

const groups: readonly SegmentGroup[] = [
  {
    verified: sixMetreMix,
    rows: [
      ['6m', 50_000_000, 50_100_000, 'CW, beacons (50.060-50.080)', 'cw'],
      ['6m', 50_100_000, 50_300_000, 'SSB, CW; DX window 50.100-50.125', 'all'],
      ['6m', 50_300_000, 50_600_000, 'all modes', 'all'],
      ['6m', 50_600_000, 50_800_000, 'non-voice', 'digital'],
      ['6m', 50_800_000, 51_000_000, 'radio remote control', 'digital'],
      ['6m', 51_000_000, 51_100_000, 'Pacific DX window', 'all'],
      ['6m', 51_120_000, 51_480_000, 'repeater inputs', 'fm'],
      ['6m', 51_500_000, 51_600_000, 'simplex', 'fm'],
      ['6m', 51_620_000, 51_980_000, 'repeater outputs', 'fm'],
      ['6m', 52_000_000, 52_480_000, 'repeater inputs', 'fm'],
      ['6m', 52_500_000, 52_980_000, 'repeater outputs', 'fm'],
      ['6m', 53_000_000, 53_480_000, 'repeater inputs', 'fm'],
      ['6m', 53_500_000, 53_980_000, 'repeater outputs', 'fm'],
    ],
  },
  {
    verified: planPage,
    rows: [
      ['2m', 144_000_000, 144_050_000, 'EME, CW', 'cw'],
      ['2m', 144_050_000, 144_100_000, 'CW, weak signal', 'cw'],
      ['2m', 144_100_000, 144_200_000, 'EME, weak-signal SSB', 'all'],
      ['2m', 144_200_000, 144_275_000, 'SSB', 'all'],
      ['2m', 144_275_000, 144_300_000, 'beacons', 'beacon'],
      ['2m', 144_300_000, 144_500_000, 'satellite sub-band', 'satellite'],
      ['2m', 144_500_000, 144_600_000, 'linear translator inputs', 'all'],
      ['2m', 144_600_000, 144_900_000, 'FM repeater inputs', 'fm'],
      ['2m', 144_900_000, 145_100_000, 'weak signal, FM simplex', 'fm'],
      ['2m', 145_100_000, 145_200_000, 'linear translator outputs', 'all'],
      ['2m', 145_200_000, 145_500_000, 'FM repeater outputs', 'fm'],
      ['2m', 145_500_000, 145_800_000, 'miscellaneous, experimental', 'all'],
      ['2m', 145_800_000, 146_000_000, 'satellite', 'satellite'],
      ['2m', 146_010_000, 146_370_000, 'repeater inputs', 'fm'],
      ['2m', 146_400_000, 146_580_000, 'simplex', 'fm'],
      ['2m', 146_610_000, 146_970_000, 'repeater outputs', 'fm'],
      ['2m', 147_000_000, 147_390_000, 'repeater outputs', 'fm'],
      ['2m', 147_420_000, 147_570_000, 'simplex', 'fm'],
      ['2m', 147_600_000, 147_990_000, 'repeater inputs', 'fm'],
    ],
  },
  {
    verified: 'memory',
    rows: [
      ['70cm', 420_000_000, 426_000_000, 'ATV', 'all'],
      ['70cm', 426_000_000, 432_000_000, 'ATV', 'all'],
      ['70cm', 432_000_000, 432_070_000, 'EME', 'narrow'],
      ['70cm', 432_070_000, 432_100_000, 'weak-signal CW', 'cw'],
      ['70cm', 432_100_000, 432_300_000, 'weak signal, mixed modes', 'all'],
      ['70cm', 433_000_000, 435_000_000, 'auxiliary and repeater links', 'fm'],
      ['70cm', 435_000_000, 438_000_000, 'satellite', 'satellite'],
      [
        '70cm',
        438_000_000,
        442_000_000,
        'ATV',
        'all',
        null,
        'The plan also lets ATV inputs run to 444 MHz, overlapping repeaters by local option.',
      ],
      ['70cm', 442_000_000, 445_000_000, 'repeaters', 'fm'],
      ['70cm', 445_000_000, 447_000_000, 'links, repeaters, simplex', 'fm'],
      ['70cm', 447_000_000, 450_000_000, 'repeaters', 'fm'],
    ],
  },
  {
    verified: noteOnPlan,
    rows: [
      ['70cm', 432_300_000, 432_400_000, 'beacons', 'beacon'],
      ['70cm', 432_400_000, 433_000_000, 'weak signal, mixed modes', 'all'],
    ],
  },
];

/** ARRL voluntary band plan, 6 m, 2 m and 70 cm. */
export const usArrlVhf: BandPlan = {
  id: 'us-arrl-vhf',
  title: 'ARRL voluntary band plan, 6 m, 2 m and 70 cm',
  kind: 'bandplan',
  authority: 'American Radio Relay League',
  edition: 'undated page; 2 m as of 25 Sep 2026',
  editionStanding: 'unconfirmed',
  source: 'ARRL Band Plan page',
  region: 'United States (ITU Region 2)',
  nestsIn: ['us-fcc'],
  note: 'Voluntary plan.',
  segments: segmentsOf(groups),
};

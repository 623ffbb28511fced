import type { BandPlan } from '../plan.ts';
import { type SegmentGroup, segmentsOf } from '../segment-group.ts';

const groups: readonly SegmentGroup[] = [
  {
    verified: 'memory',
    status: 'national',
    rows: [
      [
        '4m',
        69_900_000,
        70_500_000,
        'amateur where a national administration permits it',
        'allocation',
        null,
        'Not an ITU allocation. CEPT table footnote ECA9: administrations may permit all or part of this range on a secondary basis.',
      ],
    ],
  },
];

/** 4 m band: national permissions, mostly CEPT. */
export const national4m: BandPlan = {
  id: 'national-4m',
  title: '4 m band: national permissions, mostly CEPT',
  kind: 'allocation',
  authority: 'CEPT / national administrations',
  edition: 'ERC Report 25, footnote added about 2008-2012',
  editionStanding: 'old',
  source: 'ERC Report 25 (European Common Allocation Table), Annex 1 footnote ECA9',
  region: 'ITU Region 1 (national)',
  nestsIn: [],
  segments: segmentsOf(groups),
};

import type { BandName, BandSegment, SegmentFamily, SegmentStatus, Verified } from './plan.ts';

/** A plan's row as it is written down; null where its source says nothing. */
export type SegmentRow = readonly [
  band: BandName,
  lowHz: number,
  highHz: number,
  use: string,
  family: SegmentFamily,
  maxBandwidthHz?: number | null,
  note?: string | null,
  outsideParent?: string,
];

/** Rows that were read in one place and share their status and the classes that may use them. */
export interface SegmentGroup {
  readonly verified: Verified;
  readonly status?: SegmentStatus;
  readonly licences?: readonly string[];
  readonly rows: readonly SegmentRow[];
}

/** The rows of all groups as segments, one for each class, ascending in frequency. */
export function segmentsOf(groups: readonly SegmentGroup[]): readonly BandSegment[] {
  return groups.flatMap(segmentsOfGroup).sort((a, b) => a.lowHz - b.lowHz);
}

function segmentsOfGroup(group: SegmentGroup): readonly BandSegment[] {
  const { verified, status } = group;
  const shared = status === undefined ? { verified } : { verified, status };
  const classes = group.licences?.map((licence) => ({ licence })) ?? [{}];
  return group.rows.flatMap((row) =>
    classes.map((licence) => ({ ...factsOfRow(row), ...licence, ...shared })),
  );
}

function factsOfRow([band, lowHz, highHz, use, family, ...more]: SegmentRow) {
  const [maxBandwidthHz, note, outsideParent] = more;
  return {
    band,
    lowHz,
    highHz,
    use,
    family,
    ...(maxBandwidthHz == null ? {} : { maxBandwidthHz }),
    ...(note == null ? {} : { note }),
    ...(outsideParent === undefined ? {} : { outsideParent }),
  };
}

/** Wavelength names of the bands, ascending in frequency. The US 75 m range is filed under 80m. */
export const bandNames = [
  '2200m',
  '630m',
  '160m',
  '80m',
  '60m',
  '40m',
  '30m',
  '20m',
  '17m',
  '15m',
  '12m',
  '10m',
  '6m',
  '4m',
  '2m',
  '1.25m',
  '70cm',
  '33cm',
  '23cm',
] as const;

export type BandName = (typeof bandNames)[number];

/** Whether a text is the name of a band. */
export function isBandName(text: string): text is BandName {
  return (bandNames as readonly string[]).includes(text);
}

/**
 * `allocation`: a table of frequency allocations. `bandplan`: a voluntary division of the band.
 * `licence`: the national right to transmit, by operator class.
 */
export type PlanKind = 'allocation' | 'bandplan' | 'licence';

/**
 * What is known of the edition that a plan was taken from. `current`: the text in force when it was
 * read. `old`: a later edition is known to exist or is to be expected. `unconfirmed`: undated, or a
 * later edition exists and was not compared.
 */
export type EditionStanding = 'current' | 'old' | 'unconfirmed';

/** A grouping of `use`, for filtering and for charts. */
export type SegmentFamily =
  | 'allocation'
  | 'cw'
  | 'narrow'
  | 'digital'
  | 'phone'
  | 'all'
  | 'fm'
  | 'beacon'
  | 'satellite'
  | 'guard'
  | 'channel';

/** `national`: only where an administration or a footnote that names the country permits it. */
export type SegmentStatus = 'primary' | 'secondary' | 'national';

/** Where a row's edges (and its bandwidth, where given) come from. */
export type Verified = 'memory' | `read in: ${string}`;

/** One row of a plan: edges in whole hertz, inclusive limits for the whole emission. */
export interface BandSegment {
  readonly band: BandName;
  readonly lowHz: number;
  readonly highHz: number;
  readonly use: string;
  readonly family: SegmentFamily;
  readonly verified: Verified;
  readonly status?: SegmentStatus;
  /** The operator class that may use the row (licence plans). */
  readonly licence?: string;
  /** Absent where the source gives none. */
  readonly maxBandwidthHz?: number;
  readonly note?: string;
  /** Why the row lies outside the plan that this plan nests in. */
  readonly outsideParent?: string;
}

/** A band plan, with who issued it, which edition was taken and from where. */
export interface BandPlan {
  readonly id: string;
  readonly title: string;
  readonly kind: PlanKind;
  readonly authority: string;
  readonly edition: string;
  readonly editionStanding: EditionStanding;
  readonly source: string;
  readonly region: string;
  /** Ids of the plans whose rows, merged per band, contain every row of this one. */
  readonly nestsIn: readonly string[];
  readonly note?: string;
  /** Ascending in frequency; rows of one class and band never overlap. */
  readonly segments: readonly BandSegment[];
}

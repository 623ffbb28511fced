import type {
  QualityFlag,
  Resonance,
  Summary,
  SwrMinimum,
  UsableSpan,
} from '../analysis/summary.ts';
import type { BandUse, UsableReport } from '../bands/usable-report.ts';
import type { PhaseKnowledge } from '../sweep.ts';
import type { Weather } from './conditions.ts';
import { bandToFile, type FilingBand } from './filing.ts';

/** A resonance as a history keeps it. `*U95` are half-widths of a 95 % interval, null if unknown. */
export type MeasuredResonance = Omit<Resonance, 'matchedBandwidth'>;

/** The lowest SWR of a band as a history keeps it. */
export type MeasuredMinimum = Pick<
  SwrMinimum,
  'frequencyHz' | 'frequencyU95Hz' | 'swr' | 'swrU95' | 'atEdge'
>;

/** The stretch about a band's minimum where SWR is within the limit; it may reach out of the band. */
export interface MeasuredSpan extends UsableSpan {
  /** Null where an edge is unknown or the sweep ended before it. */
  readonly widthU95Hz: number | null;
}

/** What one sweep measured in and near one band. */
export interface BandMeasures {
  readonly band: string;
  readonly sweptFraction: number;
  readonly usableFraction: number;
  /** Ascending in frequency; none where the phase is unknown. */
  readonly resonances: readonly MeasuredResonance[];
  readonly minimum: MeasuredMinimum | null;
  readonly span: MeasuredSpan | null;
  /** Codes of the quality flags that concern the band. */
  readonly flags: readonly string[];
}

/** What one sweep measured: what its history and all statistics are made of. */
export interface SweepMeasures {
  readonly analysisVersion: string;
  readonly plane: Summary['plane'];
  readonly phase: PhaseKnowledge;
  readonly referenceOhm: number;
  /** The limit of the spans. */
  readonly maxSwr: number;
  /** Ascending in frequency: bands that were swept, or near which something was found. */
  readonly bands: readonly BandMeasures[];
}

/** One sweep in the history of its antenna. */
export interface HistoryRow {
  readonly sweepId: string;
  /** Milliseconds since 1970, UTC; when it was received where nobody said when it was measured. */
  readonly measuredAtMs: number;
  readonly analyzerId: string | null;
  readonly condition: Weather | null;
  /** 0 before the first work on the antenna, then one more with each. */
  readonly eraIndex: number;
  readonly measures: SweepMeasures;
}

/** What measures are made from; `spans` hold at the limit of `usable`. */
export interface MeasuredAnswers {
  readonly summary: Summary;
  readonly usable: UsableReport;
  readonly spans: readonly UsableSpan[];
  readonly designBands: readonly string[];
}

/** Files what a sweep's summary found under the bands of its usable-band report. */
export function measuresOf({
  summary,
  usable,
  spans,
  designBands,
}: MeasuredAnswers): SweepMeasures {
  const { analysisVersion, plane, phase, referenceOhm } = summary;
  const filing = usable.bands.map(({ band, lowHz, highHz }) => ({
    band,
    lowHz,
    highHz,
    isDesign: designBands.includes(band),
  }));
  return {
    analysisVersion,
    plane,
    phase,
    referenceOhm,
    maxSwr: usable.maxSwr,
    bands: usable.bands
      .map((use) => bandMeasures(use, filing, summary, spans))
      .filter(({ sweptFraction, resonances, minimum }) => {
        return sweptFraction > 0 || resonances.length > 0 || minimum !== null;
      }),
  };
}

function bandMeasures(
  use: BandUse,
  filing: readonly FilingBand[],
  summary: Summary,
  spans: readonly UsableSpan[],
): BandMeasures {
  const { band, sweptFraction, usableFraction } = use;
  const isHere = ({ frequencyHz }: { readonly frequencyHz: number }) =>
    bandToFile(filing, frequencyHz) === band;
  const resonances = summary.resonances
    .filter(isHere)
    .map(({ matchedBandwidth: _, ...kept }) => kept);
  const minimum = lowest(summary.swrMinima.filter(isHere));
  const flags = summary.quality.flags.filter((flag) => concerns(flag, use, isHere));
  return {
    band,
    sweptFraction,
    usableFraction,
    resonances,
    minimum,
    span: spanAbout(minimum, use, spans),
    flags: [...new Set(flags.map(({ code }) => code))],
  };
}

function lowest(minima: readonly SwrMinimum[]): MeasuredMinimum | null {
  let found: SwrMinimum | null = null;
  for (const minimum of minima) if (found === null || minimum.swr < found.swr) found = minimum;
  if (found === null) return null;
  const { frequencyHz, frequencyU95Hz, swr, swrU95, atEdge } = found;
  return { frequencyHz, frequencyU95Hz, swr, swrU95, atEdge };
}

/** The span that holds the minimum; without a minimum, the one that covers most of the band. */
function spanAbout(
  minimum: MeasuredMinimum | null,
  { lowHz, highHz }: BandUse,
  spans: readonly UsableSpan[],
): MeasuredSpan | null {
  const within = (span: UsableSpan) => Math.min(span.highHz, highHz) - Math.max(span.lowHz, lowHz);
  const held = spans.find(
    (span) =>
      minimum !== null && span.lowHz <= minimum.frequencyHz && minimum.frequencyHz <= span.highHz,
  );
  const widest = spans
    .filter((span) => within(span) >= 0)
    .toSorted((a, b) => within(b) - within(a))
    .at(0);
  const span = minimum === null ? widest : held;
  return span === undefined ? null : { ...span, widthU95Hz: widthU95Hz(span) };
}

/** Root sum of squares of the edges' half-widths. */
function widthU95Hz({ lowU95Hz, highU95Hz }: UsableSpan): number | null {
  if (lowU95Hz === null || highU95Hz === null) return null;
  return Math.hypot(lowU95Hz, highU95Hz);
}

function concerns(
  { lowHz, highHz }: QualityFlag,
  band: BandUse,
  isHere: (place: { readonly frequencyHz: number }) => boolean,
): boolean {
  if (lowHz === undefined || highHz === undefined) return true;
  if (lowHz <= band.highHz && band.lowHz <= highHz) return true;
  return isHere({ frequencyHz: lowHz }) || isHere({ frequencyHz: highHz });
}

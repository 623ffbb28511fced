import type { Summary, UsableSpan } from '../analysis/summary.ts';
import type { UsableReport } from '../bands/usable-report.ts';
import { aimFindings, bandFindings } from './band-findings.ts';
import { type Finding, type FindingFacts, khz, mhz } from './finding.ts';

/** A sweep this much wider than its middle should show an antenna's SWR rise (common practice). */
const WIDE_SWEEP = 0.15;
const FLAT_LIMIT = 2;
/** From this SWR on, a cable end, not an antenna, is likely there (common practice, no source). */
const NO_ANTENNA_SWR = 20;
/** A smaller distance between least SWR and resonance is not worth a word, as a fraction. */
const TELLING_OFFSET = 0.002;

/** Findings of one sweep in plain language, the most urgent first. */
export function findings(
  summary: Summary,
  usable: UsableReport | null,
  facts: FindingFacts,
): readonly Finding[] {
  const whole = wholeSweep(summary, facts);
  if (whole.some((finding) => finding.code === 'no_antenna_seen')) return whole;
  const bands = (usable?.bands ?? []).filter(
    (band) => facts.designBands.length === 0 || facts.designBands.includes(band.band),
  );
  return [
    ...whole,
    ...bands.flatMap((band) => bandFindings(summary, band, facts)),
    ...facts.aims.flatMap((aim) => aimFindings(summary, aim, facts)),
  ];
}

function wholeSweep(summary: Summary, facts: FindingFacts): readonly Finding[] {
  const { minimumSwr } = summary;
  if (minimumSwr === null || minimumSwr.swr > NO_ANTENNA_SWR) {
    return [
      {
        code: 'no_antenna_seen',
        detail:
          'Nearly everything comes back at every frequency: an open or shorted line, a wrong connector, or an antenna for another band. Check the connection, then sweep wider.',
        next: 'sweep_again',
        band: null,
      },
    ];
  }
  const found: Finding[] = [];
  const hidden = facts.lineFlags.find((flag) => flag.code === 'loss_hides_mismatch');
  if (hidden !== undefined) {
    found.push({ ...hidden, next: 'measure_at_feed_point', band: null });
  }
  const flat = flatSpan(summary);
  if (flat !== null) {
    found.push({
      code: 'swr_flat_and_low',
      detail: `SWR stays below ${FLAT_LIMIT} from ${mhz(flat.lowHz)} to ${mhz(flat.highHz)} MHz, flatter than most antennas: suspect loss in the line, and run a line check.`,
      next: 'line_check',
      band: null,
    });
  }
  if (minimumSwr.atEdge) {
    found.push({
      code: 'minimum_outside_sweep',
      detail: `SWR still falls at the end of the sweep, at ${mhz(minimumSwr.frequencyHz)} MHz. Sweep wider on that side.`,
      next: 'sweep_again',
      band: null,
    });
  }
  if (summary.phase !== 'signed') {
    found.push({
      code: 'phase_not_measured',
      detail:
        'Without the sign of the reactance neither a resonance nor a match can be told: sweep with an analyzer that stores the full complex reflection.',
      next: 'sweep_again',
      band: null,
    });
  }
  return [...found, ...offsetFinding(summary)];
}

/** A span within SWR 2 that reaches over both ends of a wide sweep. */
function flatSpan(summary: Summary): UsableSpan | null {
  const { lowHz, highHz } = summary.span;
  if (highHz - lowHz < (WIDE_SWEEP * (highHz + lowHz)) / 2) return null;
  const flat = summary.spans.find(
    (span) => span.maxSwr <= FLAT_LIMIT && span.lowOpen && span.highOpen,
  );
  return flat ?? null;
}

function offsetFinding(summary: Summary): readonly Finding[] {
  const { resonanceOffsetHz, minimumSwr } = summary;
  if (resonanceOffsetHz === null || minimumSwr === null) return [];
  if (Math.abs(resonanceOffsetHz) <= TELLING_OFFSET * minimumSwr.frequencyHz) return [];
  const side = resonanceOffsetHz > 0 ? 'above' : 'below';
  return [
    {
      code: 'minimum_is_not_resonance',
      detail: `The least SWR lies ${khz(resonanceOffsetHz)} kHz ${side} the nearest resonance: they are two things, and a trim moves both.`,
      next: 'leave',
      band: null,
    },
  ];
}

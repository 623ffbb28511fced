import type { MeasuredResonance } from '../../core/record/measures.ts';
import { metricText } from '../metrics.ts';
import type { AntennaStanding, BandStanding } from './dashboard.ts';

const dayMs = 24 * 3600 * 1000;

/**
 * How the antennas of a club stand in the Prometheus text format, labelled by antenna and design
 * band, so that the number of series is bounded by the antennas. What is not known has no series: a
 * rule on its absence then tells, where a 0 would mislead.
 */
export function antennaGauges(standings: readonly AntennaStanding[], nowMs: number): string {
  const perBand = (value: (standing: BandStanding) => number | null) =>
    standings.flatMap(({ antenna, bands }) =>
      bands.map(
        (standing): Sample => [
          `antenna="${antenna.key}",band="${standing.band}"`,
          standing.sweep === null ? null : value(standing),
        ],
      ),
    );
  const sinceTest = standings.map(({ antenna, latestSweep }): Sample => {
    const label = `antenna="${antenna.key}"`;
    if (latestSweep === null) return [label, null];
    const testedAt = latestSweep.facts.measuredAt ?? latestSweep.receivedAt;
    return [label, Math.max(0, (nowMs - Date.parse(testedAt)) / dayMs)];
  });
  return (
    gauge(
      'minimum_swr',
      'Lowest SWR of the newest good sweep of the band.',
      perBand(({ measures }) => measures?.minimum?.swr ?? null),
    ) +
    gauge('resonance_hertz', 'Resonance nearest to the lowest SWR.', perBand(resonanceHz)) +
    gauge(
      'usable_ratio',
      'Part of the band within the limit of the antenna.',
      perBand(({ measures }) => measures?.usableFraction ?? null),
    ) +
    gauge('days_since_test', 'Days since the newest sweep was measured.', sinceTest)
  );
}

/** Labels and value. */
type Sample = readonly [string, number | null];

function gauge(name: string, help: string, samples: readonly Sample[]): string {
  const full = `sweep_ledger_antenna_${name}`;
  const lines = samples.flatMap(([labels, value]) =>
    value === null ? [] : [`${full}{${labels}} ${value}`],
  );
  return metricText(full, 'gauge', help, lines);
}

function resonanceHz({ measures }: BandStanding): number | null {
  const minimum = measures?.minimum ?? null;
  let found: MeasuredResonance | null = null;
  let leastHz = Number.POSITIVE_INFINITY;
  for (const resonance of measures?.resonances ?? []) {
    const awayHz = minimum === null ? 0 : Math.abs(resonance.frequencyHz - minimum.frequencyHz);
    if (awayHz >= leastHz) continue;
    leastHz = awayHz;
    found = resonance;
  }
  return found?.frequencyHz ?? null;
}

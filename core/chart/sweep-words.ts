import type { Resonance, SwrMinimum, UsableSpan } from '../analysis/summary.ts';
import type { BandUse, UsableVerdict } from '../bands/usable-report.ts';
import { type FrequencyUnit, frequencyText, frequencyUnit } from './frequency-scale.ts';
import { type NumberText, numberText } from './number-text.ts';
import type { SweepChart } from './sweep-chart.ts';

const verdicts: Readonly<Record<UsableVerdict, string>> = {
  usable: 'usable',
  partly_usable: 'partly usable',
  not_usable: 'not usable',
  partly_swept: 'not decided by the part that was swept',
  not_swept: 'not swept',
};

/** What a chart of a sweep shows, in words, for those who do not see it. */
export function sweepWords(chart: SweepChart, what: string, language: string): string {
  const { summary, report, heading } = chart;
  const numbers = numberText(language);
  const unit = frequencyUnit(summary.span.highHz);
  const words: Words = { unit, numbers };
  const { lowHz, highHz, points } = summary.span;
  const place = summary.plane === 'feed_point' ? 'at the feed point' : 'as measured';
  return [
    `${what}, ${place}, from ${hertz(lowHz, null, words)} to ${hertz(highHz, null, words)}, ${points} ${points === 1 ? 'point' : 'points'}.`,
    ...minimumWords(summary.minimumSwr, words),
    ...summary.resonances.map((resonance) => resonanceWords(resonance, words)),
    ...summary.reactanceMagnitudeMinima.map(
      ({ frequencyHz, frequencyU95Hz }) =>
        `The reactance, whose sign is not known, is smallest at ${hertz(frequencyHz, frequencyU95Hz, words)}.`,
    ),
    ...spanWords(summary.spans, report.maxSwr, words),
    ...report.bands.map((band) => bandWords(band, words)),
    ...(heading.tableUrl === null ? [] : [`The points as a table: ${heading.tableUrl}`]),
  ].join(' ');
}

interface Words {
  readonly unit: FrequencyUnit;
  readonly numbers: NumberText;
}

function minimumWords(minimum: SwrMinimum | null, words: Words): readonly string[] {
  if (minimum === null) return [];
  const { frequencyHz, frequencyU95Hz, swr, atEdge } = minimum;
  const where = hertz(frequencyHz, frequencyU95Hz, words);
  const edge = atEdge ? ', where the sweep ends before its minimum does' : '';
  return [
    `SWR is least at ${where}: ${words.numbers.fixed(swr, 2)}${edge}${within(frequencyU95Hz, words)}.`,
  ];
}

function resonanceWords(resonance: Resonance, words: Words): string {
  const { frequencyHz, frequencyU95Hz, kind, resistanceOhm, grazing } = resonance;
  const resistance =
    resistanceOhm === null ? '' : `, R ${words.numbers.significant(resistanceOhm, 3)} ohm`;
  const name = grazing ? 'Reactance touches zero' : `Resonance (${kind}; X = 0)`;
  return `${name} at ${hertz(frequencyHz, frequencyU95Hz, words)}${resistance}${within(frequencyU95Hz, words)}.`;
}

/** GUM, 7.2.6: two digits are enough for an uncertainty. */
function within(u95Hz: number | null, { numbers }: Words): string {
  if (u95Hz === null) return '';
  return ` (± ${numbers.significant(u95Hz / 1e3, 2)} kHz)`;
}

function spanWords(spans: readonly UsableSpan[], maxSwr: number, words: Words): readonly string[] {
  const limit = words.numbers.significant(maxSwr, 3);
  if (spans.length === 0) return [`SWR is nowhere at or below the limit of ${limit}.`];
  const parts = spans.map(({ lowHz, lowU95Hz, highHz, highU95Hz, lowOpen, highOpen }) => {
    const low = `${hertz(lowHz, lowU95Hz, words)}${lowOpen ? ' (the edge of the sweep)' : ''}`;
    const high = `${hertz(highHz, highU95Hz, words)}${highOpen ? ' (the edge of the sweep)' : ''}`;
    return `from ${low} to ${high}`;
  });
  return [`SWR is at or below the limit of ${limit} ${parts.join(', ')}.`];
}

function bandWords({ band, verdict, usableFraction }: BandUse, { numbers }: Words): string {
  const part =
    verdict === 'partly_usable' ? `, ${numbers.fixed(100 * usableFraction, 0)} % of it` : '';
  return `${band}: ${verdicts[verdict]}${part}.`;
}

function hertz(hz: number, u95Hz: number | null, { unit, numbers }: Words): string {
  return frequencyText(hz, u95Hz, unit, numbers);
}

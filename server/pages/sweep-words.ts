import type { z } from 'zod';
import type { summarySchema } from '../wire/summary.ts';
import { texts } from './texts.ts';
import { kilohertz, megahertz, plusMinus, swrText } from './values.ts';

type Summary = z.output<typeof summarySchema>;
const words = texts.sweep;
const mostNamed = 4;

/** What a summary tells, as sentences; `maxSwr` is the antenna's own limit. */
export function sentencesOf(summary: Summary, maxSwr: number): readonly string[] {
  return [
    ...minimumSentences(summary),
    ...resonanceSentences(summary),
    ...spanSentences(summary, maxSwr),
  ];
}

function minimumSentences({ minimum_swr: minimum }: Summary): string[] {
  if (minimum === null) return [words.noMinimum];
  const swr = swrText(minimum.swr) + plusMinus(halfWidth(minimum.swr_u95, swrText));
  const at =
    megahertz(minimum.frequency_hz) + plusMinus(halfWidth(minimum.frequency_u95_hz, kilohertz));
  const { resistance_ohm: r, reactance_ohm: x } = minimum;
  const there = r === null || x === null ? [] : [words.impedanceThere(ohms(r), ohms(x))];
  return [minimum.at_edge ? words.minimumAtEdge(swr, at) : words.minimum(swr, at), ...there];
}

function resonanceSentences(summary: Summary): string[] {
  const { resonances, resonance_offset_hz: offset } = summary;
  const nearest = summary.reactance_magnitude_minima.at(0);
  if (summary.phase === 'unsigned' && nearest !== undefined) {
    const least = ohms(nearest.reactance_magnitude_ohm);
    return [words.unsigned(least, megahertz(nearest.frequency_hz))];
  }
  if (resonances.length === 0) return [];
  const named = resonances.slice(0, mostNamed).map((one) => {
    const at = megahertz(one.frequency_hz) + plusMinus(halfWidth(one.frequency_u95_hz, kilohertz));
    const r = one.resistance_ohm === null ? '?' : words.resistance(ohms(one.resistance_ohm));
    return words.resonance[one.kind](at, r);
  });
  const rest = resonances.length - named.length;
  const list = [...named, ...(rest > 0 ? [words.moreResonances(rest)] : [])].join('; ');
  const apart = offset === null ? [] : [words.apart(kilohertz(Math.abs(offset)))];
  return [words.resonances(list), ...apart];
}

function spanSentences({ spans, minimum_swr: minimum }: Summary, maxSwr: number): string[] {
  const within = spans.filter((span) => span.max_swr === maxSwr);
  const limit = String(maxSwr);
  if (within.length === 0) {
    return minimum !== null && minimum.swr > maxSwr ? [words.noSpan(limit)] : [];
  }
  return within.flatMap((span) => [
    words.spanWithin(
      limit,
      megahertz(span.low_hz),
      megahertz(span.high_hz),
      kilohertz(span.width_hz),
    ),
    ...(span.low_open ? [words.openLow] : []),
    ...(span.high_open ? [words.openHigh] : []),
  ]);
}

function halfWidth(value: number | null, toText: (value: number) => string): string | null {
  return value === null ? null : toText(value);
}

function ohms(value: number): string {
  return (Math.abs(value) < 100 ? value.toFixed(1) : value.toFixed(0)).replace('-', '−');
}

import type { z } from 'zod';
import type { usableSchema } from '../wire/usable.ts';
import { type Html, html } from './html.ts';
import { texts } from './texts.ts';
import { megahertz, percent, swrText } from './values.ts';

type Report = z.output<typeof usableSchema>;
type Band = Report['bands'][number];
type Use = Pick<Band, keyof Band & keyof Band['segments'][number]>;
const words = texts.sweep;

/** The usable-band report: a row a band that was swept or that the antenna is meant for. */
export function usableTable(report: Report): Html {
  const shown = report.bands.filter(
    ({ band, verdict }) => verdict !== 'not_swept' || report.design_bands.includes(band),
  );
  const unswept = report.bands.filter((band) => !shown.includes(band)).map(({ band }) => band);
  const rest =
    unswept.length === 0 ? null : html`<p class="aside">${words.notSwept(unswept.join(', '))}</p>`;
  if (shown.length === 0) return html`<p>${words.noBand}</p>${rest}`;
  return html`<div class="wide" role="region" aria-label="${words.usable}" tabindex="0"><table>
<caption>${words.usableCaption(String(report.max_swr), report.plan)}</caption>
<thead><tr><th scope="col">${words.band}</th>${heads}<th scope="col">${words.ranges}</th></tr></thead>
<tbody>${shown.map(
    (band) =>
      html`<tr><th scope="row">${band.band}</th>${cells(band)}<td>${rangesOf(band)}</td></tr>`,
  )}</tbody></table></div>
${rest}
${shown.filter(({ segments, verdict }) => segments.length > 0 && verdict !== 'not_swept').map(segmentTable)}`;
}

const heads = [words.verdict, words.usablePart, words.worst, words.lowest].map(
  (name) => html`<th scope="col">${name}</th>`,
);

function cells(use: Use): Html {
  const verdict = words.verdicts[use.verdict];
  const close = use.marginal ? html` <small>(${words.marginal})</small>` : null;
  return html`<td><span class="verdict ${use.verdict}">${verdict}</span>${close}</td>
<td class="number">${use.verdict === 'not_swept' ? '–' : percent(use.usable_fraction)}</td>
<td>${swrAt(use.worst_swr, use.worst_swr_hz)}</td><td>${swrAt(use.minimum_swr, use.minimum_swr_hz)}</td>`;
}

function segmentTable({ band, segments }: Band): Html {
  return html`<details class="segments"><summary>${words.segments(band)}</summary>
<div class="wide" role="region" aria-label="${words.segments(band)}" tabindex="0"><table>
<thead><tr><th scope="col">${words.use}</th><th scope="col">${words.span}</th>${heads}</tr></thead>
<tbody>${segments.map(
    (segment) =>
      html`<tr><th scope="row">${segment.use}</th><td>${range(segment)}</td>${cells(segment)}</tr>`,
  )}</tbody></table></div></details>`;
}

function rangesOf({ spans }: Band): Html {
  if (spans.length === 0) return html`–`;
  return html`${spans.map((span, i) => html`${i > 0 ? html`<br>` : null}${range(span)}`)}`;
}

function range({ low_hz: low, high_hz: high }: { low_hz: number; high_hz: number }): string {
  return words.range((low / 1e6).toFixed(3), megahertz(high));
}

function swrAt(swr: number | null, hz: number | null): string {
  return swr === null || hz === null ? '–' : words.swrAt(swrText(swr), megahertz(hz));
}

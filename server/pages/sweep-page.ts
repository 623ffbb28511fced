import type { z } from 'zod';
import type { sweepWithSummarySchema } from '../wire/sweep.ts';
import type { usableSchema } from '../wire/usable.ts';
import { readingCautions, safetyCautions } from './cautions.ts';
import { type Html, html } from './html.ts';
import { picture } from './picture.ts';
import { sentencesOf } from './sweep-words.ts';
import { texts } from './texts.ts';
import { usableTable } from './usable-table.ts';
import { megahertz, time } from './values.ts';

type Sweep = z.output<typeof sweepWithSummarySchema>;
const words = texts.sweep;

export interface SweepPageParts {
  readonly sweep: Sweep;
  readonly usable: z.output<typeof usableSchema>;
  readonly antenna: { readonly key: string; readonly name: string; readonly max_swr: number };
  readonly analyzer: { readonly name: string } | null;
  /** What led here: an upload that was kept just now, or that was kept before. */
  readonly arrival: 'kept' | 'known' | null;
}

/** A sweep as a sheet to read or to print: what it tells first, what it is last. */
export function sweepPage(parts: SweepPageParts): Html {
  const { sweep, usable, antenna, arrival } = parts;
  const { summary } = sweep;
  const cautions = [...summary.cautions, ...usable.cautions];
  return html`${arrival === null ? null : html`<p class="notice" role="status">${words[arrival]}</p>`}
${sweep.invented ? html`<p class="tag">${texts.invented}</p>` : null}
<section><h2>${words.inWords}</h2>
${sentencesOf(summary, antenna.max_swr).map((sentence) => html`<p>${sentence}</p>`)}
${details(words.absent, summary.absent)}</section>
${charts(sweep)}
<section><h2>${words.usable}</h2>${usableTable(usable)}</section>
${readingCautions(cautions)}
<section><h2>${words.facts}</h2>${factsOf(parts)}
${details(words.assumptions, sweep.assumptions)}</section>
<section class="screen"><h2>${words.downloads}</h2>
<ul>${downloads(sweep)}</ul><p class="aside">${words.print}</p></section>
${safetyCautions(cautions)}`;
}

/** The charts that the sweep has the phase for. */
function charts({ id, phase }: Sweep): Html {
  const chart = (kind: 'swr' | 'impedance') =>
    picture(`/sweeps/${id}/chart.svg?kind=${kind}`, words.charts[kind]);
  const smith = picture(`/sweeps/${id}/chart.svg?kind=smith`, words.charts.smith, 'square');
  return html`<section><h2>${words.chartsTitle}</h2><div class="pair">${chart('swr')}${phase === 'none' ? null : chart('impedance')}${
    phase === 'signed' ? html`<span class="screen">${smith}</span>` : null
  }</div></section>`;
}

function details(title: string, notes: readonly { readonly detail: string }[]): Html | null {
  if (notes.length === 0) return null;
  return html`<h3>${title}</h3><ul>${notes.map(({ detail }) => html`<li>${detail}</li>`)}</ul>`;
}

function downloads({ id, phase }: Sweep): readonly (Html | null)[] {
  const link = (path: string, name: string) =>
    html`<li><a href="/sweeps/${id}/${path}">${name}</a></li>`;
  return [
    link('file', words.fileAsSent),
    link('points?as=csv', words.csv),
    phase === 'signed' ? link('points?as=touchstone', words.touchstone) : null,
  ];
}

function factsOf({ sweep, antenna, analyzer }: SweepPageParts): Html {
  const { conditions, note, file } = sweep;
  const rows: readonly (readonly [string, Html | string] | null)[] = [
    [words.antenna, html`<a href="/antennas/${antenna.key}">${antenna.name}</a>`],
    [words.measured, sweep.measured_at === null ? texts.notSaid : time(sweep.measured_at)],
    [words.received, time(sweep.received_at)],
    [words.analyzer, analyzer?.name ?? texts.notSaid],
    [words.plane, words.planes[sweep.plane]],
    [words.span, words.spanValue(megahertz(sweep.low_hz), megahertz(sweep.high_hz), sweep.points)],
    [words.reference, `${sweep.summary.reference_ohm} Ω`],
    conditions === null ? null : [words.conditions, conditions],
    note === '' ? null : [words.note, note],
    [words.file, html`${file.name ?? ''} <small class="digest">SHA-256 ${file.sha256}</small>`],
  ];
  return html`<dl>${rows.map((row) =>
    row === null ? null : html`<div><dt>${row[0]}</dt><dd>${row[1]}</dd></div>`,
  )}</dl>`;
}

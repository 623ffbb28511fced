import type { z } from 'zod';
import type { AntennaWire } from '../routes/antennas.ts';
import type { DueWire } from '../routes/due.ts';
import type { driftSchema } from '../wire/drift.ts';
import type { sweepSchema } from '../wire/sweep.ts';
import type { usableSchema } from '../wire/usable.ts';
import type { workSchema } from '../wire/work.ts';
import { dueText } from './board-page.ts';
import { readingCautions, safetyCautions } from './cautions.ts';
import { type Html, html } from './html.ts';
import { picture } from './picture.ts';
import { texts } from './texts.ts';
import { usableTable } from './usable-table.ts';
import { megahertz, time } from './values.ts';

const words = texts.antenna;
type Sweep = z.output<typeof sweepSchema>;
type Work = z.output<typeof workSchema>;

export interface AntennaPageParts {
  readonly antenna: AntennaWire;
  readonly siteName: string;
  /** Newest first. */
  readonly sweeps: readonly Sweep[];
  /** Of the newest sweep; null if there is none. */
  readonly usable: z.output<typeof usableSchema> | null;
  readonly work: readonly Work[];
  readonly due: DueWire | null;
  readonly drift: z.output<typeof driftSchema>;
}

/** An antenna: how it stands, its history, what was done to it, and its sweeps. */
export function antennaPage(parts: AntennaPageParts): Html {
  const { antenna, siteName, sweeps, usable, work, due, drift } = parts;
  const { key, design_bands: bands } = antenna;
  return html`${antenna.invented ? html`<p class="tag">${texts.invented}</p>` : null}
<p>${words.meant(words.kinds[antenna.kind], siteName, bands.join(', '))}</p>
${antenna.note === '' ? null : html`<p>${antenna.note}</p>`}
${due === null ? null : html`<p>${words.nextTest} ${dueText(due)}</p>`}
<p class="screen"><a href="/upload?antenna=${key}">${words.upload}</a></p>
${usable === null ? null : html`<section><h2>${words.latest}</h2>${usableTable(usable)}</section>`}
${sweeps.length === 0 ? null : charts(key, bands)}
${findings(drift)}
${usable === null ? null : readingCautions(usable.cautions)}
<section><h2>${words.work}</h2>${workTable(work)}</section>
<section><h2>${words.sweeps}</h2>${sweepTable(sweeps)}</section>
${safetyCautions(usable?.cautions ?? [])}`;
}

function charts(key: string, bands: readonly string[]): Html {
  return html`<section><h2>${words.history}</h2>${bands.map(
    (band) =>
      html`<h3>${band}</h3><div class="pair">${words.measures.map(([measure, name]) =>
        picture(`/antennas/${key}/history.svg?band=${band}&measure=${measure}`, name(band)),
      )}</div>`,
  )}</section>`;
}

/** What the history shows, each with what to do next. */
function findings({ bands }: AntennaPageParts['drift']): Html | null {
  const found = bands.flatMap((one) =>
    one.findings.map((finding) => ({ band: one.band, finding })),
  );
  if (found.length === 0) return null;
  return html`<section><h2>${words.findings}</h2><ul>${found.map(
    ({ band, finding }) => html`<li>${band}: ${finding.detail} ${words.steps[finding.next]}</li>`,
  )}</ul></section>`;
}

function workTable(work: readonly Work[]): Html {
  if (work.length === 0) return html`<p>${words.noWork}</p>`;
  return table(
    words.work,
    words.workHeads,
    work.map(
      (one) => html`<th scope="row">${time(one.done_at)}</th>
<td>${words.workKinds[one.kind]}${one.length_mm === null ? '' : `, ${one.length_mm} mm`}</td><td>${one.note}${one.withdrawn_for === null ? '' : words.takenBack(one.withdrawn_for)}</td>`,
    ),
  );
}

function sweepTable(sweeps: readonly Sweep[]): Html {
  if (sweeps.length === 0) return html`<p>${words.noSweep}</p>`;
  return table(
    words.sweeps,
    words.sweepHeads,
    sweeps.map(
      (
        sweep,
      ) => html`<th scope="row"><a href="/sweeps/${sweep.id}">${time(sweep.measured_at ?? sweep.received_at)}</a></th>
<td>${megahertz(sweep.low_hz)} – ${megahertz(sweep.high_hz)}</td><td class="number">${sweep.points}</td>
<td>${sweep.conditions ?? ''}</td>`,
    ),
  );
}

function table(name: string, heads: readonly string[], rows: readonly Html[]): Html {
  return html`<div class="wide" role="region" aria-label="${name}" tabindex="0"><table>
<thead><tr>${heads.map((head) => html`<th scope="col">${head}</th>`)}</tr></thead>
<tbody>${rows.map((row) => html`<tr>${row}</tr>`)}</tbody></table></div>`;
}

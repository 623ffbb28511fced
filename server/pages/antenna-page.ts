import type { z } from 'zod';
import type { AntennaWire } from '../routes/antennas.ts';
import type { sweepSchema } from '../wire/sweep.ts';
import { type Html, html } from './html.ts';
import { texts } from './texts.ts';
import { megahertz, time } from './values.ts';

const words = texts.antenna;
type Sweep = z.output<typeof sweepSchema>;

export interface AntennaPageParts {
  readonly antenna: AntennaWire;
  readonly siteName: string;
  /** Newest first. */
  readonly sweeps: readonly Sweep[];
}

/** An antenna: what it is, and its sweeps. */
export function antennaPage({ antenna, siteName, sweeps }: AntennaPageParts): Html {
  return html`${antenna.invented ? html`<p class="tag">${texts.invented}</p>` : null}
<p>${words.meant(words.kinds[antenna.kind], siteName, antenna.design_bands.join(', '))}</p>
${antenna.note === '' ? null : html`<p>${antenna.note}</p>`}
<section><h2>${words.sweeps}</h2>${sweepTable(sweeps)}</section>`;
}

function sweepTable(sweeps: readonly Sweep[]): Html {
  if (sweeps.length === 0) return html`<p>${words.noSweep}</p>`;
  return html`<div class="wide" role="region" aria-label="${words.sweeps}" tabindex="0"><table>
<thead><tr>${words.sweepHeads.map((name) => html`<th scope="col">${name}</th>`)}</tr></thead>
<tbody>${sweeps.map(
    (
      sweep,
    ) => html`<tr><th scope="row"><a href="/sweeps/${sweep.id}">${time(sweep.measured_at ?? sweep.received_at)}</a></th>
<td>${megahertz(sweep.low_hz)} – ${megahertz(sweep.high_hz)}</td><td class="number">${sweep.points}</td>
<td>${sweep.conditions ?? ''}</td></tr>`,
  )}</tbody></table></div>`;
}

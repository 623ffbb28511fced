import type { z } from 'zod';
import type { DueWire } from '../routes/due.ts';
import type { dashboardSchema } from '../wire/dashboard.ts';
import { type Html, html } from './html.ts';
import { texts } from './texts.ts';
import { megahertz, percent, swrText, time } from './values.ts';

const words = texts.board;
type Site = z.output<typeof dashboardSchema>['sites'][number];
type Antenna = Site['antennas'][number];
type Band = Antenna['bands'][number];

export interface BoardParts {
  readonly sites: readonly Site[];
  readonly due: ReadonlyMap<string, DueWire>;
}

/** How every antenna of the club stands, by site. The script writes it anew when something happens. */
export function boardPage({ sites, due }: BoardParts): Html {
  if (sites.length === 0) return html`<p>${words.empty}</p>`;
  return html`<div id="board" data-events="/board/events">${sites.map((site) => siteSection(site, due))}</div>
<p class="aside" role="status" data-changed="${words.changed}"></p>`;
}

function siteSection({ key, name, antennas }: Site, due: BoardParts['due']): Html {
  const body =
    antennas.length === 0
      ? html`<p>${words.noAntenna}</p>`
      : html`<table class="board" role="table" aria-labelledby="site-${key}">
<thead role="rowgroup"><tr role="row">${words.heads.map((head) => html`<th scope="col" role="columnheader">${head}</th>`)}</tr></thead>
<tbody role="rowgroup">${antennas.map((antenna) => antennaRow(antenna, due.get(antenna.id)))}</tbody></table>`;
  return html`<section><h2 id="site-${key}">${name}</h2>${body}</section>`;
}

function antennaRow(antenna: Antenna, due: DueWire | undefined): Html {
  const { key, name, state, bands, latest_sweep: latest } = antenna;
  const [, stateHead, bandsHead, latestHead, dueHead] = words.heads;
  const cell = (head: string, value: Html | string | readonly Html[]) =>
    html`<td role="cell" data-head="${head}">${value}</td>`;
  const sweep =
    latest === null
      ? '–'
      : html`<a href="/sweeps/${latest.id}">${time(latest.measured_at ?? latest.received_at)}</a>`;
  return html`<tr role="row"><th scope="row" role="rowheader"><a href="/antennas/${key}">${name}</a></th>
${cell(stateHead, html`<span class="verdict ${state}">${words.states[state]}</span>`)}
${cell(bandsHead, bands.map(bandLine))}${cell(latestHead, sweep)}
${cell(dueHead, due === undefined ? '–' : dueText(due))}</tr>`;
}

function bandLine({ band, state, usable_fraction: usable, ...of }: Band): Html {
  const { minimum_swr: swr, minimum_swr_hz: hz } = of;
  const lowest = swr === null || hz === null ? '' : words.lowest(swrText(swr), megahertz(hz));
  const part = state === 'untested' ? words.states.untested : words.usable(percent(usable));
  return html`<div>${band}: ${part}${lowest}</div>`;
}

/** When an antenna is to be tested again. */
export function dueText({ state, due_at: dueAt }: DueWire): Html {
  const date = dueAt === null ? null : html` ${time(dueAt)}`;
  return html`<span class="due ${state}">${words.due[state]}</span>${date}`;
}

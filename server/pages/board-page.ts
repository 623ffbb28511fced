import type { AntennaWire } from '../routes/antennas.ts';
import type { SiteWire } from '../routes/sites.ts';
import { type Html, html } from './html.ts';
import { texts } from './texts.ts';

const words = texts.board;

export interface BoardParts {
  readonly sites: readonly SiteWire[];
  readonly antennas: readonly AntennaWire[];
  /** The lists are longer than the board shows. */
  readonly isCut: boolean;
}

/** What the club has: its sites, each with its antennas. */
export function boardPage({ sites, antennas, isCut }: BoardParts): Html {
  if (sites.length === 0) return html`<p>${words.empty}</p>`;
  return html`${sites.map((site) =>
    siteSection(
      site,
      antennas.filter(({ site_id: id }) => id === site.id),
    ),
  )}${isCut ? html`<p class="aside">${words.cut}</p>` : null}`;
}

function siteSection({ key, name }: SiteWire, antennas: readonly AntennaWire[]): Html {
  const body =
    antennas.length === 0
      ? html`<p>${words.noAntenna}</p>`
      : html`<div class="wide" role="region" aria-labelledby="site-${key}" tabindex="0"><table>
<thead><tr><th scope="col">${words.antenna}</th><th scope="col">${words.bands}</th><th scope="col">${words.limit}</th></tr></thead>
<tbody>${antennas.map(antennaRow)}</tbody></table></div>`;
  return html`<section><h2 id="site-${key}">${name}</h2>${body}</section>`;
}

function antennaRow({ key, name, design_bands: bands, max_swr: limit }: AntennaWire): Html {
  return html`<tr><th scope="row"><a href="/antennas/${key}">${name}</a></th>
<td>${bands.join(', ')}</td><td class="number">${limit}</td></tr>`;
}

import type { App } from '../http/app-type.ts';
import type { AntennaWire } from '../routes/antennas.ts';
import type { SiteWire } from '../routes/sites.ts';
import { boardPage } from './board-page.ts';
import { hidden } from './hidden.ts';
import { MemberApi } from './member-api.ts';
import { texts } from './texts.ts';
import { sendPage } from './viewer.ts';

interface List<Item> {
  readonly items: readonly Item[];
  readonly page: { readonly next: string | null };
}

/** The board of the club. */
export function boardRoutes(scope: App): void {
  scope.get('/', hidden, async (request, reply) => {
    const api = new MemberApi(scope, request);
    const [sites, antennas] = await Promise.all([
      api.read<List<SiteWire>>('/v1/sites?limit=500'),
      api.read<List<AntennaWire>>('/v1/antennas?limit=500'),
    ]);
    const isCut = sites.page.next !== null || antennas.page.next !== null;
    const body = boardPage({ sites: sites.items, antennas: antennas.items, isCut });
    return sendPage(api, reply, { title: texts.board.title, path: '/', body });
  });
}

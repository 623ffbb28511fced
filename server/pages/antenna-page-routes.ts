import { z } from 'zod';
import type { App } from '../http/app-type.ts';
import type { DueWire } from '../routes/due.ts';
import type { SiteWire } from '../routes/sites.ts';
import { idOrKeySchema } from '../wire/common.ts';
import { type AntennaPageParts, antennaPage } from './antenna-page.ts';
import { hidden } from './hidden.ts';
import { MemberApi } from './member-api.ts';
import { sendPage } from './viewer.ts';

const params = z.object({ antenna: idOrKeySchema });

/** An antenna with its record. */
export function antennaPageRoutes(scope: App): void {
  scope.get(
    '/antennas/:antenna',
    { ...hidden, schema: { ...hidden.schema, params } },
    async (request, reply) => {
      const api = new MemberApi(scope, request);
      const path = `/v1/antennas/${encodeURIComponent(request.params.antenna)}`;
      const [antenna, sweeps, work, due, drift] = await Promise.all([
        api.read<AntennaPageParts['antenna']>(path),
        api.read<{ items: AntennaPageParts['sweeps'] }>(`${path}/sweeps?limit=20`),
        api.read<{ items: AntennaPageParts['work'] }>(`${path}/work?limit=20`),
        api.read<{ items: readonly DueWire[] }>('/v1/due'),
        api.read<AntennaPageParts['drift']>(`${path}/drift`),
      ]);
      const newest = sweeps.items.at(0);
      const usable =
        newest === undefined
          ? null
          : await api.read<AntennaPageParts['usable']>(`/v1/sweeps/${newest.id}/usable`);
      const { name: siteName } = await api.read<SiteWire>(`/v1/sites/${antenna.site_id}`);
      const body = antennaPage({
        antenna,
        siteName,
        sweeps: sweeps.items,
        usable,
        work: work.items,
        due: due.items.find((one) => one.antenna_id === antenna.id) ?? null,
        drift,
      });
      return sendPage(api, reply, { title: antenna.name, body });
    },
  );
}

import { z } from 'zod';
import type { App } from '../http/app-type.ts';
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
      const [antenna, sweeps] = await Promise.all([
        api.read<AntennaPageParts['antenna']>(path),
        api.read<{ items: AntennaPageParts['sweeps'] }>(`${path}/sweeps?limit=20`),
      ]);
      const { name: siteName } = await api.read<SiteWire>(`/v1/sites/${antenna.site_id}`);
      const body = antennaPage({ antenna, siteName, sweeps: sweeps.items });
      return sendPage(api, reply, { title: antenna.name, body });
    },
  );
}

import { z } from 'zod';
import type { App } from '../http/app-type.ts';
import { idSchema } from '../wire/common.ts';
import { hidden } from './hidden.ts';
import { handOn, MemberApi } from './member-api.ts';
import { type SweepPageParts, sweepPage } from './sweep-page.ts';
import { texts } from './texts.ts';
import { sendPage } from './viewer.ts';

const params = z.object({ sweep: idSchema });
const querystring = z.object({ arrival: z.enum(['kept', 'known']).nullable().default(null) });

/** A sweep with what follows from it, and its files. */
export function sweepPageRoutes(scope: App): void {
  scope.get(
    '/sweeps/:sweep',
    { ...hidden, schema: { ...hidden.schema, params, querystring } },
    async (request, reply) => {
      const api = new MemberApi(scope, request);
      const { arrival } = request.query;
      const parts = { ...(await readSweep(api, request.params.sweep)), arrival };
      const title = texts.sweep.title(parts.antenna.name);
      return sendPage(api, reply, { title, body: sweepPage(parts) });
    },
  );

  scope.get(
    '/sweeps/:sweep/file',
    { ...hidden, schema: { ...hidden.schema, params } },
    async (request, reply) => {
      const api = new MemberApi(scope, request);
      return handOn(reply, await api.send('GET', `/v1/sweeps/${request.params.sweep}/file`));
    },
  );

  scope.get(
    '/sweeps/:sweep/points',
    {
      ...hidden,
      schema: {
        ...hidden.schema,
        params,
        querystring: z.object({ as: z.enum(['csv', 'touchstone']) }),
      },
    },
    async (request, reply) => {
      const api = new MemberApi(scope, request);
      const { sweep } = request.params;
      return handOn(
        reply,
        await api.send('GET', `/v1/sweeps/${sweep}/points?as=${request.query.as}`),
      );
    },
  );
}

async function readSweep(api: MemberApi, id: string): Promise<Omit<SweepPageParts, 'arrival'>> {
  const [sweep, usable] = await Promise.all([
    api.read<SweepPageParts['sweep']>(`/v1/sweeps/${id}`),
    api.read<SweepPageParts['usable']>(`/v1/sweeps/${id}/usable`),
  ]);
  const { antenna_id: antennaId, analyzer_id: analyzerId } = sweep;
  const antenna = await api.read<SweepPageParts['antenna']>(`/v1/antennas/${antennaId}`);
  const analyzer =
    analyzerId === null
      ? null
      : await api.read<SweepPageParts['analyzer']>(`/v1/analyzers/${analyzerId}`);
  return { sweep, usable, antenna, analyzer };
}

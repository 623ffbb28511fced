import { z } from 'zod';
import type { App } from '../http/app-type.ts';
import { idOrKeySchema, idSchema } from '../wire/common.ts';
import { hidden } from './hidden.ts';
import { handOn, MemberApi } from './member-api.ts';

/** The charts that pages show, from the interface with its own query. */
export function chartRoutes(scope: App): void {
  scope.get(
    '/sweeps/:sweep/chart.svg',
    { ...hidden, schema: { ...hidden.schema, params: z.object({ sweep: idSchema }) } },
    async (request, reply) => {
      const path = `/v1/sweeps/${request.params.sweep}/chart.svg${queryOf(request.url)}`;
      return handOn(reply, await new MemberApi(scope, request).send('GET', path));
    },
  );

  scope.get(
    '/antennas/:antenna/history.svg',
    { ...hidden, schema: { ...hidden.schema, params: z.object({ antenna: idOrKeySchema }) } },
    async (request, reply) => {
      const antenna = encodeURIComponent(request.params.antenna);
      const path = `/v1/antennas/${antenna}/history/chart.svg${queryOf(request.url)}`;
      return handOn(reply, await new MemberApi(scope, request).send('GET', path));
    },
  );
}

function queryOf(url: string): string {
  const start = url.indexOf('?');
  return start === -1 ? '' : url.slice(start);
}

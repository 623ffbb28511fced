import { z } from 'zod';
import { bandNames } from '../../core/bands/plan.ts';
import { followResonances } from '../../core/record/tracks.ts';
import { measuredPage } from '../history/measured-rows.ts';
import type { App } from '../http/app-type.ts';
import type { Service } from '../service.ts';
import { idOrKeySchema } from '../wire/common.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { planeSchema } from '../wire/summary.ts';
import { tracksSchema, tracksToWire } from '../wire/tracks.ts';
import { findOrRefuse, findProblems } from './editables.ts';
import { historyFilterOf, historyFilterQuery } from './history.ts';

/** So many of the newest sweeps are followed at once. */
const mostSweeps = 500;

/** The resonances of one band of an antenna, each followed through time. */
export function trackRoutes(app: App, service: Service): void {
  app.get(
    '/v1/antennas/:antenna/tracks',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'followResonances',
        tags: ['history'],
        summary: 'Each resonance of a band through time',
        description: `Told apart by continuity, not by their order: two that cross go on as they went. Of the newest ${mostSweeps} sweeps that the filters leave.`,
        params: z.strictObject({ antenna: idOrKeySchema }),
        querystring: z.strictObject({
          ...historyFilterQuery,
          band: z.enum(bandNames),
          plane: planeSchema.default('measured').meta({
            description: 'Only sweeps that were taken at this plane.',
          }),
        }),
        response: answers({ 200: jsonAnswer('The tracks.', tracksSchema) }, [
          ...findProblems,
          'unknown-reference',
        ]),
      },
    },
    async (request) => {
      const { query } = request;
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const filter = await historyFilterOf(request, service, query);
      const asked = { limit: mostSweeps, after: null };
      const { items, next } = await measuredPage(service, antenna, filter, asked);
      const rows = items
        .map(({ row }) => row)
        .filter(({ measures }) => measures.plane === query.plane)
        .toReversed();
      const tracks = followResonances(rows, query.band);
      return tracksToWire(query.band, rows.length, next === null, tracks);
    },
  );
}

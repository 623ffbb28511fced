import { z } from 'zod';
import { bandNames } from '../../core/bands/plan.ts';
import { antennaDrift, mostDriftSweeps } from '../history/drift-report.ts';
import type { App } from '../http/app-type.ts';
import type { Service } from '../service.ts';
import { idOrKeySchema } from '../wire/common.ts';
import { driftSchema, driftToWire } from '../wire/drift.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { findOrRefuse, findProblems } from './editables.ts';

/** What an antenna's sweeps tell of it over time. */
export function driftRoutes(app: App, service: Service): void {
  app.get(
    '/v1/antennas/:antenna/drift',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getDrift',
        tags: ['history'],
        summary: 'How an antenna fared over time: trends by era, and findings',
        description: `From the newest ${mostDriftSweeps} sweeps at the plane of the newest one. Each sweep counts by its half-width and by how far its instrument lies from the others; the course of the year and usual wet weather are no finding, and work on the antenna explains what changed with it.`,
        params: z.strictObject({ antenna: idOrKeySchema }),
        querystring: z.strictObject({
          band: z.enum(bandNames).optional().meta({
            description: 'Only this band; else the design bands, or all where there are none.',
          }),
        }),
        response: answers({ 200: jsonAnswer('By band.', driftSchema) }, findProblems),
      },
    },
    async (request) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      return driftToWire(antenna.id, await antennaDrift(service, antenna, request.query.band));
    },
  );
}

import { z } from 'zod';
import { comparison } from '../history/comparison.ts';
import type { App } from '../http/app-type.ts';
import type { Service } from '../service.ts';
import { idSchema, noQuery } from '../wire/common.ts';
import { comparisonSchema, comparisonToWire } from '../wire/comparison.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { findProblems } from './editables.ts';
import { findSweepOrRefuse } from './sweeps.ts';

/** Two sweeps side by side. */
export function compareRoutes(app: App, service: Service): void {
  app.get(
    '/v1/sweeps/:sweep/compare/:other',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'compareSweeps',
        tags: ['history'],
        summary:
          'What differs between two sweeps of an antenna, and whether it is more than uncertainty',
        description:
          'Each at the plane at which it was taken. Where planes, antennas or references do not allow it, `obstacles` says so and nothing is compared; `cautions` tell what may differ beside the antenna.',
        params: z.strictObject({ sweep: idSchema, other: idSchema }),
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('The comparison.', comparisonSchema) }, findProblems),
      },
    },
    async (request) => {
      const { sweep, other } = request.params;
      const first = await findSweepOrRefuse(request, service, sweep);
      const second = await findSweepOrRefuse(request, service, other);
      return comparisonToWire(first.id, second.id, await comparison(service, first, second));
    },
  );
}

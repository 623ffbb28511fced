import { z } from 'zod';
import { listPlans } from '../../core/bands/plans.ts';
import type { App } from '../http/app-type.ts';
import { isNotModified } from '../http/conditional.ts';
import { derivedTag } from '../http/etags.ts';
import { noQuery, readHeaders } from '../wire/common.ts';
import { planSchema, planToWire } from '../wire/plan.ts';
import { answers, commonProblems, jsonAnswer, notModified } from '../wire/problem.ts';

const plansSchema = z.object({ items: z.array(planSchema) });

/** The band plans that an antenna can be judged by: part of the service, not of a club. */
export function planRoutes(app: App): void {
  const body = JSON.stringify({ items: listPlans().map(planToWire) });
  const tag = derivedTag([body]);
  app.get(
    '/v1/plans',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listPlans',
        tags: ['plans'],
        summary: 'List the band plans with every row, its source and how far it can be trusted',
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('All plans.', plansSchema), ...notModified },
          commonProblems,
        ),
      },
    },
    async (request, reply) => {
      if (isNotModified(request, reply, tag)) return reply.code(304).send();
      return reply.type('application/json').send(body);
    },
  );
}

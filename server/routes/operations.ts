import { z } from 'zod';
import { principalOf } from '../auth/bearer.ts';
import { antennaStandings } from '../dashboard/dashboard.ts';
import { antennaGauges } from '../dashboard/gauges.ts';
import type { App } from '../http/app-type.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import { noQuery } from '../wire/common.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';

const tags = ['operations'];
const okSchema = z.object({ status: z.literal('ok') });
const readyTimeoutMs = 2000;

/** Whether the process lives, and whether it can do its work; neither needs a token. */
export function healthRoutes(app: App, service: Service): void {
  app.get(
    '/livez',
    {
      config: { right: 'public' },
      schema: {
        operationId: 'getLiveness',
        tags,
        summary: 'Whether the process lives; the storage is not asked',
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('It lives.', okSchema) }, [
          'invalid-request',
          'malformed-request',
          'internal',
        ]),
      },
    },
    async (_request, reply) => reply.header('cache-control', 'no-store').send({ status: 'ok' }),
  );

  app.get(
    '/readyz',
    {
      config: { right: 'public' },
      schema: {
        operationId: 'getReadiness',
        tags,
        summary: 'Whether reader and writer of the storage answer',
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('They do.', okSchema) }, [
          'invalid-request',
          'malformed-request',
          'internal',
          'unavailable',
        ]),
      },
    },
    async (_request, reply) => {
      if (!(await answersInTime(service))) {
        throw new Problem('unavailable', { headers: { 'retry-after': '5' } });
      }
      return reply.header('cache-control', 'no-store').send({ status: 'ok' });
    },
  );
}

async function answersInTime({ store }: Service): Promise<boolean> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<boolean>((resolve) => {
    timer = setTimeout(resolve, readyTimeoutMs, false);
  });
  const ready = store.ready().then(
    () => true,
    () => false,
  );
  try {
    return await Promise.race([ready, late]);
  } finally {
    clearTimeout(timer);
  }
}

/** The counters, behind a token: they tell how a club works. */
export function metricsRoutes(app: App, service: Service, metricsText: () => string): void {
  app.get(
    '/metrics',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getMetrics',
        tags,
        summary: 'Counters, and gauges of the club’s antennas, in the Prometheus text format',
        querystring: noQuery,
        response: answers(
          {
            200: {
              description: 'Counters since the start, and how the antennas of the club stand.',
              content: { 'text/plain': { schema: z.string() } },
            },
          },
          [
            'invalid-request',
            'malformed-request',
            'token-in-url',
            'unauthenticated',
            'insufficient-right',
            'internal',
          ],
        ),
      },
    },
    async (request, reply) => {
      const standings = await antennaStandings(service, principalOf(request).clubId);
      return reply
        .header('cache-control', 'no-store')
        .type('text/plain; version=0.0.4; charset=utf-8')
        .send(metricsText() + antennaGauges(standings, service.now()));
    },
  );
}

import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { bandNames } from '../../core/bands/plan.ts';
import { weathers } from '../../core/record/conditions.ts';
import { measuredPage } from '../history/measured-rows.ts';
import { negotiate } from '../http/accept.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import type { Service } from '../service.ts';
import type { HistoryFilter } from '../store/history-store.ts';
import { idOrKeySchema, pageQuery, pageSchema, timeInputSchema } from '../wire/common.ts';
import { historyCsv, historyRowSchema, historyRowToWire } from '../wire/history.ts';
import { answers } from '../wire/problem.ts';
import { findOrRefuse, listProblems, resolveReference } from './editables.ts';

const mediaTypes = { json: 'application/json', csv: 'text/csv' } as const;

/** The filters of everything that is asked of an antenna over time. */
export const historyFilterQuery = {
  band: z.enum(bandNames).optional().meta({ description: 'Only sweeps of this band.' }),
  analyzer: idOrKeySchema
    .optional()
    .meta({ description: 'Only sweeps by this analyzer; `unknown`: by nobody knows which.' }),
  weather: z
    .enum([...weathers, 'unknown'])
    .optional()
    .meta({ description: 'Only sweeps in this weather.' }),
  from: timeInputSchema.optional(),
  until: timeInputSchema.optional(),
};
type FilterQuery = z.output<z.ZodObject<typeof historyFilterQuery>>;

/** What a query limits a history to. Throws `unknown-reference`. */
export async function historyFilterOf(
  request: FastifyRequest,
  service: Service,
  { band, analyzer, weather, from, until }: FilterQuery,
): Promise<HistoryFilter> {
  const analyzerId =
    analyzer === undefined ? undefined : await analyzerIdOf(request, service, analyzer);
  return {
    ...(band === undefined ? {} : { band }),
    ...(analyzerId === undefined ? {} : { analyzerId }),
    ...(weather === undefined ? {} : { weather: weather === 'unknown' ? null : weather }),
    ...(from === undefined ? {} : { from }),
    ...(until === undefined ? {} : { until }),
  };
}

async function analyzerIdOf(
  request: FastifyRequest,
  service: Service,
  analyzer: string,
): Promise<string | null> {
  if (analyzer === 'unknown') return null;
  const place = { parameter: 'analyzer' };
  return (await resolveReference(request, service, 'analyzers', analyzer, place)).id;
}

/** What an antenna's sweeps measured, over time. */
export function historyRoutes(app: App, service: Service): void {
  app.get(
    '/v1/antennas/:antenna/history',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getHistory',
        tags: ['history'],
        summary: 'What the sweeps of an antenna measured, newest first',
        description:
          'Band by band: resonances, lowest SWR, the span within the limit, each with its half-width. A resonance outside a band stands with the nearest band that the antenna is meant for. At the plane at which each sweep was taken.',
        params: z.strictObject({ antenna: idOrKeySchema }),
        querystring: z.strictObject({
          ...pageQuery,
          ...historyFilterQuery,
          as: z.enum(['json', 'csv']).optional().meta({ description: 'Goes before `Accept`.' }),
        }),
        headers: z.looseObject({
          accept: z.string().optional().meta({ description: '`application/json` or `text/csv`.' }),
        }),
        response: answers(
          {
            200: {
              description:
                'A page. As CSV: a line for each resonance, or one for a band that has none; `Link` has the next page.',
              content: {
                'application/json': { schema: pageSchema(historyRowSchema) },
                'text/csv': { schema: z.string() },
              },
            },
          },
          [...listProblems, 'not-found', 'unknown-reference', 'not-acceptable'],
        ),
      },
    },
    async (request, reply) => {
      const { query } = request;
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const form =
        query.as ??
        (negotiate(request.headers.accept, [mediaTypes.json, mediaTypes.csv]) === mediaTypes.csv
          ? 'csv'
          : 'json');
      reply.header('vary', 'Accept');
      const filter = await historyFilterOf(request, service, query);
      const page = await measuredPage(service, antenna, filter, pageRequest(request, query));
      const sent = sendPage(request, reply, service, query, page, (row) =>
        historyRowToWire(row, query.band),
      );
      if (form === 'json') return reply.type('application/json').send(JSON.stringify(sent));
      return reply
        .type('text/csv; charset=utf-8')
        .header('content-disposition', 'attachment; filename="history.csv"')
        .send(historyCsv(sent.items));
    },
  );
}

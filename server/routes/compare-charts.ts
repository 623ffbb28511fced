import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { chartAnswer, chartHeaders, chartQuery, styleOf } from '../charts/chart-query.ts';
import { compareChartSvg, type JudgedSweep } from '../charts/compare-chart.ts';
import { sendChart } from '../charts/send-chart.ts';
import type { App } from '../http/app-type.ts';
import { KeptAnswers } from '../http/kept-answers.ts';
import { judgedBy, usableMark } from '../report-basis.ts';
import type { Service } from '../service.ts';
import { idSchema } from '../wire/common.ts';
import { answers, notModified } from '../wire/problem.ts';
import { findProblems } from './editables.ts';
import { findSweepOrRefuse } from './sweeps.ts';

/** Two sweeps in one picture. */
export function compareChartRoutes(app: App, service: Service): void {
  const kept = new KeptAnswers(service.store);
  app.get(
    '/v1/sweeps/:sweep/compare/:other/chart.svg',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getCompareChart',
        tags: ['charts'],
        summary: 'Draw the SWR of two sweeps of an antenna',
        description:
          'SVG, or PNG by `Accept: image/png`. Where the two cannot be compared the chart says why.',
        params: z.strictObject({ sweep: idSchema, other: idSchema }),
        querystring: z.strictObject(chartQuery),
        headers: chartHeaders,
        response: answers({ 200: chartAnswer, ...notModified }, [
          ...findProblems,
          'not-acceptable',
          'record-corrupt',
        ]),
      },
    },
    (request, reply) => {
      const { sweep, other } = request.params;
      const url = `${service.publicUrl}/v1/sweeps/${sweep}/compare/${other}`;
      const table = { url, type: 'application/json' };
      return sendChart(request, reply, kept, table, async () => {
        const first = await judgedSweep(request, service, sweep);
        const second = await judgedSweep(request, service, other);
        const style = styleOf(request.query);
        return {
          basis: ['compare', markOf(first), markOf(second), JSON.stringify(style)],
          svg: () => compareChartSvg(service, { first, second, tableUrl: url, style }),
        };
      });
    },
  );
}

async function judgedSweep(
  request: FastifyRequest,
  service: Service,
  id: string,
): Promise<JudgedSweep> {
  const record = await findSweepOrRefuse(request, service, id);
  return { record, ...(await judgedBy(service, record)) };
}

/** All of a side that its drawing follows from. */
function markOf({ record, antenna, basis }: JudgedSweep): string {
  const { facts, id } = record;
  return JSON.stringify({ id, facts, name: antenna.facts.name, ...usableMark(basis) });
}

import { z } from 'zod';
import { chartAnswer, chartHeaders, chartQuery, styleOf } from '../charts/chart-query.ts';
import { lineCheckChartSvg } from '../charts/line-check-chart.ts';
import { sendChart } from '../charts/send-chart.ts';
import type { App } from '../http/app-type.ts';
import { KeptAnswers } from '../http/kept-answers.ts';
import type { Service } from '../service.ts';
import { answers, notModified } from '../wire/problem.ts';
import { findOrRefuse, findProblems } from './editables.ts';
import { findLineCheckOrRefuse, lineCheckParams } from './line-checks.ts';

/** A line check as a picture. */
export function lineCheckChartRoutes(app: App, service: Service): void {
  const kept = new KeptAnswers(service.store);
  app.get(
    '/v1/antennas/:antenna/line-checks/:check/chart.svg',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getLineCheckChart',
        tags: ['charts'],
        summary: 'Draw a line check: reflection against distance',
        description:
          'SVG, or PNG by `Accept: image/png`. Reflection in decibels below a total one.',
        params: lineCheckParams,
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
      const { antenna: key, check } = request.params;
      const url = `${service.publicUrl}/v1/antennas/${encodeURIComponent(key)}/line-checks/${check}`;
      const table = { url, type: 'application/json' };
      return sendChart(request, reply, kept, table, async () => {
        const antenna = await findOrRefuse(request, service, 'antennas', key);
        const record = await findLineCheckOrRefuse(service, antenna, check);
        const style = styleOf(request.query);
        return {
          basis: ['line check', record.id, antenna.facts.name, JSON.stringify(style)],
          svg: () => lineCheckChartSvg(service, { antenna, record, tableUrl: url, style }),
        };
      });
    },
  );
}

import { z } from 'zod';
import { bandNames } from '../../core/bands/plan.ts';
import { historyChart } from '../../core/chart/history-chart.ts';
import { chartAnswer, chartHeaders, chartQuery, styleOf } from '../charts/chart-query.ts';
import { historyChartOf, historyMeasures } from '../charts/history-chart.ts';
import { sendChart } from '../charts/send-chart.ts';
import type { App } from '../http/app-type.ts';
import { KeptAnswers } from '../http/kept-answers.ts';
import type { Service } from '../service.ts';
import { idOrKeySchema } from '../wire/common.ts';
import { answers, notModified } from '../wire/problem.ts';
import { findOrRefuse, findProblems } from './editables.ts';
import { historyFilterOf, historyFilterQuery } from './history.ts';

const filterNames = ['analyzer', 'weather', 'from', 'until'] as const;

/** A measure of an antenna over time as a picture. */
export function historyChartRoutes(app: App, service: Service): void {
  const kept = new KeptAnswers(service.store);
  app.get(
    '/v1/antennas/:antenna/history/chart.svg',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getHistoryChart',
        tags: ['charts'],
        summary: 'Draw a measure of a band over time, with weather, half-widths and eras',
        description:
          'SVG, or PNG by `Accept: image/png`. The mark of a sweep tells the weather by its shape; lines join sweeps of one era.',
        params: z.strictObject({ antenna: idOrKeySchema }),
        querystring: z.strictObject({
          ...historyFilterQuery,
          band: z.enum(bandNames),
          measure: z
            .enum(historyMeasures)
            .default('resonance')
            .meta({ description: '`minimum`: its frequency; `width`: within the SWR limit.' }),
          ...chartQuery,
        }),
        headers: chartHeaders,
        response: answers({ 200: chartAnswer, ...notModified }, [
          ...findProblems,
          'unknown-reference',
          'not-acceptable',
        ]),
      },
    },
    (request, reply) => {
      const { query, params } = request;
      const { band, measure } = query;
      const filters = filterNames.flatMap((name) => stated(name, query[name]));
      const search = new URLSearchParams([['as', 'csv'], ['band', band], ...filters]);
      const path = `/v1/antennas/${encodeURIComponent(params.antenna)}/history`;
      const tableUrl = `${service.publicUrl}${path}?${search}`;
      return sendChart(request, reply, kept, { url: tableUrl, type: 'text/csv' }, async () => {
        const antenna = await findOrRefuse(request, service, 'antennas', params.antenna);
        const filter = await historyFilterOf(request, service, query);
        const asked = { antenna, band, measure, filter, tableUrl };
        const chart = await historyChartOf(service, asked);
        const style = styleOf(query);
        return {
          basis: ['history', JSON.stringify({ chart, style })],
          svg: async () => historyChart(chart, style),
        };
      });
    },
  );
}

function stated(name: string, value: string | undefined): [string, string][] {
  return value === undefined ? [] : [[name, value]];
}

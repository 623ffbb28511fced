import { z } from 'zod';
import { chartAnswer, chartHeaders, chartQuery, styleOf } from '../charts/chart-query.ts';
import { sendChart } from '../charts/send-chart.ts';
import { refuseWithoutPhase, sweepChartKinds, sweepChartSvg } from '../charts/sweep-chart.ts';
import type { App } from '../http/app-type.ts';
import { KeptAnswers } from '../http/kept-answers.ts';
import { judgedBy, usableMark } from '../report-basis.ts';
import type { Service } from '../service.ts';
import { answers, notModified } from '../wire/problem.ts';
import { atPlane } from './asked-plane.ts';
import { findProblems } from './editables.ts';
import { planeQuery } from './sweep-reports.ts';
import { findSweepOrRefuse, sweepParams } from './sweeps.ts';

/** A sweep as a picture. */
export function sweepChartRoutes(app: App, service: Service): void {
  const kept = new KeptAnswers(service.store);
  app.get(
    '/v1/sweeps/:sweep/chart.svg',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getSweepChart',
        tags: ['charts'],
        summary: 'Draw a sweep: SWR, R and X, or the Smith chart',
        description:
          'SVG, or PNG by `Accept: image/png`. The SWR axis is linear in the magnitude of the reflection, so that 1 to 3 takes its lower half and every SWR has a place.',
        params: sweepParams,
        querystring: z.strictObject({
          kind: z
            .enum(sweepChartKinds)
            .default('swr')
            .meta({ description: '`impedance` needs phase; `smith` needs its sign as well.' }),
          plane: planeQuery,
          ...chartQuery,
        }),
        headers: chartHeaders,
        response: answers({ 200: chartAnswer, ...notModified }, [
          ...findProblems,
          'not-acceptable',
          'plane-unavailable',
          'phase-unknown',
          'record-corrupt',
        ]),
      },
    },
    (request, reply) => {
      const { kind, plane } = request.query;
      const { sweep: id } = request.params;
      const planePart = plane === undefined ? '' : `&plane=${plane}`;
      const tableUrl = `${service.publicUrl}/v1/sweeps/${id}/points?as=csv${planePart}`;
      return sendChart(request, reply, kept, { url: tableUrl, type: 'text/csv' }, async () => {
        const record = await findSweepOrRefuse(request, service, id);
        refuseWithoutPhase(kind, record);
        const { antenna, basis: own } = await judgedBy(service, record);
        const basis = atPlane(own, record, plane);
        const style = styleOf(request.query, kind === 'smith' ? 1 : undefined);
        const mark = JSON.stringify({ ...usableMark(basis), line: basis.line, style });
        return {
          basis: [kind, record.id, record.facts.measuredAt, antenna.facts.name, mark],
          svg: () => sweepChartSvg(service, { kind, record, antenna, basis, tableUrl, style }),
        };
      });
    },
  );
}

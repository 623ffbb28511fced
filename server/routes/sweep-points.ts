import { z } from 'zod';
import { writeSweepCsv } from '../../core/formats/delimited/write-sweep-csv.ts';
import { writeSweepJson } from '../../core/formats/json/write-sweep-json.ts';
import { writeTouchstone } from '../../core/formats/touchstone/write-touchstone.ts';
import type { Sweep } from '../../core/sweep.ts';
import { negotiate } from '../http/accept.ts';
import type { App } from '../http/app-type.ts';
import { isNotModified } from '../http/conditional.ts';
import { derivedTag } from '../http/etags.ts';
import { Problem } from '../problems.ts';
import { readSweepOf } from '../reports.ts';
import type { Service } from '../service.ts';
import type { SweepRecord } from '../store/port.ts';
import { readHeaders } from '../wire/common.ts';
import { pointsSchema } from '../wire/points.ts';
import { answers, notModified } from '../wire/problem.ts';
import { planeSchema } from '../wire/summary.ts';
import { findProblems } from './editables.ts';
import { refuseOtherPlane } from './sweep-reports.ts';
import { downloadName, findSweepOrRefuse, sweepParams } from './sweeps.ts';

/** The forms by name; Touchstone has no media type of its own, so it goes as plain text. */
const mediaTypes = { json: 'application/json', csv: 'text/csv', touchstone: 'text/plain' } as const;
const formNames = ['json', 'csv', 'touchstone'] as const;
type FormName = (typeof formNames)[number];

const acceptHeaders = readHeaders.extend({
  accept: z
    .string()
    .optional()
    .meta({ description: '`application/json`, `text/csv` or `text/plain` (Touchstone).' }),
});

/** The points of a sweep in the form that the client asks for. */
export function sweepPointRoutes(app: App, service: Service): void {
  app.get(
    '/v1/sweeps/:sweep/points',
    {
      schema: {
        operationId: 'getSweepPoints',
        tags: ['sweeps'],
        summary: 'The points as JSON, CSV or Touchstone',
        params: sweepParams,
        querystring: z.strictObject({
          as: z.enum(formNames).optional().meta({ description: 'Goes before `Accept`.' }),
          plane: planeSchema.optional(),
        }),
        headers: acceptHeaders,
        response: answers(
          {
            200: {
              description: 'The points.',
              content: {
                'application/json': { schema: pointsSchema },
                'text/csv': { schema: z.string() },
                'text/plain': { schema: z.string() },
              },
            },
            ...notModified,
          },
          [...findProblems, 'not-acceptable', 'plane-unavailable', 'phase-unknown'],
        ),
      },
    },
    async (request, reply) => {
      const { as, plane } = request.query;
      const record = await findSweepOrRefuse(request, service, request.params.sweep);
      refuseOtherPlane(record, plane);
      const form = as ?? formOf(request.headers.accept);
      reply.header('vary', 'Accept');
      const tag = derivedTag(['points', record.id, form]);
      if (isNotModified(request, reply, tag)) return reply.code(304).send();
      const text = textIn(form, record, await readSweepOf(service, record));
      if (form !== 'json') {
        const name = downloadName(record, form === 'csv' ? 'csv' : 's1p');
        reply.header('content-disposition', `attachment; filename="${name}"`);
      }
      return reply.type(`${mediaTypes[form]}; charset=utf-8`).send(text);
    },
  );
}

function formOf(accept: string | undefined): FormName {
  const type = negotiate(accept, [mediaTypes.json, mediaTypes.csv, mediaTypes.touchstone]);
  return formNames.find((name) => mediaTypes[name] === type) ?? 'json';
}

function textIn(form: FormName, { id }: SweepRecord, sweep: Sweep): string {
  const note = `Sweep ${id}`;
  if (form === 'csv') return writeSweepCsv(sweep);
  if (form === 'json') return writeSweepJson(sweep, { note });
  const written = writeTouchstone(sweep, { comments: [note] });
  if (!written.ok) throw new Problem('phase-unknown', { detail: written.error.detail });
  return written.value;
}

import { z } from 'zod';
import { writeSweepCsv } from '../../core/formats/delimited/write-sweep-csv.ts';
import { writeSweepJson } from '../../core/formats/json/write-sweep-json.ts';
import { writeTouchstone } from '../../core/formats/touchstone/write-touchstone.ts';
import type { FeedLine } from '../../core/line/feed-line.ts';
import { toFeedPoint } from '../../core/line/line.ts';
import type { Sweep } from '../../core/sweep.ts';
import { negotiate } from '../http/accept.ts';
import type { App } from '../http/app-type.ts';
import { isNotModified } from '../http/conditional.ts';
import { derivedTag } from '../http/etags.ts';
import { Problem } from '../problems.ts';
import { reportBasisOf } from '../report-basis.ts';
import { readSweepOf } from '../reports.ts';
import type { Service } from '../service.ts';
import { lineToRemove } from '../sweep-view.ts';
import { readHeaders } from '../wire/common.ts';
import { pointsSchema } from '../wire/points.ts';
import { answers, notModified } from '../wire/problem.ts';
import { atPlane } from './asked-plane.ts';
import { findProblems } from './editables.ts';
import { planeQuery } from './sweep-reports.ts';
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
      config: { right: 'read' },
      schema: {
        operationId: 'getSweepPoints',
        tags: ['sweeps'],
        summary: 'The points as JSON, CSV or Touchstone',
        params: sweepParams,
        querystring: z.strictObject({
          as: z.enum(formNames).optional().meta({ description: 'Goes before `Accept`.' }),
          plane: planeQuery,
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
      const basis = atPlane(await reportBasisOf(service, record), record, plane);
      const removed = lineToRemove(basis);
      const form = as ?? formOf(request.headers.accept);
      reply.header('vary', 'Accept');
      const tag = derivedTag(['points', record.id, form, JSON.stringify(removed)]);
      if (isNotModified(request, reply, tag)) return reply.code(304).send();
      const measured = await readSweepOf(service, record);
      const notes = [`Sweep ${record.id}`];
      const text =
        removed === null
          ? textIn(form, notes, measured)
          : textIn(form, [...notes, movedNote], movedTo(removed, measured));
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

const movedNote =
  'Moved to the feed point by calculation from the stated line: not a measurement. The summary at this plane tells how far it holds.';

function movedTo(removed: FeedLine, measured: Sweep): Sweep {
  const moved = toFeedPoint(measured, removed);
  if (moved.ok) return moved.value;
  const { code, detail } = moved.error;
  throw new Problem('plane-unavailable', { detail, members: { code } });
}

function textIn(form: FormName, notes: readonly string[], sweep: Sweep): string {
  if (form === 'csv') return writeSweepCsv(sweep);
  if (form === 'json') return writeSweepJson(sweep, { note: notes.join('. ') });
  const written = writeTouchstone(sweep, { comments: notes });
  if (!written.ok) throw new Problem('phase-unknown', { detail: written.error.detail });
  return written.value;
}

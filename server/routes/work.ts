import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { actorOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { refuseFuture } from '../http/measured-at.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { WorkRecord } from '../store/history-store.ts';
import { idOrKeySchema, idSchema, noQuery, pageQuery, pageSchema } from '../wire/common.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import {
  lengthChangeM,
  withdrawalSchema,
  workInputSchema,
  workSchema,
  workToWire,
} from '../wire/work.ts';
import { addProblems, findOrRefuse, findProblems, listProblems } from './editables.ts';

const tags = ['work'];
const params = z.strictObject({ antenna: idOrKeySchema });
const workParams = z.strictObject({ antenna: idOrKeySchema, work: idSchema });

/** The work on an antenna, newest first: each piece but an inspection begins a new era. */
export function workRoutes(app: App, service: Service): void {
  app.get(
    '/v1/antennas/:antenna/work',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listWork',
        tags,
        summary: 'List the work on an antenna, newest first',
        params,
        querystring: z.strictObject(pageQuery),
        response: answers({ 200: jsonAnswer('A page of work.', pageSchema(workSchema)) }, [
          ...listProblems,
          'not-found',
        ]),
      },
    },
    async (request, reply) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const asked = pageRequest(request, request.query);
      const page = await service.store.listWork(antenna.clubId, antenna.id, asked);
      return sendPage(request, reply, service, request.query, page, workToWire);
    },
  );

  app.get(
    '/v1/antennas/:antenna/work/:work',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getWork',
        tags,
        summary: 'Read a piece of work',
        params: workParams,
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('The work.', workSchema) }, findProblems),
      },
    },
    async (request) => workToWire(await findWorkOrRefuse(request, service, request.params)),
  );

  app.post(
    '/v1/antennas/:antenna/work/:work/withdrawal',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'withdrawWork',
        tags,
        summary: 'Take work back that was told wrong',
        description:
          'It stays on record and begins no era any more. Taking it back again changes nothing.',
        params: workParams,
        querystring: noQuery,
        body: withdrawalSchema,
        response: answers({ 200: jsonAnswer('The work as it is now.', workSchema) }, [
          ...addProblems,
          'not-found',
        ]),
      },
    },
    async (request) => {
      const { id } = await findWorkOrRefuse(request, service, request.params);
      const actor = actorOf(request, service);
      return workToWire(await service.store.withdrawWork(actor, id, request.body.reason));
    },
  );

  app.post(
    '/v1/antennas/:antenna/work',
    {
      config: { right: 'measure' },
      schema: {
        operationId: 'addWork',
        tags,
        summary: 'Tell of work on an antenna',
        description:
          'Sweeps before and after it are kept apart in baseline and drift. With `length_mm`, the sweeps on both sides teach how the antenna answers to trimming.',
        params,
        querystring: noQuery,
        body: workInputSchema,
        response: answers({ 201: jsonAnswer('The work that was added.', workSchema) }, [
          ...addProblems,
          'not-found',
          'implausible-fact',
        ]),
      },
    },
    async (request, reply) => {
      const antenna = await findOrRefuse(request, service, 'antennas', request.params.antenna);
      const { kind, done_at: doneAt, done_by: doneBy, note } = request.body;
      refuseFuture(doneAt, service.now(), { pointer: '#/done_at' });
      const facts = {
        kind,
        lengthChangeM: lengthChangeM(request.body),
        doneBy,
        note,
        invented: false,
      };
      const fresh = { id: service.newId(), antennaId: antenna.id, doneAt, facts };
      const record = await service.store.addWork(actorOf(request, service), fresh);
      return reply
        .code(201)
        .header('location', `${service.publicUrl}/v1/antennas/${antenna.id}/work/${record.id}`)
        .send(workToWire(record));
    },
  );
}

async function findWorkOrRefuse(
  request: FastifyRequest,
  service: Service,
  params: z.output<typeof workParams>,
): Promise<WorkRecord> {
  const antenna = await findOrRefuse(request, service, 'antennas', params.antenna);
  const record = await service.store.findWork(antenna.clubId, params.work);
  if (record === null || record.antennaId !== antenna.id) {
    throw new Problem('not-found', { detail: `The antenna has no work \`${params.work}\`.` });
  }
  return record;
}

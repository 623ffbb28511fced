import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { actorOf, principalOf } from '../auth/bearer.ts';
import { roundProgress } from '../history/round-progress.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { RoundObject } from '../store/round-store.ts';
import { idSchema, noQuery, pageQuery, pageSchema } from '../wire/common.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import {
  roundInputSchema,
  roundProgressSchema,
  roundProgressToWire,
  roundSchema,
  roundToWire,
} from '../wire/round.ts';
import { addProblems, findProblems, listProblems, resolveReference } from './editables.ts';

const tags = ['analyzers'];

/** Rounds: several instruments measure one antenna or load in a period. */
export function roundRoutes(app: App, service: Service): void {
  app.get(
    '/v1/rounds',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listRounds',
        tags,
        summary: 'List the rounds of instruments, newest first',
        querystring: z.strictObject(pageQuery),
        response: answers({ 200: jsonAnswer('A page.', pageSchema(roundSchema)) }, listProblems),
      },
    },
    async (request, reply) => {
      const { clubId } = principalOf(request);
      const page = await service.store.listRounds(clubId, pageRequest(request, request.query));
      return sendPage(request, reply, service, request.query, page, roundToWire);
    },
  );

  app.get(
    '/v1/rounds/:round',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getRound',
        tags,
        summary: 'Read a round, how far it has come, and how well its instruments agree',
        params: z.strictObject({ round: idSchema }),
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('The round.', roundProgressSchema) }, findProblems),
      },
    },
    async (request) => {
      const { clubId } = principalOf(request);
      const record = await service.store.findRound(clubId, request.params.round);
      if (record === null) {
        const detail = `The club has no round \`${request.params.round}\`.`;
        throw new Problem('not-found', { detail });
      }
      return roundProgressToWire(record, await roundProgress(service, record));
    },
  );

  app.post(
    '/v1/rounds',
    {
      config: { right: 'measure' },
      schema: {
        operationId: 'addRound',
        tags,
        summary: 'Plan a round: which instruments measure which antenna or load, and when',
        description:
          'Whatever these instruments upload of it in that time counts; all of it is one occasion, however many days it takes.',
        querystring: noQuery,
        body: roundInputSchema,
        response: answers({ 201: jsonAnswer('The round that was planned.', roundSchema) }, [
          ...addProblems,
          'unknown-reference',
        ]),
      },
    },
    async (request, reply) => {
      const { name, begins_at: beginsAt, ends_at: endsAt, note, analyzers } = request.body;
      const measures = await objectOf(request, service, request.body);
      const analyzerIds: string[] = [];
      for (const [i, analyzer] of analyzers.entries()) {
        const place = { pointer: `#/analyzers/${i}` };
        const { id } = await resolveReference(request, service, 'analyzers', analyzer, place);
        if (!analyzerIds.includes(id)) analyzerIds.push(id);
      }
      const facts = { name, measures, analyzerIds, endsAt, note };
      const fresh = { id: service.newId(), beginsAt, facts };
      const record = await service.store.addRound(actorOf(request, service), fresh);
      return reply
        .code(201)
        .header('location', `${service.publicUrl}/v1/rounds/${record.id}`)
        .send(roundToWire(record));
    },
  );
}

async function objectOf(
  request: FastifyRequest,
  service: Service,
  { antenna, load }: z.output<typeof roundInputSchema>,
): Promise<RoundObject> {
  if (antenna !== undefined) {
    const place = { pointer: '#/antenna' };
    const { id } = await resolveReference(request, service, 'antennas', antenna, place);
    return { antennaId: id };
  }
  if (load === 'short') return { loadOhm: 0 };
  return { loadOhm: load === undefined || load === 'open' ? null : load };
}

import { z } from 'zod';
import type { CableError } from '../../core/line/cable.ts';
import { cables, findCable } from '../../core/line/cables.ts';
import { actorOf, principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { fitClubCable } from '../lines/club-cables.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import {
  cableFactsOf,
  cableSchema,
  clubCableToWire,
  newCableSchema,
  referenceCableToWire,
} from '../wire/cable.ts';
import { noQuery, pageQuery, pageSchema } from '../wire/common.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { addProblems, findProblems, listProblems } from './editables.ts';

const tags = ['cables'];
const reference = cables.map(referenceCableToWire);
const listSchema = z.object({
  reference: z
    .array(cableSchema)
    .meta({ description: 'Generic and military types: part of the service, on every page.' }),
  ...pageSchema(cableSchema).shape,
});
const params = z.strictObject({
  cable: z.string().min(1).max(100).meta({ description: 'The key, an alias, or the id.' }),
});

/** The cables that a feed line can be of: reference data, and what the club adds. */
export function cableRoutes(app: App, service: Service): void {
  app.get(
    '/v1/cables',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listCables',
        tags,
        summary: 'List the reference cables with their sources, and the club’s own by key',
        querystring: z.strictObject(pageQuery),
        response: answers({ 200: jsonAnswer('The cables.', listSchema) }, listProblems),
      },
    },
    async (request, reply) => {
      const { clubId } = principalOf(request);
      const page = await service.store.listCables(clubId, pageRequest(request, request.query));
      const own = sendPage(request, reply, service, request.query, page, clubCableToWire);
      return { reference, ...own };
    },
  );

  app.get(
    '/v1/cables/:cable',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getCable',
        tags,
        summary: 'Read a cable, by the name that a feed line has for it',
        params,
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('The cable.', cableSchema) }, findProblems),
      },
    },
    async (request) => {
      const { cable: name } = request.params;
      const own = await service.store.findCable(principalOf(request).clubId, name);
      if (own !== null) return clubCableToWire(own);
      const known = findCable(name);
      if (known !== null) return referenceCableToWire(known);
      throw new Problem('not-found', { detail: `There is no cable \`${name}\`.` });
    },
  );

  app.post(
    '/v1/cables',
    {
      config: { right: 'keep' },
      schema: {
        operationId: 'addCable',
        tags,
        summary: 'Add a cable of the club from its loss at a few frequencies',
        description:
          'A cable is never edited, so that what was computed with it stays true: add a better one under another key.',
        querystring: noQuery,
        body: newCableSchema,
        response: answers({ 201: jsonAnswer('The cable with its fit.', cableSchema) }, [
          ...addProblems,
          'implausible-cable',
        ]),
      },
    },
    async (request, reply) => {
      const { key } = request.body;
      const facts = cableFactsOf(request.body);
      const fitted = fitClubCable(key, facts);
      if (!fitted.ok) throw implausible(fitted.error);
      if (findCable(key) !== null) {
        throw new Problem('key-in-use', {
          detail: `A reference cable has the name \`${key}\`.`,
          errors: [{ detail: 'In use.', pointer: '#/key' }],
        });
      }
      const actor = actorOf(request, service);
      const fresh = { id: service.newId(), key, facts };
      const record = await service.store.addCable(actor, fresh);
      return reply
        .code(201)
        .header('location', `${service.publicUrl}/v1/cables/${record.id}`)
        .send(clubCableToWire(record));
    },
  );
}

const pointers: Readonly<Partial<Record<CableError['code'], string>>> = {
  cable_impedance_out_of_range: '#/characteristic_ohm',
  cable_velocity_factor_out_of_range: '#/velocity_factor',
  cable_half_width_negative: '#',
};

function implausible({ code, detail, index }: CableError): Problem {
  const pointer = index === undefined ? (pointers[code] ?? '#/points') : `#/points/${index}`;
  return new Problem('implausible-cable', {
    detail,
    errors: [{ detail, pointer }],
    members: { code },
  });
}

import type { FastifyReply, FastifyRequest } from 'fastify';
import { z } from 'zod';
import { actorOf, principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { isNotModified } from '../http/conditional.ts';
import { requireMatch, revisionTag } from '../http/etags.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { ChangeMemberOutcome, MemberRecord } from '../store/people.ts';
import { toCamelCase } from '../wire/case.ts';
import {
  editHeaders,
  idSchema,
  noQuery,
  pageQuery,
  pageSchema,
  readHeaders,
} from '../wire/common.ts';
import { withEdits } from '../wire/editable.ts';
import {
  memberSchema,
  memberToWire,
  personSchema,
  roleSchema,
  shownAsSchema,
} from '../wire/member.ts';
import { answers, jsonAnswer, notModified } from '../wire/problem.ts';
import { addProblems, editProblems, findProblems, listProblems } from './editables.ts';

const tags = ['people'];
const params = z.strictObject({ member: idSchema });
const createSchema = z.strictObject({
  role: roleSchema,
  shown_as: shownAsSchema.default('name'),
  person: personSchema.nullable().default(null),
});
const editSchema = z
  .strictObject({
    role: roleSchema,
    active: z.boolean(),
    shown_as: shownAsSchema,
    person: personSchema.nullable().meta({ description: 'Replaces all of it; null deletes it.' }),
  })
  .partial();

/** The people of the club. */
export function memberRoutes(app: App, service: Service): void {
  readRoutes(app, service);
  changeRoutes(app, service);
}

function readRoutes(app: App, service: Service): void {
  app.get(
    '/v1/members',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listMembers',
        tags,
        summary: 'List the members, in the order in which they were added',
        querystring: z.strictObject(pageQuery),
        response: answers(
          { 200: jsonAnswer('A page of members.', pageSchema(memberSchema)) },
          listProblems,
        ),
      },
    },
    async (request, reply) => {
      const asked = pageRequest(request, request.query);
      const page = await service.store.people.listMembers(principalOf(request).clubId, asked);
      return sendPage(request, reply, service, request.query, page, (record) =>
        memberToWire(record, seesPerson(request, record)),
      );
    },
  );

  app.get(
    '/v1/members/:member',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getMember',
        tags,
        summary: 'Read a member',
        params,
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The member.', memberSchema), ...notModified },
          findProblems,
        ),
      },
    },
    async (request, reply) => {
      const record = await memberOrRefuse(request, service, request.params.member);
      const tag = tagFor(request, record);
      if (isNotModified(request, reply, tag)) return reply.code(304).send();
      return reply.send(memberToWire(record, seesPerson(request, record)));
    },
  );
}

function changeRoutes(app: App, service: Service): void {
  app.post(
    '/v1/members',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'addMember',
        tags,
        summary: 'Add a member; a token for them is added at /v1/tokens',
        querystring: noQuery,
        body: createSchema,
        response: answers(
          { 201: jsonAnswer('The member that was added.', memberSchema) },
          addProblems.filter((slug) => slug !== 'key-in-use'),
        ),
      },
    },
    async (request, reply) => {
      const fresh = { id: service.newId(), facts: { ...toCamelCase(request.body), active: true } };
      const record = await service.store.people.addMember(actorOf(request, service), fresh);
      return reply
        .code(201)
        .header('location', `${service.publicUrl}/v1/members/${record.id}`)
        .header('etag', revisionTag(record))
        .send(memberToWire(record, true));
    },
  );

  app.patch(
    '/v1/members/:member',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'editMember',
        tags,
        summary: 'Change role, standing or particulars: fields that are left out stay',
        params,
        querystring: noQuery,
        headers: editHeaders,
        body: editSchema,
        response: answers({ 200: jsonAnswer('As it is now.', memberSchema) }, [
          ...editProblems.filter((slug) => slug !== 'key-in-use'),
          'last-steward',
          'member-erased',
        ]),
      },
    },
    async (request, reply) => {
      const present = await memberOrRefuse(request, service, request.params.member);
      requireMatch(request.headers['if-match'], revisionTag(present));
      const facts = withEdits(present.facts, toCamelCase(request.body));
      const actor = actorOf(request, service);
      const { people } = service.store;
      return sendChanged(
        reply,
        await people.editMember(actor, present.id, present.revision, facts),
      );
    },
  );

  app.post(
    '/v1/members/:member/erase',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'eraseMember',
        tags,
        summary: 'Delete for good all that tells who a member is, and revoke their tokens',
        description:
          'Their records stay, under an id and a pseudonym. Backups made before still hold the person: delete them when your rules ask for it.',
        params,
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('What is left.', memberSchema) }, [
          ...findProblems,
          'last-steward',
          'member-erased',
          'storage-full',
        ]),
      },
    },
    async (request, reply) => {
      const present = await memberOrRefuse(request, service, request.params.member);
      const actor = actorOf(request, service);
      return sendChanged(reply, await service.store.people.eraseMember(actor, present.id));
    },
  );
}

/** The member of the asker's club that a path names. Throws `not-found`. */
async function memberOrRefuse(
  request: FastifyRequest,
  service: Service,
  id: string,
): Promise<MemberRecord> {
  const found = await service.store.people.findMember(principalOf(request).clubId, id);
  if (found === null) {
    throw new Problem('not-found', { detail: `None of the club's members is \`${id}\`.` });
  }
  return found;
}

function seesPerson(request: FastifyRequest, { id }: MemberRecord): boolean {
  const { memberId, rights } = principalOf(request);
  return memberId === id || rights.has('administer');
}

/** The answer without the person is another text, so it has another tag. */
function tagFor(request: FastifyRequest, record: MemberRecord): string {
  const tag = revisionTag(record);
  return seesPerson(request, record) ? tag : tag.replace(/"$/, '.shown"');
}

function sendChanged(reply: FastifyReply, changed: ChangeMemberOutcome): FastifyReply {
  if (changed.outcome !== 'changed') {
    throw new Problem(changed.outcome === 'erased-before' ? 'member-erased' : 'last-steward');
  }
  const { record } = changed;
  return reply.header('etag', revisionTag(record)).send(memberToWire(record, true));
}

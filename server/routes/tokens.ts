import { randomBytes } from 'node:crypto';
import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { actorOf, lacking, principalOf } from '../auth/bearer.ts';
import { newTokenTerms } from '../auth/new-token.ts';
import { makeToken, secretSha256 } from '../auth/token.ts';
import type { App } from '../http/app-type.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { MemberRecord } from '../store/people.ts';
import { idSchema, noQuery, pageQuery, pageSchema, timeInputSchema } from '../wire/common.ts';
import {
  newTokenSchema,
  rightSchema,
  tokenLabelSchema,
  tokenSchema,
  tokenToWire,
} from '../wire/member.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { addProblems, findProblems, listProblems } from './editables.ts';

const tags = ['people'];
const memberSchema = idSchema.optional();
const createSchema = z.strictObject({
  member: memberSchema.meta({ description: 'Left out: for oneself. For others: a steward.' }),
  label: tokenLabelSchema,
  scopes: z
    .array(rightSchema)
    .min(1)
    .max(10)
    .nullable()
    .optional()
    .meta({ description: 'Left out or null: all that the role, or the token that asks, has.' }),
  expires_at: timeInputSchema
    .nullable()
    .optional()
    .meta({ description: 'Left out: in 366 days, or with the token that asks. Null: never.' }),
});

/** The tokens of the club: each member's own, and all of them for stewards. */
export function tokenRoutes(app: App, service: Service): void {
  app.get(
    '/v1/tokens',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listTokens',
        tags,
        summary: "List one's own tokens; a steward lists those of all, or of one member",
        querystring: z.strictObject({ ...pageQuery, member: memberSchema }),
        response: answers(
          { 200: jsonAnswer('A page of tokens.', pageSchema(tokenSchema)) },
          listProblems,
        ),
      },
    },
    async (request, reply) => {
      const { clubId, memberId, rights } = principalOf(request);
      const { member = rights.has('administer') ? null : memberId } = request.query;
      if (member !== memberId && !rights.has('administer')) throw lacking('administer');
      const asked = pageRequest(request, request.query);
      const page = await service.store.people.listTokens(clubId, member, asked);
      return sendPage(request, reply, service, request.query, page, tokenToWire);
    },
  );

  app.post(
    '/v1/tokens',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'addToken',
        tags,
        summary: 'Make a token for oneself, or, as a steward, for a member',
        description:
          'The token stands in this answer and nowhere else. A token without the right `administer` makes none that may do more or lasts longer than itself.',
        querystring: noQuery,
        body: createSchema,
        response: answers({ 201: jsonAnswer('The token.', newTokenSchema) }, [
          ...addProblems.filter((slug) => slug !== 'key-in-use'),
          'unknown-reference',
          'implausible-fact',
        ]),
      },
    },
    async (request, reply) => {
      const principal = principalOf(request);
      const { member = principal.memberId, label, scopes, expires_at } = request.body;
      const owner = await ownerOrRefuse(request, service, member);
      const terms = newTokenTerms(
        principal,
        owner,
        { scopes, expiresAt: expires_at },
        service.now(),
      );
      const secret = makeToken(randomBytes);
      const kept = await service.store.people.addToken(
        actorOf(request, service),
        { id: service.newId(), memberId: owner.id, label, ...terms },
        secretSha256(secret),
      );
      if (kept === null) throw unknownMember(member);
      return reply
        .code(201)
        .header('cache-control', 'no-store')
        .header('location', `${service.publicUrl}/v1/tokens/${kept.id}`)
        .send({ ...tokenToWire(kept), token: secret });
    },
  );

  app.delete(
    '/v1/tokens/:token',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'revokeToken',
        tags,
        summary: "Revoke one's own token or, as a steward, anybody's; once more is no fault",
        params: z.strictObject({ token: idSchema }),
        querystring: noQuery,
        response: answers({ 204: z.undefined().describe('It is not valid any more.') }, [
          ...findProblems,
          'storage-full',
        ]),
      },
    },
    async (request, reply) => {
      const { clubId, memberId, rights } = principalOf(request);
      const { token: id } = request.params;
      const token = await service.store.people.findMemberToken(clubId, id);
      if (token === null || (token.memberId !== memberId && !rights.has('administer'))) {
        throw new Problem('not-found', { detail: `None of your tokens has the id \`${id}\`.` });
      }
      await service.store.people.revokeToken(actorOf(request, service), id);
      return reply.code(204).send();
    },
  );
}

/** Whom a token is to be for. Throws `insufficient-right` and `unknown-reference`. */
async function ownerOrRefuse(
  request: FastifyRequest,
  service: Service,
  id: string,
): Promise<MemberRecord> {
  const { clubId, memberId, rights } = principalOf(request);
  if (id !== memberId && !rights.has('administer')) throw lacking('administer');
  const member = await service.store.people.findMember(clubId, id);
  if (member === null || !member.facts.active) throw unknownMember(id);
  return member;
}

function unknownMember(id: string): Problem {
  return new Problem('unknown-reference', {
    errors: [{ detail: `None of the club's active members is \`${id}\`.`, pointer: '#/member' }],
  });
}

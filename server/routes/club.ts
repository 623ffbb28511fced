import { z } from 'zod';
import { actorOf, principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { isNotModified } from '../http/conditional.ts';
import { requireMatch, revisionTag } from '../http/etags.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { ClubState } from '../store/people.ts';
import { toCamelCase } from '../wire/case.ts';
import { editHeaders, noQuery, readHeaders } from '../wire/common.ts';
import { withEdits } from '../wire/editable.ts';
import { clubNameSchema, clubSchema, clubToWire } from '../wire/member.ts';
import { answers, commonProblems, jsonAnswer, notModified } from '../wire/problem.ts';
import { editProblems } from './editables.ts';

const tags = ['people'];
const editSchema = z
  .strictObject({ name: clubNameSchema, public_dashboard: z.boolean() })
  .partial();

/** The club of the token. */
export function clubRoutes(app: App, service: Service): void {
  const ofToken = async (clubId: string): Promise<ClubState> => {
    const club = await service.store.people.findClub(clubId);
    if (club === null) throw new Problem('unavailable', { headers: { 'retry-after': '5' } });
    return club;
  };

  app.get(
    '/v1/club',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getClub',
        tags,
        summary: 'Read the club of the token',
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The club.', clubSchema), ...notModified },
          commonProblems,
        ),
      },
    },
    async (request, reply) => {
      const club = await ofToken(principalOf(request).clubId);
      if (isNotModified(request, reply, revisionTag(club))) return reply.code(304).send();
      return reply.send(clubToWire(club));
    },
  );

  app.patch(
    '/v1/club',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'editClub',
        tags,
        summary: 'Rename the club, or open or close its public dashboard',
        querystring: noQuery,
        headers: editHeaders,
        body: editSchema,
        response: answers(
          { 200: jsonAnswer('As it is now.', clubSchema) },
          editProblems.filter((slug) => slug !== 'not-found' && slug !== 'key-in-use'),
        ),
      },
    },
    async (request, reply) => {
      const present = await ofToken(principalOf(request).clubId);
      requireMatch(request.headers['if-match'], revisionTag(present));
      const facts = withEdits(present.facts, toCamelCase(request.body));
      const actor = actorOf(request, service);
      const club = await service.store.people.editClub(actor, present.revision, facts);
      return reply.header('etag', revisionTag(club)).send(clubToWire(club));
    },
  );
}

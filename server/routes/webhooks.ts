import { randomBytes } from 'node:crypto';
import type { FastifyRequest } from 'fastify';
import { z } from 'zod';
import { actorOf, principalOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { requireMatch, revisionTag } from '../http/etags.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { Problem, type ProblemSlug } from '../problems.ts';
import type { Service } from '../service.ts';
import type { WebhookRecord } from '../store/webhooks.ts';
import { makeSecret } from '../webhooks/message.ts';
import { targetFault } from '../webhooks/target.ts';
import { editHeaders, idSchema, noQuery, pageQuery, pageSchema } from '../wire/common.ts';
import { withEdits } from '../wire/editable.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import {
  newWebhookAnswerSchema,
  newWebhookSchema,
  webhookEditSchema,
  webhookSchema,
  webhookToWire,
} from '../wire/webhook.ts';
import { addProblems, editProblems, findProblems, listProblems } from './editables.ts';

const tags = ['events'];
const params = z.strictObject({ webhook: idSchema });
const withoutKeys = (problems: readonly ProblemSlug[]) =>
  problems.filter((slug) => slug !== 'key-in-use');

/** Where the club's events are sent; for stewards, since whatever is told leaves the club there. */
export function webhookRoutes(app: App, service: Service): void {
  readRoutes(app, service);
  changeRoutes(app, service);
}

function readRoutes(app: App, service: Service): void {
  app.get(
    '/v1/webhooks',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'listWebhooks',
        tags,
        summary: 'List the webhooks, in the order in which they were added',
        querystring: z.strictObject(pageQuery),
        response: answers(
          { 200: jsonAnswer('A page of webhooks.', pageSchema(webhookSchema)) },
          listProblems,
        ),
      },
    },
    async (request, reply) => {
      const asked = pageRequest(request, request.query);
      const page = await service.store.webhooks.list(principalOf(request).clubId, asked);
      return sendPage(request, reply, service, request.query, page, webhookToWire);
    },
  );

  app.get(
    '/v1/webhooks/:webhook',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'getWebhook',
        tags,
        summary: 'Read a webhook, and how the last attempt ended',
        params,
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('The webhook.', webhookSchema) }, findProblems),
      },
    },
    async (request, reply) => {
      const record = await webhookOrRefuse(request, service, request.params.webhook);
      // Its tag names the revision alone, which attempts do not change, so no 304 is answered.
      return reply.header('etag', revisionTag(record)).send(webhookToWire(record));
    },
  );
}

function changeRoutes(app: App, service: Service): void {
  app.post(
    '/v1/webhooks',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'addWebhook',
        tags,
        summary: 'Have the club’s events sent to a URL',
        description:
          'Each event is posted as JSON (`type`, `timestamp`, and as `data` the event as /v1/events sends it), signed by the Standard Webhooks specification: `webhook-id`, `webhook-timestamp`, `webhook-signature`. What is not answered with 2xx within 15 seconds is sent again after 5 s, 5 min, 30 min, 2, 5, 10, 14, 20 and 24 h; then, or after a 410, the webhook is switched off. Redirects are not followed. Events come in their order, an event may come twice with the same id.',
        querystring: noQuery,
        body: newWebhookSchema,
        response: answers({ 201: jsonAnswer('With its secret.', newWebhookAnswerSchema) }, [
          ...withoutKeys(addProblems),
          'implausible-fact',
        ]),
      },
    },
    async (request, reply) => {
      const facts = request.body;
      refuseTarget(service, facts.url);
      const secret = makeSecret(randomBytes);
      const fresh = { id: service.newId(), facts, secret };
      const record = await service.store.webhooks.add(actorOf(request, service), fresh);
      return reply
        .code(201)
        .header('cache-control', 'no-store')
        .header('location', `${service.publicUrl}/v1/webhooks/${record.id}`)
        .header('etag', revisionTag(record))
        .send({ ...webhookToWire(record), secret });
    },
  );

  app.patch(
    '/v1/webhooks/:webhook',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'editWebhook',
        tags,
        summary: 'Edit a webhook, or switch it off or on again',
        params,
        querystring: noQuery,
        headers: editHeaders,
        body: webhookEditSchema,
        response: answers({ 200: jsonAnswer('As it is now.', webhookSchema) }, [
          ...withoutKeys(editProblems),
          'implausible-fact',
        ]),
      },
    },
    async (request, reply) => {
      const present = await webhookOrRefuse(request, service, request.params.webhook);
      requireMatch(request.headers['if-match'], revisionTag(present));
      const { active = present.progress.active, ...edits } = request.body;
      const facts = withEdits(present.facts, edits);
      refuseTarget(service, facts.url);
      const actor = actorOf(request, service);
      const { id, revision } = present;
      const next = { facts, active };
      const record = await service.store.webhooks.edit(actor, id, revision, next);
      return reply.header('etag', revisionTag(record)).send(webhookToWire(record));
    },
  );

  app.delete(
    '/v1/webhooks/:webhook',
    {
      config: { right: 'administer' },
      schema: {
        operationId: 'removeWebhook',
        tags,
        summary: 'Remove a webhook with its secret',
        params,
        querystring: noQuery,
        response: answers({ 204: z.undefined().describe('Nothing is sent there any more.') }, [
          ...findProblems,
          'storage-full',
        ]),
      },
    },
    async (request, reply) => {
      const { id } = await webhookOrRefuse(request, service, request.params.webhook);
      await service.store.webhooks.remove(actorOf(request, service), id);
      return reply.code(204).send();
    },
  );
}

/** The webhook of the asker's club that a path names. Throws `not-found`. */
async function webhookOrRefuse(
  request: FastifyRequest,
  { store }: Service,
  id: string,
): Promise<WebhookRecord> {
  const found = await store.webhooks.find(principalOf(request).clubId, id);
  if (found !== null) return found;
  throw new Problem('not-found', { detail: `None of the club's webhooks is \`${id}\`.` });
}

/** Throws `implausible-fact` for a URL that nothing may be sent to. */
function refuseTarget({ privateWebhooks = false }: Service, url: string): void {
  const detail = targetFault(url, privateWebhooks);
  if (detail !== null)
    throw new Problem('implausible-fact', { errors: [{ detail, pointer: '#/url' }] });
}

import cookie from '@fastify/cookie';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { toProblem } from '../errors.ts';
import type { App } from '../http/app-type.ts';
import { problemBody, problemKinds } from '../problems.ts';
import type { Service } from '../service.ts';
import { problemSchema } from '../wire/problem.ts';
import { analyzersPageRoutes } from './analyzers-page-routes.ts';
import { antennaPageRoutes } from './antenna-page-routes.ts';
import { icon, script, style } from './assets.ts';
import { boardRoutes } from './board-routes.ts';
import { chartRoutes } from './chart-routes.ts';
import { hidden } from './hidden.ts';
import { page, pagePolicy } from './layout.ts';
import { Refusal } from './member-api.ts';
import { refusalPage } from './refusal-page.ts';
import { signInRoutes } from './sign-in-routes.ts';
import { sweepPageRoutes } from './sweep-page-routes.ts';
import { uploadPageRoutes } from './upload-page-routes.ts';

/**
 * The pages for people, in a scope of their own. None needs a right itself: what it shows it asks
 * of the interface with the token of the reader's cookie, and is refused there.
 */
export async function pageRoutes(scope: App, service: Service): Promise<void> {
  scope.removeAllContentTypeParsers();
  scope.addContentTypeParser('*', { parseAs: 'buffer' }, (_request, body, done) => {
    done(null, body);
  });
  await scope.register(cookie);
  scope.addHook('onRequest', async (_request, reply) => {
    reply
      .header('content-security-policy', pagePolicy)
      // A form must tell where it comes from, to this service alone.
      .header('referrer-policy', 'same-origin')
      .header('cache-control', 'private, no-cache');
  });
  scope.setErrorHandler((error, request, reply) => showRefusal(error, request, reply, service));
  for (const asset of [style, script, icon]) {
    scope.get(asset.url, hidden, async (_request, reply) =>
      reply
        .header('cache-control', 'public, max-age=31536000, immutable')
        .type(asset.type)
        .send(asset.bytes),
    );
  }
  signInRoutes(scope, service);
  boardRoutes(scope);
  analyzersPageRoutes(scope);
  antennaPageRoutes(scope);
  chartRoutes(scope);
  sweepPageRoutes(scope);
  uploadPageRoutes(scope, service);
}

function showRefusal(
  error: unknown,
  request: FastifyRequest,
  reply: FastifyReply,
  { publicUrl }: Service,
): FastifyReply {
  const problem = error instanceof Refusal ? error.problem : problemOf(error, request, publicUrl);
  if (problem.status === 401) {
    return reply.redirect(`/sign-in?next=${encodeURIComponent(request.url)}`, 303);
  }
  if (problem.status >= 500) request.log.error({ err: error }, 'a page failed');
  return reply
    .code(problem.status)
    .type('text/html; charset=utf-8')
    .send(page({ title: problem.title, body: refusalPage(problem) }));
}

function problemOf(error: unknown, request: FastifyRequest, publicUrl: string) {
  const { slug, parts } = toProblem(error);
  const body = problemBody(slug, parts, publicUrl, request.id);
  return problemSchema.parse({ ...body, status: problemKinds[slug].status });
}

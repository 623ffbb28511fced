import type { FastifyReply } from 'fastify';
import { z } from 'zod';
import type { App } from '../http/app-type.ts';
import { pagePolicy } from '../pages/layout.ts';
import { problemListPage, problemPage } from '../pages/problem-page.ts';
import { Problem, type ProblemSlug, problemKinds } from '../problems.ts';
import { answers } from '../wire/problem.ts';

const html = (description: string) => ({
  description,
  content: { 'text/html': { schema: z.string() } },
});

/** The pages behind the `type` of problems. */
export function problemPageRoutes(app: App): void {
  app.get(
    '/problems',
    {
      config: { right: 'public' },
      schema: {
        operationId: 'listProblemPages',
        tags: ['operations'],
        summary: 'Every kind of problem',
        response: answers({ 200: html('A page.') }, ['malformed-request', 'internal']),
      },
    },
    async (_request, reply) => sendProblemPage(reply, problemListPage()),
  );

  app.get(
    '/problems/:slug',
    {
      config: { right: 'public' },
      schema: {
        operationId: 'getProblemPage',
        tags: ['operations'],
        summary: 'What a kind of problem means and what to do',
        params: z.strictObject({ slug: z.string().max(40) }),
        response: answers({ 200: html('A page.') }, [
          'invalid-request',
          'malformed-request',
          'not-found',
          'uri-too-long',
          'internal',
        ]),
      },
    },
    async (request, reply) => {
      const { slug } = request.params;
      if (!isSlug(slug)) throw new Problem('not-found');
      return sendProblemPage(reply, problemPage(slug));
    },
  );
}

function sendProblemPage(reply: FastifyReply, markup: string): FastifyReply {
  return reply
    .header('content-security-policy', pagePolicy)
    .type('text/html; charset=utf-8')
    .send(markup);
}

function isSlug(text: string): text is ProblemSlug {
  return Object.hasOwn(problemKinds, text);
}

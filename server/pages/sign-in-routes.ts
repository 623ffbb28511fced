import type { FastifyReply, FastifyRequest } from 'fastify';
import { z } from 'zod';
import type { App } from '../http/app-type.ts';
import { bodyBytes, parseForm } from '../http/upload-body.ts';
import type { Service } from '../service.ts';
import { hidden } from './hidden.ts';
import { page } from './layout.ts';
import { MemberApi } from './member-api.ts';
import { isOwnForm, ownPath } from './own-form.ts';
import { keepSignedIn, signOut } from './sign-in-cookie.ts';
import { type SignInParts, signInPage } from './sign-in-page.ts';
import { texts } from './texts.ts';

const words = texts.signIn;
const querystring = z.object({ next: z.string().max(500).default('/') });

/** Signing in with a token, and out. */
export function signInRoutes(scope: App, { publicUrl }: Service): void {
  scope.get(
    '/sign-in',
    { ...hidden, schema: { ...hidden.schema, querystring } },
    async (request, reply) =>
      showForm(reply, {
        next: ownPath(request.query.next),
        fault: null,
        fromElsewhere: request.headers['sec-fetch-site'] === 'cross-site',
      }),
  );

  scope.post('/sign-in', hidden, async (request, reply) => {
    if (!isOwnForm(request)) return refuseForeignForm(reply);
    const form = await parseForm(bodyBytes(request), request.headers['content-type'] ?? '');
    const token = String(form.get('token') ?? '').trim();
    const next = ownPath(String(form.get('next') ?? '/'));
    const { status } = await tryToken(scope, request, token);
    if (status === 200) {
      keepSignedIn(reply, token, { publicUrl, forLonger: form.get('stay') === 'yes' });
      return reply.redirect(next, 303);
    }
    const fault = status === 403 ? words.narrow : words.refused;
    return showForm(reply.code(422), { next, fault, fromElsewhere: false });
  });

  scope.post('/sign-out', hidden, async (request, reply) => {
    if (!isOwnForm(request)) return refuseForeignForm(reply);
    signOut(reply, publicUrl);
    return reply.redirect('/sign-in', 303);
  });
}

/** Asks the interface for the club with a token; other than 200, 401 and 403 is a refusal. */
async function tryToken(scope: App, request: FastifyRequest, token: string) {
  const isPlain = /^[\x21-\x7e]{1,100}$/.test(token);
  return new MemberApi(scope, request, isPlain ? token : null).send('GET', '/v1/club');
}

function showForm(reply: FastifyReply, parts: SignInParts): FastifyReply {
  return reply
    .type('text/html; charset=utf-8')
    .send(page({ title: words.title, body: signInPage(parts) }));
}

/** A form from another site must not act in the name of whoever is signed in here. */
export function refuseForeignForm(reply: FastifyReply): FastifyReply {
  const body = signInPage({ next: '/', fault: words.foreign, fromElsewhere: false });
  return reply
    .code(403)
    .type('text/html; charset=utf-8')
    .send(page({ title: words.foreignTitle, body }));
}

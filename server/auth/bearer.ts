import type { FastifyInstance, FastifyRequest } from 'fastify';
import { Problem } from '../problems.ts';
import { type Service, timestamp } from '../service.ts';
import type { Actor } from '../store/port.ts';
import { isWellFormedToken, secretSha256 } from './token.ts';

/** Who is asking, as the token tells. Roles will stand here once there are members. */
export interface Principal {
  readonly clubId: string;
  readonly memberId: string;
}

declare module 'fastify' {
  interface FastifyRequest {
    /** Set on every route behind `requireToken`, null elsewhere. */
    actor: Principal | null;
  }
}

/** Lets no request of this instance pass without a valid bearer token (RFC 6750). */
export function requireToken(app: FastifyInstance, service: Service): void {
  app.addHook('onRequest', async (request) => {
    request.actor = await authenticate(request, service);
  });
}

/** The principal of a request behind `requireToken`. */
export function principalOf(request: FastifyRequest): Principal {
  if (request.actor === null) throw new Error(`${request.routeOptions.url} stands outside auth`);
  return request.actor;
}

/** The principal with the present time, as the store wants to know it. */
export function actorOf(request: FastifyRequest, service: Service): Actor {
  return { ...principalOf(request), at: timestamp(service.now) };
}

async function authenticate(request: FastifyRequest, service: Service): Promise<Principal> {
  if (carriesTokenInUrl(request.url)) throw new Problem('token-in-url');
  const header = request.headers.authorization;
  if (header === undefined) throw unauthenticated('The request has no bearer token.');
  const match = /^Bearer +([^\s]+) *$/i.exec(header);
  if (match === null) {
    throw unauthenticated('The Authorization header is not of the form `Bearer <token>`.');
  }
  const token = match[1];
  const known = isWellFormedToken(token)
    ? await service.store.findToken(secretSha256(token))
    : null;
  // One answer for malformed, unknown and revoked: it tells a guesser nothing.
  if (known === null) throw unauthenticated('The token is not valid here.', 'invalid_token');
  return { clubId: known.clubId, memberId: known.memberId };
}

const tokenInUrl = /[?&](access_token=|[^=&]*=sl_[0-9A-Za-z]{36}(&|$))/;

function carriesTokenInUrl(url: string): boolean {
  return tokenInUrl.test(url);
}

function unauthenticated(detail: string, error?: 'invalid_token'): Problem {
  const challenge = 'Bearer realm="sweep-ledger"';
  return new Problem('unauthenticated', {
    detail,
    headers: {
      'www-authenticate': error === undefined ? challenge : `${challenge}, error="${error}"`,
    },
  });
}

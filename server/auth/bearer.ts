import type { FastifyInstance, FastifyRequest } from 'fastify';
import { Problem } from '../problems.ts';
import { type Right, type Role, rightsOf } from '../rights.ts';
import { type Service, timestamp } from '../service.ts';
import type { KnownToken } from '../store/people.ts';
import type { Actor } from '../store/port.ts';
import { KnownTokens } from './known-tokens.ts';
import type { CountedRequests } from './request-limits.ts';
import { carriesToken } from './token-in-url.ts';
import { noteUses } from './token-use.ts';

/** Who is asking and what for, as the token tells. */
export interface Principal {
  readonly clubId: string;
  readonly memberId: string;
  readonly tokenId: string;
  /** Null: the token does not expire. */
  readonly tokenExpiresAt: string | null;
  readonly role: Role;
  /** Those of the role, or fewer if the token is narrower. */
  readonly rights: ReadonlySet<Right>;
}

declare module 'fastify' {
  interface FastifyRequest {
    /** Set on every route that needs a right, null on public ones. */
    actor: Principal | null;
  }
}

/** Lets no request pass without the right that its route declares (RFC 6750). */
export function guardRoutes(
  app: FastifyInstance,
  service: Service,
  counted: CountedRequests,
): void {
  const tokens = new KnownTokens(service.store);
  const noteUse = noteUses(service);
  app.decorateRequest('actor', null);
  app.addHook('onRequest', async (request) => {
    if (carriesToken(request.url)) throw new Problem('token-in-url');
    const { right = 'public' } = request.routeOptions.config;
    if (right !== 'public' || request.url.startsWith('/v1/')) await counted.ofAddress(request);
    if (right === 'public') return;
    const token = await authenticate(request, service, tokens);
    const principal = principalOfToken(token);
    request.actor = principal;
    await counted.ofToken(request);
    noteUse(token, request.log);
    if (!principal.rights.has(right)) throw lacking(right);
  });
}

/** The principal of a request whose route needs a right. */
export function principalOf(request: FastifyRequest): Principal {
  if (request.actor === null) throw new Error(`${request.routeOptions.url} is public`);
  return request.actor;
}

/** The principal with the present time, as the store wants to know it. */
export function actorOf(request: FastifyRequest, service: Service): Actor {
  const { clubId, memberId } = principalOf(request);
  return { clubId, memberId, at: timestamp(service.now) };
}

/** Whether the token that a request came with is still valid and has the right of its route. */
export async function isStillAllowed(request: FastifyRequest, service: Service): Promise<boolean> {
  const { right = 'public' } = request.routeOptions.config;
  if (right === 'public') return true;
  try {
    const token = await authenticate(request, service, new KnownTokens(service.store));
    return principalOfToken(token).rights.has(right);
  } catch (error) {
    if (error instanceof Problem) return false;
    throw error;
  }
}

async function authenticate(
  request: FastifyRequest,
  service: Service,
  tokens: KnownTokens,
): Promise<KnownToken> {
  const header = request.headers.authorization;
  if (header === undefined) throw unauthenticated('The request has no bearer token.');
  const match = /^Bearer +([^\s]+) *$/i.exec(header);
  if (match === null) {
    throw unauthenticated('The Authorization header is not of the form `Bearer <token>`.');
  }
  const known = await tokens.find(match[1]);
  // One answer for malformed, unknown, revoked and expired: it tells a guesser nothing.
  if (known === null || (known.expiresAt !== null && known.expiresAt <= timestamp(service.now))) {
    throw unauthenticated('The token is not valid here.', 'invalid_token');
  }
  return known;
}

function principalOfToken(token: KnownToken): Principal {
  const { id, clubId, memberId, role, scopes, expiresAt } = token;
  const allowed = rightsOf(role, scopes);
  return { clubId, memberId, tokenId: id, tokenExpiresAt: expiresAt, role, rights: allowed };
}

/** The problem of a valid token without the right. */
export function lacking(right: Right): Problem {
  const challenge = `Bearer realm="sweep-ledger", error="insufficient_scope", scope="${right}"`;
  return new Problem('insufficient-right', {
    detail: `This needs the right \`${right}\`, which the token does not have.`,
    headers: { 'www-authenticate': challenge },
  });
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

import rateLimit from '@fastify/rate-limit';
import type { FastifyInstance, FastifyRequest } from 'fastify';
import { Problem } from '../problems.ts';
import { principalOf } from './bearer.ts';

/** Requests a minute; 0: as many as come. */
export interface RequestLimits {
  readonly perAddress: number;
  readonly perToken: number;
}

/** Each counts a request, and throws `too-many-requests` where there were too many. */
export interface CountedRequests {
  /** Before it is known who asks, so that guessing tokens is slow. */
  ofAddress(request: FastifyRequest): Promise<void>;
  /** Once it is known. */
  ofToken(request: FastifyRequest): Promise<void>;
}

type Check = ReturnType<FastifyInstance['createRateLimit']>;

const timeWindow = 60_000;

/** Counts requests by where they come from and by their token. */
export async function countRequests(
  app: FastifyInstance,
  { perAddress, perToken }: RequestLimits,
): Promise<CountedRequests> {
  await app.register(rateLimit, { global: false });
  const checkOf = (max: number, keyGenerator: (request: FastifyRequest) => string): Check | null =>
    max === 0 ? null : app.createRateLimit({ max, timeWindow, keyGenerator });
  const address = checkOf(perAddress, ({ ip }) => ip);
  const token = checkOf(perToken, (request) => principalOf(request).tokenId);
  return {
    ofAddress: (request) => count(address, request, 'This address'),
    ofToken: (request) => count(token, request, 'This token'),
  };
}

async function count(check: Check | null, request: FastifyRequest, who: string): Promise<void> {
  if (check === null) return;
  const found = await check(request);
  if (found.isAllowed || !found.isExceeded) return;
  throw new Problem('too-many-requests', {
    detail: `${who} has sent ${found.max} requests within a minute.`,
    headers: { 'retry-after': String(Math.max(1, found.ttlInSeconds)) },
  });
}

import type { FastifyReply, FastifyRequest } from 'fastify';
import { noneMatchHits } from './etags.ts';

/**
 * Marks the answer with its tag, for a private cache that must ask again, and says whether the
 * client has it already: then the answer is a 304 and nothing need be computed.
 */
export function isNotModified(request: FastifyRequest, reply: FastifyReply, tag: string): boolean {
  reply.header('etag', tag).header('cache-control', 'private, no-cache');
  return noneMatchHits(request.headers['if-none-match'], tag);
}
